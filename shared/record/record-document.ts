import type { StoredEntry } from './entry'
import { isoTime } from './entry'
import { logRoot } from './merkle'
import type { Phase } from './phases'
import type { OutageState, Signer } from './state'

/** A whole record as one JSON document; docs/record-format.md says what each field means. */
export interface RecordDocument {
  format: 'holdover-record'
  version: 1
  outage: { id: string, code: string | null, phase: Phase, planned: boolean, site: { id: string, code: string, name: string, timeZone: string }, controller: { id: string, name: string } }
  rulebook: { id: string, version: string, name: string }
  signers: (Signer & { device: string })[]
  size: number
  /** Merkle root of all entries (RFC 9162), hexadecimal */
  root: string
  sealed: { seq: number, at: string, by: string, size: number, root: string } | null
  entries: StoredEntry[]
}

/** @param state the fold of these entries */
export function recordDocument(state: OutageState, entries: readonly StoredEntry[]): RecordDocument {
  const { site, controller, rulebook } = state.snapshot
  return {
    format: 'holdover-record',
    version: 1,
    outage: { id: state.id, code: state.code, phase: state.phase, planned: state.planned, site: { id: site.id, code: site.code, name: site.name, timeZone: site.timeZone }, controller: { id: controller.id, name: controller.name } },
    rulebook,
    signers: Object.entries(state.signers).map(([device, signer]) => ({ device, ...signer })),
    size: entries.length,
    root: logRoot(entries),
    sealed: state.sealed ? { seq: state.sealed.mark.seq, at: isoTime(state.sealed.mark.at), by: state.sealed.mark.by, size: state.sealed.size, root: state.sealed.root } : null,
    entries: [...entries],
  }
}

/** Whether the root that was sealed is that of the entries before the seal; null where there is no seal. */
export function sealHolds(state: OutageState, entries: readonly StoredEntry[]): boolean | null {
  return state.sealed ? logRoot(entries.slice(0, state.sealed.size)) === state.sealed.root : null
}
