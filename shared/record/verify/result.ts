import type { BodyOf } from '../kinds'

/** What a check can say of a record; VERDICT_WORDS are the words for it. */
export type Verdict = 'the-sealed-one' | 'whole' | 'not-sealed' | 'another' | 'fails' | 'no-record'

export const VERDICT_WORDS: Record<Verdict, string> = {
  'the-sealed-one': 'the one that was sealed',
  'whole': 'whole in itself',
  'not-sealed': 'whole in itself, not sealed',
  'another': 'whole in itself, but not the one that was sealed',
  'fails': 'fails',
  'no-record': 'not a record',
}

/** Where a record fails: the entry by seq and id (null where no single entry is concerned), the field, and why in words. */
export interface RecordFault { seq: number | null, id: string | null, field: string, why: string }

export interface VerifiedSigner extends BodyOf<'signer-named'> { seq: number, entries: number }

export interface VerifiedSeal { seq: number, id: string, at: string, by: string, name: string, size: number, root: string }

/** What was read on the way, for whoever looks at the result. */
export interface VerifiedFacts {
  version: number
  outage: { id: string, code: string | null, site: string, timeZone: string, controller: string }
  size: number
  /** Merkle root of all entries, worked out here */
  root: string
  checkpoints: number
  seal: VerifiedSeal | null
  /** entries behind the seal, which it does not cover */
  afterSeal: number
  signers: VerifiedSigner[]
}

export interface Verification {
  verdict: Verdict
  /** in the order of the log; the first is the one to name */
  faults: RecordFault[]
  facts: VerifiedFacts | null
  /** what the reader should know beside the verdict */
  notes: string[]
}

/** A fault in a sentence. */
export function faultWords({ seq, id, field, why }: RecordFault): string {
  return seq === null ? `${field}: ${why}` : `entry ${seq}${id ? ` (${id})` : ''}, ${field}: ${why}`
}
