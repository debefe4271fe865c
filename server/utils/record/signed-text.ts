import { createHash } from 'node:crypto'
import { canonicalText } from '../../../shared/record/canonical'
import type { AnyEntry, StoredEntry } from '../../../shared/record/entry'

/** What is signed of an entry, written out once: all that is done with it goes by this. */
export interface SignedText { /** canonical JSON */ text: string, bytes: Uint8Array, /** SHA-256 of the bytes, hexadecimal */ hash: string }

/** @throws TypeError where the entry has no canonical form */
export function signedTextOf(entry: AnyEntry): SignedText {
  const text = canonicalText(entry)
  const bytes = Buffer.from(text)
  return { text, bytes, hash: createHash('sha256').update(bytes).digest('hex') }
}

const LEAF = Buffer.of(0)

/**
 * The hash of a stored entry as a leaf of its log's tree, as `storedLeaf` has it, without writing the entry out again:
 * in the canonical JSON of a stored entry the name `entry` comes before all that the server added.
 */
export function leafOf({ text }: SignedText, { receivedAt, seq, signature, standing, why }: StoredEntry): Uint8Array {
  const added = canonicalText({ receivedAt, seq, signature, standing, why })
  return createHash('sha256').update(LEAF).update(`{"entry":${text},${added.slice(1)}`).digest()
}
