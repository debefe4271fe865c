import type { StoredEntry } from '../../../shared/record/entry'
import { entryBytes } from '../../../shared/record/entry'
import type { OutageState } from '../../../shared/record/state'
import { verifyBytes } from './keys'

/** Whether each entry's signature fits the key that the record names for its device, by seq. */
export function verifyEntries(state: OutageState, entries: readonly StoredEntry[]): Map<number, boolean> {
  return new Map(entries.map(({ seq, entry, signature }) => {
    const signer = state.signers[entry.device]
    return [seq, signer !== undefined && signer.person === entry.by && verifyBytes(entryBytes(entry), signature, signer.publicKey)]
  }))
}
