import type { Checkpoint } from '~~/shared/record/checkpoint'
import type { StoredEntry } from '~~/shared/record/entry'
import { entryHash } from '~~/shared/record/entry'
import type { KeptOutage } from './database'
import { chainKey, openKept, STRICT } from './database'
import type { ChainEnd, OutboxEntry, Refusal } from './outbox-ports'
import { isWaiting } from './outbox-ports'

/** What of this phone's own would be sent again to another log; or why that cannot be. */
export interface Lost {
  /** in the order in which they were signed: those that the other log lacks, then those that still wait */
  again: Kept[]
  /** what cannot follow: an entry before it was refused, and is no longer kept here */
  cut: Kept[]
  /** where this device's chain ends with all that is sent again */
  end: ChainEnd | null
  /** entries of others, and of other devices, that this phone holds and the other log lacks */
  others: number
  /** why this phone can never go on from that log, in words; null where it can */
  unfit: string | null
}
type Kept = Omit<OutboxEntry, 'place'>

const CUT: Refusal = { code: 409, field: null, reason: 'the log that was restored lacks an entry before it, which is no longer kept on this phone', recorded: false }

/**
 * Compares the log that a phone holds with another one that the server gives in its place, as after a restore
 * from a backup. What this device signed fits on that log again, unchanged, where the log's entries of this
 * device are the first ones of its own chain.
 * @param held the log as kept here, with what the server added
 * @param kept the outbox of this outage
 * @param given the whole log that the server gives now
 * @param chain where this device's chain ends in that log
 */
export function lostOf(held: readonly StoredEntry[], kept: readonly OutboxEntry[], given: readonly StoredEntry[], chain: ChainEnd | null, { person, device }: { person: string, device: string }): Lost {
  const there = new Set(given.map(stored => stored.entry.id))
  const own = ownEntries(held, kept, person, device)
  const others = held.filter(stored => !there.has(stored.entry.id) && stored.entry.by !== 'server' && stored.entry.device !== device).length
  const foreign = given.find(({ entry }) => entry.device === device && (!own.has(entry.n) || entryHash(own.get(entry.n)!.entry) !== entryHash(entry)))
  if (foreign) return { again: [], cut: [], end: chain, others, unfit: `No. ${foreign.seq} of that log is signed by this phone, and this phone does not know it` }
  const again: Kept[] = []
  const cut: Kept[] = []
  let end = chain
  for (const item of [...own.values()].sort((one, other) => one.n - other.n)) {
    if (item.n <= (chain?.n ?? 0)) continue
    if (cut.length > 0 || item.n !== (end?.n ?? 0) + 1 || item.entry.prev !== (end?.hash ?? null)) { cut.push({ ...item, refusal: CUT }); continue }
    again.push(item)
    end = { n: item.n, hash: entryHash(item.entry) }
  }
  return { again, cut, end, others, unfit: null }
}

/** Everything that this device signed and still knows, by its count; what was refused for good took its place in the chain too. */
function ownEntries(held: readonly StoredEntry[], kept: readonly OutboxEntry[], person: string, device: string): Map<number, Kept> {
  const own = new Map<number, Kept>()
  for (const { entry, signature } of held) {
    if (entry.device === device && entry.by === person) own.set(entry.n, { id: entry.id, outage: entry.outage, person, device, n: entry.n, entry, signature, keptAt: entry.at, receipt: null, refusal: null })
  }
  for (const { place: _place, ...item } of kept) {
    if (item.device === device && item.person === person && (item.refusal === null || item.refusal.recorded)) own.set(item.n, { ...item, receipt: null, refusal: null })
  }
  return own
}

/**
 * Takes another log as the one to go on from, in one transaction: the log kept here is replaced, and what this
 * phone signed and that log lacks waits again, in the order in which it was signed. What cannot follow stands
 * there as refused until its signer has seen it.
 */
export async function takeLog(about: KeptOutage, given: readonly StoredEntry[], { again, cut, end }: Lost, device: string): Promise<void> {
  const tx = (await openKept()).transaction(['outages', 'log', 'outbox', 'chains'], 'readwrite', STRICT)
  const log = tx.objectStore('log')
  const outbox = tx.objectStore('outbox')
  await log.delete(IDBKeyRange.bound([about.id, 0], [about.id, Number.MAX_SAFE_INTEGER]))
  for (const stored of given) await log.put(stored, [about.id, stored.seq])
  await tx.objectStore('outages').put(about)
  const last = await outbox.index('place').openKeyCursor(null, 'prev')
  let place = Number(last?.key ?? 0)
  for (const item of [...again, ...cut]) await outbox.put({ ...item, place: ++place })
  if (end) await tx.objectStore('chains').put(end, chainKey(device, about.id))
  else await tx.objectStore('chains').delete(chainKey(device, about.id))
  // What the log holds already waits no longer.
  const there = new Set(given.map(stored => stored.entry.id))
  for (const item of await outbox.index('outage').getAll(about.id)) if (there.has(item.id) && (item.receipt !== null || isWaiting(item))) await outbox.delete(item.id)
  await tx.done
}

/** What a phone says in the log when it goes on from another one: what it had seen, and why it goes on. */
export function otherLogWords(seen: Checkpoint, given: number, again: number, reason: string): string {
  const { size, root, time } = seen.statement
  return `This phone had seen another log of this outage: ${size} entries at ${time}, root ${root}. It goes on from the log of ${given} entries that the server gives now, and sends ${again} of its own again as they were signed. Reason: ${reason}`
}
