import type { AnyEntry } from '~~/shared/record/entry'
import { ENTRIES_PER_PUSH, entryBytes, entryHash, isoTime } from '~~/shared/record/entry'
import type { BodyInput, EntryKind } from '~~/shared/record/kinds'
import { newestSchema, newestVersion } from '~~/shared/record/kinds'
import type { ChainEnd, Locks, OutboxEntry, OutboxPorts, PushResult, Refused, Settlement, Signing, Trouble } from './outbox-ports'
import { isWaiting, troubleOfFault, Unsent } from './outbox-ports'

export * from './outbox-ports'

/** Entries of one push together, characters of JSON; a single larger entry goes alone. */
const PUSH_MAX_CHARACTERS = 1_000_000
/** How often a signature is made anew when another tab took its place in the chain. */
const TRIES = 20
/** Outages that are sent side by side, so that a slow one holds nobody up. */
const SIDE_BY_SIDE = 4

/** Why an entry waits about which the server has decided nothing. */
const LATER = { signer: 'another-signer', version: 'newer', log: 'other-log' } as const

const BROKEN = 'it follows an entry that was refused before it took its place in the record'

/** What came of sending one outage: the server's answers by id, and why something still waits. */
export interface Drained { answers: Map<string, PushResult>, trouble: Trouble | null }

export type Outbox = ReturnType<typeof createOutbox>

/**
 * The outbox: entries are signed, kept, sent in order and settled by the server's answers. Pure of
 * IndexedDB, network and clock, which come as ports. It never relies on the locks: the store's
 * transactions compare before they write, and a push that is repeated is answered as the first time.
 *
 * - An entry is kept together with its place in the device's chain, both or neither.
 * - It stops waiting by a receipt or by a refusal; a refused one leaves once its signer has seen it,
 *   one with a receipt once the log kept here holds it.
 * - Only what `person` signed is sent for `person`; what the server says is another's, stays.
 */
export function createOutbox({ store, send, locks, now, newId, changed = () => {} }: OutboxPorts) {
  /**
   * Signs an entry and keeps it. Resolves only once it is on the disk.
   * @param known the chain's end as the log says it, for a device that has no chain of its own kept here, or an older one
   * @throws what the store throws where the storage is full: then nothing is kept
   */
  async function keep<K extends EntryKind>(signing: Signing, outage: string, kind: K, input: BodyInput<K>, skew: number, known: ChainEnd | null): Promise<OutboxEntry> {
    const body = newestSchema(kind).parse(input)
    const { person, device } = signing
    return locks.run(`holdover-sign-${outage}`, async () => {
      for (let tries = 0; tries < TRIES; tries++) {
        const from = await store.chain(device, outage)
        const end = known && known.n > (from?.n ?? 0) ? known : from
        const at = now()
        const entry = { v: newestVersion(kind), id: newId(at), outage, kind, body, at: isoTime(at), skew, by: person, device, n: (end?.n ?? 0) + 1, prev: end?.hash ?? null } as AnyEntry
        const signature = await signing.sign(entryBytes(entry))
        const kept = { id: entry.id, outage, person, device, n: entry.n, entry, signature, keptAt: entry.at, receipt: null, refusal: null }
        const place = await store.keep(kept, from, { n: entry.n, hash: entryHash(entry) })
        if (place === null) continue
        changed(outage)
        return { ...kept, place }
      }
      throw new Error('another tab signs here at the same time; try again')
    })
  }

  /** Sends what a person has waiting in one outage, in order, until nothing waits or something stands in the way. */
  async function drain(outage: string, person: string): Promise<Drained> {
    return locks.run(`holdover-send-${outage}`, async () => {
      const answers = new Map<string, PushResult>()
      let atOnce = ENTRIES_PER_PUSH
      for (;;) {
        const batch = fitting((await store.entries(outage)).filter(kept => kept.person === person && isWaiting(kept)), atOnce)
        if (batch.length === 0) return { answers, trouble: null }
        let results: PushResult[]
        try {
          results = await send(outage, batch.map(({ entry, signature }) => ({ entry, signature })))
        } catch (error) {
          if (!(error instanceof Unsent)) throw error
          // One entry that the server stumbles over must not hold up those before it.
          if ((error.trouble === 'failed' || error.trouble === 'too-large') && batch.length > 1) { atOnce = Math.ceil(batch.length / 2); continue }
          return { answers, trouble: error.trouble }
        }
        const { settlement, trouble } = settlementOf(outage, batch, results)
        await store.settle(settlement)
        for (const { id, receipt } of settlement.received) answers.set(id, { id, ...receipt })
        for (const { id, refusal } of settlement.refused) answers.set(id, { id, status: 'refused', ...refusal })
        if (settlement.received.length + settlement.refused.length > 0) changed(outage)
        if (trouble) return { answers, trouble }
      }
    })
  }

  /** Sends everything that a person has waiting; the trouble of one outage leaves the others alone. */
  async function drainAll(person: string): Promise<Map<string, Drained>> {
    const outages = [...new Set((await store.entries()).filter(kept => kept.person === person && isWaiting(kept)).map(kept => kept.outage))]
    const drained = new Map<string, Drained>()
    const next = async (): Promise<void> => {
      for (let outage = outages.shift(); outage !== undefined; outage = outages.shift()) {
        drained.set(outage, await drain(outage, person).catch((error: unknown): Drained => ({ answers: new Map(), trouble: troubleOfFault(error) })))
      }
    }
    await Promise.all(Array.from({ length: SIDE_BY_SIDE }, next))
    return drained
  }

  /** The signer has seen a refusal: it leaves this device. What is not refused stays. */
  async function dismiss(id: string): Promise<void> {
    const outage = await store.dismiss(id)
    if (outage !== null) changed(outage)
  }

  /** The log kept here holds all entries up to `size`: those with such receipts need be kept no longer. */
  async function collect(outage: string, size: number): Promise<void> {
    if (await store.collect(outage, size)) changed(outage)
  }

  return { keep, drain, drainAll, dismiss, collect, entries: store.entries }
}

