import { canonicalText } from './canonical'
import type { Checkpoint } from './checkpoint'
import type { StoredEntry } from './entry'
import { isoTime } from './entry'
import type { BodyOf } from './kinds'
import { logRoot } from './merkle'
import type { Phase } from './phases'
import { acceptedOf } from './record-lines'
import type { OutageState } from './state'
import { FOLD_VERSION } from './state'

export const RECORD_VERSION = 2

/** A whole record as one JSON document; docs/record-format.md says what each field means. */
export interface RecordDocument {
  format: 'holdover-record'
  version: typeof RECORD_VERSION
  /** what wrote it: the program, and the meaning of its fold */
  versions: { program: string, fold: number }
  outage: { id: string, code: string | null, phase: Phase, planned: boolean, site: { id: string, code: string, name: string, timeZone: string }, controller: { id: string, name: string } }
  /** `data`: the rulebook itself, or null where this program no longer has that version */
  rulebook: { id: string, version: string, name: string, data: unknown }
  signers: ({ seq: number } & BodyOf<'signer-named'>)[]
  refusals: ({ seq: number } & BodyOf<'entry-refused'>)[]
  size: number
  /** Merkle root of all entries (RFC 9162), hexadecimal */
  root: string
  sealed: { seq: number, at: string, by: string, size: number, root: string } | null
  checkpoints: Checkpoint[]
  entries: StoredEntry[]
}

/** What a record carries beside its log. */
export interface RecordBeside { program: string, rulebook: unknown, checkpoints: readonly Checkpoint[] }

/** @param state the fold of these entries */
export function recordDocument(state: OutageState, entries: readonly StoredEntry[], beside: RecordBeside): RecordDocument {
  const { site, controller, rulebook } = state.snapshot
  return {
    format: 'holdover-record',
    version: RECORD_VERSION,
    versions: { program: beside.program, fold: FOLD_VERSION },
    outage: { id: state.id, code: state.code, phase: state.phase, planned: state.planned, site: { id: site.id, code: site.code, name: site.name, timeZone: site.timeZone }, controller: { id: controller.id, name: controller.name } },
    rulebook: { ...rulebook, data: beside.rulebook },
    signers: acceptedOf(entries, 'signer-named').map(({ stored: { seq }, entry }) => ({ seq, ...entry.body })),
    refusals: acceptedOf(entries, 'entry-refused').map(({ stored: { seq }, entry }) => ({ seq, ...entry.body })),
    size: entries.length,
    root: logRoot(entries),
    sealed: state.sealed ? { seq: state.sealed.mark.seq, at: isoTime(state.sealed.mark.at), by: state.sealed.mark.by, size: state.sealed.size, root: state.sealed.root } : null,
    checkpoints: [...beside.checkpoints],
    entries: [...entries],
  }
}

/**
 * The document as text: a line for each field, and for each checkpoint and entry a line of its own in
 * canonical JSON (RFC 8785), so that what was hashed and signed can be cut out with a text editor.
 */
export function recordText(document: RecordDocument): string {
  const { checkpoints, entries, ...head } = document
  const list = (name: string, items: readonly unknown[]) => items.length === 0 ? `"${name}":[]` : `"${name}":[\n${items.map(canonicalText).join(',\n')}\n]`
  const fields = Object.entries(head).map(([name, value]) => `"${name}":${canonicalText(value)}`)
  return `{\n${[...fields, list('checkpoints', checkpoints), list('entries', entries)].join(',\n')}\n}\n`
}

/** Whether the root that was sealed is that of the entries before the seal; null where there is no seal. */
export function sealHolds(state: OutageState, entries: readonly StoredEntry[]): boolean | null {
  return state.sealed ? logRoot(entries.slice(0, state.sealed.size)) === state.sealed.root : null
}
