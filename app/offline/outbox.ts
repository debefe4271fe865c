import type { AnyEntry } from '~~/shared/record/entry'
import { entryBytes, entryHash, isoTime } from '~~/shared/record/entry'
import type { BodyInput, EntryKind } from '~~/shared/record/kinds'
import { newestSchema, newestVersion } from '~~/shared/record/kinds'
import { uuidv7 } from '~~/shared/record/uuid'
import type { KeptEntry, KeptKey } from './database'
import { chainKey, openKept, STRICT } from './database'
import { signWith } from './keys'

/** Answers of the server to one pushed entry. */
export interface PushResult { id: string | null, status: 'accepted' | 'questioned' | 'refused', code?: number, field?: string | null, reason?: string, recorded?: boolean, why?: string[], seq?: number, receivedAt?: string }
export type Send = (outage: string, entries: { entry: AnyEntry, signature: string }[]) => Promise<PushResult[]>

/** The server could not be asked: the network or the database is away. What was signed stays kept. */
export class Unreachable extends Error {}

/**
 * Signs an entry and keeps it on this device, in one transaction with its place in the device's
 * chain. Resolves only once it is on the disk.
 * @param known the chain's end as the log says it, for a device that has no chain of its own kept here
 */
export async function keepSigned<K extends EntryKind>(key: KeptKey, outage: string, kind: K, input: BodyInput<K>, skew: number, known: { n: number, hash: string } | null): Promise<KeptEntry> {
  const body = newestSchema(kind).parse(input)
  return navigator.locks.request(`holdover-sign-${outage}`, async () => {
    const database = await openKept()
    const end = await database.get('chains', chainKey(key.device, outage)) ?? known
    const now = Date.now()
    const entry = { v: newestVersion(kind), id: uuidv7(now), outage, kind, body, at: isoTime(now), skew, by: key.person, device: key.device, n: (end?.n ?? 0) + 1, prev: end?.hash ?? null } as AnyEntry
    const signature = await signWith(key, entryBytes(entry))
    const kept: KeptEntry = { id: entry.id, outage, person: key.person, device: key.device, n: entry.n, entry, signature, keptAt: entry.at, refusal: null }
    const tx = database.transaction(['outbox', 'chains'], 'readwrite', STRICT)
    await Promise.all([
      tx.objectStore('outbox').put(kept),
      tx.objectStore('chains').put({ n: entry.n, hash: entryHash(entry) }, chainKey(key.device, outage)),
      tx.done,
    ])
    return kept
  })
}

/** What is kept for an outage, in the order in which it was signed. */
export async function keptEntries(outage: string): Promise<KeptEntry[]> {
  const all = await (await openKept()).getAllFromIndex('outbox', 'outage', outage)
  return all.sort((a, b) => a.keptAt.localeCompare(b.keptAt) || a.n - b.n)
}

/** Everything of one person that has no receipt yet. */
export async function allKept(person: string): Promise<KeptEntry[]> {
  return (await (await openKept()).getAll('outbox')).filter(kept => kept.person === person && kept.refusal === null)
}

const PER_PUSH = 50

/**
 * Sends what the person has kept for an outage, in order; what has its receipt leaves, what is
 * refused stays until its signer has seen it. Another person's entries are never sent.
 * @returns the server's answers, by id
 * @throws Unreachable
 */
export async function drain(outage: string, person: string, send: Send): Promise<Map<string, PushResult>> {
  return navigator.locks.request(`holdover-send-${outage}`, async () => {
    const answers = new Map<string, PushResult>()
    for (;;) {
      const waiting = (await keptEntries(outage)).filter(kept => kept.person === person && kept.refusal === null).slice(0, PER_PUSH)
      if (waiting.length === 0) return answers
      const results = await send(outage, waiting.map(({ entry, signature }) => ({ entry, signature })))
      for (const [index, kept] of waiting.entries()) await settle(kept, results[index], answers)
    }
  })
}

async function settle(kept: KeptEntry, result: PushResult | undefined, answers: Map<string, PushResult>): Promise<void> {
  if (!result) throw new Unreachable('The server gave no answer to an entry')
  answers.set(kept.id, result)
  const database = await openKept()
  const tx = database.transaction(['outbox', 'chains'], 'readwrite', STRICT)
  if (result.status !== 'refused') await tx.objectStore('outbox').delete(kept.id)
  else {
    await tx.objectStore('outbox').put({ ...kept, refusal: { code: result.code ?? 422, field: result.field ?? null, reason: result.reason ?? 'Refused' } })
    // Not recorded: the chain goes on from what the log says, which the next signature reads.
    if (!result.recorded) await tx.objectStore('chains').delete(chainKey(kept.device, kept.outage))
  }
  await tx.done
}

/** The signer has seen a refusal: it leaves this device. */
export async function dismissRefused(id: string): Promise<void> {
  await (await openKept()).delete('outbox', id)
}