/** The first entries that make one push. */
function fitting(waiting: OutboxEntry[], atOnce: number): OutboxEntry[] {
  let characters = 0
  const end = waiting.findIndex((kept, index) => {
    characters += JSON.stringify(kept.entry).length
    return index >= atOnce || (index > 0 && characters > PUSH_MAX_CHARACTERS)
  })
  return end < 0 ? waiting : waiting.slice(0, end)
}

/** What the answers do to the entries that were sent, in their order, up to the first that has none. */
function settlementOf(outage: string, batch: OutboxEntry[], results: PushResult[]): { settlement: Settlement, trouble: Trouble | null } {
  const settlement: Settlement = { outage, received: [], refused: [] }
  const byId = new Map(results.map(result => [result.id, result]))
  for (const [index, kept] of batch.entries()) {
    // An entry too malformed to have an id is answered in its place.
    const result = byId.get(kept.id) ?? (results[index]?.id === null ? results[index] : undefined)
    if (!result) return { settlement, trouble: 'failed' }
    if (result.status !== 'refused') {
      settlement.received.push({ id: kept.id, receipt: { status: result.status, seq: result.seq, receivedAt: result.receivedAt, why: result.why } })
      continue
    }
    if (result.later) return { settlement, trouble: LATER[result.later] }
    const { code, field, reason, recorded } = result
    settlement.refused.push({ id: kept.id, refusal: { code, field, reason, recorded }, after: recorded ? null : brokenBy(kept, code) })
  }
  return { settlement, trouble: null }
}

/**
 * A refusal that took no place in the chain: what the device signed after it can never fit. The chain
 * goes on from the entry before, or from the log where the two disagree about it (409).
 */
function brokenBy(kept: OutboxEntry, code: number): NonNullable<Refused['after']> {
  const end = code === 409 || kept.entry.prev === null ? null : { n: kept.n - 1, hash: kept.entry.prev }
  return { device: kept.device, n: kept.n, end, refusal: { code: 409, field: null, reason: BROKEN, recorded: false } }
}

/** Locks of one tab, for browsers that have none between tabs: tasks of one name run one after the other. */
export function tabLocks(): Locks {
  const tails = new Map<string, Promise<unknown>>()
  return {
    run<T>(name: string, task: () => Promise<T>): Promise<T> {
      const turn = (tails.get(name) ?? Promise.resolve()).then(task, task)
      const tail = turn.catch(() => undefined).finally(() => { if (tails.get(name) === tail) tails.delete(name) })
      tails.set(name, tail)
      return turn
    },
  }
}
