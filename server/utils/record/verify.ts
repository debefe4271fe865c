import { setImmediate as others } from 'node:timers/promises'
import type { StoredEntry } from '../../../shared/record/entry'
import { entryBytes } from '../../../shared/record/entry'
import type { OutageState } from '../../../shared/record/state'
import { verifierOf } from './keys'

/** Entries between two turns of others: about a hundredth of a second. */
const AT_ONCE = 25

/** Whether each entry's signature fits the key that the record names for its device, by seq. Others have their turn meanwhile. */
export async function verifyEntries(state: OutageState, entries: readonly StoredEntry[]): Promise<Map<number, boolean>> {
  const fits = new Map(Object.entries(state.signers).map(([device, { person, publicKey }]) => [device, { person, verifier: verifierOf(publicKey) }]))
  const verified = new Map<number, boolean>()
  for (const { seq, entry, signature } of entries) {
    const signer = fits.get(entry.device)
    verified.set(seq, signer !== undefined && signer.person === entry.by && signer.verifier(entryBytes(entry), signature))
    if (verified.size % AT_ONCE === 0) await others()
  }
  return verified
}
