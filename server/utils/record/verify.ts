import type { StoredEntry } from '../../../shared/record/entry'
import { entryBytes } from '../../../shared/record/entry'
import type { OutageState } from '../../../shared/record/state'
import { verifierOf } from './keys'

/** Whether each entry's signature fits the key that the record names for its device, by seq. */
export function verifyEntries(state: OutageState, entries: readonly StoredEntry[]): Map<number, boolean> {
  const fits = new Map(Object.entries(state.signers).map(([device, { person, publicKey }]) => [device, { person, verifier: verifierOf(publicKey) }]))
  return new Map(entries.map(({ seq, entry, signature }) => {
    const signer = fits.get(entry.device)
    return [seq, signer !== undefined && signer.person === entry.by && signer.verifier(entryBytes(entry), signature)]
  }))
}
