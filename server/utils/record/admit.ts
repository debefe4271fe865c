import { isDeepStrictEqual } from 'node:util'
import { canonicalText } from '../../../shared/record/canonical'
import type { AnyEntry, Standing } from '../../../shared/record/entry'
import { happenedAt, signedEntrySchema } from '../../../shared/record/entry'
import { isEntryKind, isServerKind, schemaOf } from '../../../shared/record/kinds'
import { ENTRY_MAX_BYTES } from '../../../shared/record/kinds/common'
import type { OutageState } from '../../../shared/record/state'
import type { Person } from '../access'
import { firstFault } from '../errors'
import { verifyBytes } from './keys'
import type { Known } from './known'
import type { SignedText } from './signed-text'
import { signedTextOf } from './signed-text'

/** What becomes of one pushed entry. */
export type PushResult
  = | { id: string, status: Standing, seq: number, receivedAt: string, why: string[] }
    | { id: string | null, status: 'refused', code: 403 | 409 | 413 | 422, field: string | null, reason: string, /** its place in the device's chain is taken */ recorded: boolean, /** nothing is decided about it: it is another's to send, newer than this server, or would build on another log than its device saw, and waits on the device */ later?: 'signer' | 'version' | 'log' }

export type Refusal = Extract<PushResult, { status: 'refused' }>

/** Where an entry got to: a refusal or an earlier answer, or read, verified and ready to be judged. */
export type Admitted
  = | { done: PushResult }
  /** validly signed, but its body is wrong: refused, and its place in the chain is taken */
    | { faulty: AnyEntry, hash: string, refusal: Refusal }
    | { entry: AnyEntry, signed: SignedText, signature: string, /** why it is questioned though it fits, in words */ doubt: string | null }

export function refuse(id: string | null, code: Refusal['code'], reason: string, field: string | null = null): Refusal {
  return { id, status: 'refused', code, field, reason, recorded: false }
}

/** Reads and verifies one pushed item: shape, signer, device, signature, replay, chain, body. Pure: what the database says comes as `known`. */
export function admit(known: Known, person: Person, state: OutageState, item: unknown, at: string): Admitted {
  const parsed = signedEntrySchema.safeParse(item)
  if (!parsed.success) {
    const { field, reason } = firstFault(parsed.error)
    return { done: refuse(idOf(item), 422, reason, field ? `${at}.${field}` : at) }
  }
  const entry = (item as { entry: AnyEntry }).entry
  const { signature } = parsed.data
  const wrong = (code: Refusal['code'], reason: string, field: string | null = null): Admitted => ({ done: refuse(entry.id, code, reason, field) })
  if (entry.outage !== state.id) return wrong(422, 'The entry belongs to another outage', `${at}.entry.outage`)
  if (entry.by !== person.id) return { done: { ...refuse(entry.id, 403, 'An entry is sent by the person who signed it'), later: 'signer' } }
  const signed = signedText(entry)
  if (signed === null) return wrong(422, 'The entry has no canonical form', `${at}.entry`)
  if (signed.bytes.length > ENTRY_MAX_BYTES) return wrong(413, `An entry takes at most ${ENTRY_MAX_BYTES} bytes`)

  const earlier = earlierAnswer(known, entry, signed.hash, at)
  if (earlier) return { done: earlier }

  const device = known.devices.get(entry.device)
  if (!device) return wrong(403, 'This device is not enrolled for you')
  if (!verifyBytes(signed.bytes, signature, device.publicKey)) return wrong(422, 'The signature does not fit the entry', `${at}.signature`)
  const revoked = device.revokedAt?.getTime() ?? null
  if (revoked !== null && happenedAt(entry) >= revoked) return wrong(403, `This device was revoked at ${utcWords(revoked)}, before this was signed`)

  const chain = state.chain[entry.device]
  if (entry.n !== (chain?.n ?? 0) + 1) return wrong(409, `This device's entry ${entry.n} cannot come after its entry ${chain?.n ?? 0}`, `${at}.entry.n`)
  if (entry.prev !== (chain?.hash ?? null)) return wrong(409, 'The entry does not name the hash of the one before it', `${at}.entry.prev`)
  return checkBody(entry, signed, signature, at, revoked === null ? null : lateDoubt(revoked))
}

/**
 * Why an entry is questioned that a revoked device signed before it was revoked: the signature is good, but
 * the time is the device's word, and whoever found a lost one could give another. @param revoked Unix ms
 */
function lateDoubt(revoked: number): string {
  return `signed by a device that was revoked at ${utcWords(revoked)}, and it came after that`
}

const utcWords = (ms: number) => `${new Date(ms).toISOString().slice(0, 16).replace('T', ' ')} UTC`

function checkBody(entry: AnyEntry, signed: SignedText, signature: string, at: string, doubt: string | null): Admitted {
  const faulty = (reason: string, field: string): Admitted => ({ faulty: entry, hash: signed.hash, refusal: { id: entry.id, status: 'refused', code: 422, field, reason, recorded: true } })
  if (!isEntryKind(entry.kind) || isServerKind(entry.kind)) return faulty(`Nobody signs an entry of the kind "${String(entry.kind)}"`, `${at}.entry.kind`)
  const schema = schemaOf(entry.kind, entry.v)
  // A newer version than this server knows waits on the phone: nothing is recorded.
  if (!schema) return { done: { ...refuse(entry.id, 422, `This server does not know version ${entry.v} of "${entry.kind}" yet`, `${at}.entry.v`), later: 'version' } }
  if (holdsNul(entry.body)) return faulty('A text holds the character NUL', `${at}.entry.body`)
  const body = schema.safeParse(entry.body)
  if (!body.success) {
    const { field, reason } = firstFault(body.error)
    return faulty(reason, `${at}.entry.body${field ? `.${field}` : ''}`)
  }
  // Comparing the values is much faster than writing them out; only what differs in a value may still be written alike.
  if (!isDeepStrictEqual(body.data, entry.body) && canonicalText(body.data) !== canonicalText(entry.body)) return faulty('The body is not written as its kind lays down (a default left out, or spaces at an end)', `${at}.entry.body`)
  return { entry, signed, signature, doubt }
}

/** NUL stands in no text that a person writes, and the database keeps none. */
function holdsNul(value: unknown): boolean {
  if (typeof value === 'string') return value.includes('\0')
  return typeof value === 'object' && value !== null && Object.values(value).some(holdsNul)
}

function signedText(entry: AnyEntry): SignedText | null {
  try { return signedTextOf(entry) } catch { return null }
}

/** The first answer to the same bytes; 409 where the id came with other bytes. */
function earlierAnswer({ answers }: Known, entry: AnyEntry, hash: string, at: string): PushResult | null {
  const earlier = answers.get(entry.id)
  if (!earlier) return null
  if (earlier.hash !== hash || earlier.outage !== entry.outage) return refuse(entry.id, 409, 'This id was used for another entry')
  const { result } = earlier
  return result.status === 'refused' && result.field !== null ? { ...result, field: `${at}.${result.field}` } : result
}

function idOf(item: unknown): string | null {
  const id = (item as { entry?: { id?: unknown } } | null)?.entry?.id
  return typeof id === 'string' ? id.slice(0, 64) : null
}
