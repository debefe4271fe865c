import type { Checkpoint } from '../../../shared/record/checkpoint'
import type { StoredEntry } from '../../../shared/record/entry'
import { foldLog } from '../../../shared/record/fold'
import { PROGRAM_VERSION } from '../../../shared/program-version'
import { recordDocument, recordText, sealHolds } from '../../../shared/record/record-document'
import type { OutageState } from '../../../shared/record/state'
import { summaryOf } from '../../../shared/record/summary'
import type { FontBytes } from '../../pdf/fonts'
import { readFonts } from '../../pdf/fonts'
import type { RecordPaper } from '../../pdf/record'
import type { PaperVariant } from '../../pdf/variant'
import type { Queries } from '../database'
import { heldFiles } from '../files/keep'
import { flattened, printed } from '../files/picture'
import { fileStorage, readBytes } from '../files/storage'
import { rulebookById } from '../holding'
import { recordFacts } from '../hold/record-facts'
import type { OutageRow } from './log'
import { readCheckpoints, readEntries } from './log'
import { verifyEntries } from './verify'

/** A record read from its log alone: no cached fold stands between the entries and the reader. */
export async function readRecord(db: Queries, outage: OutageRow): Promise<{ entries: StoredEntry[], state: OutageState }> {
  const entries = await readEntries(db, outage.id)
  return { entries, state: foldLog(outage.id, entries) }
}

/** record.json: the log with all that a verifier needs. */
export async function readRecordText(db: Queries, outage: OutageRow): Promise<string> {
  const { entries, state } = await readRecord(db, outage)
  return textOf(state, entries, await readCheckpoints(db, outage.id))
}

function textOf(state: OutageState, entries: StoredEntry[], checkpoints: Checkpoint[]): string {
  const { id, version } = state.snapshot.rulebook
  // An entry may have come between the two readings.
  const within = checkpoints.filter(({ statement }) => statement.size <= entries.length)
  return recordText(recordDocument(state, entries, { program: PROGRAM_VERSION, rulebook: rulebookById(id, version) ?? null, checkpoints: within }))
}

/** All that the PDF is made from. Its date is that of the last entry, so that the same record makes the same bytes. */
export async function readPaper(db: Queries, outage: OutageRow, variant: PaperVariant = 'record'): Promise<RecordPaper> {
  const { entries, state } = await readRecord(db, outage)
  const now = Date.parse(entries.at(-1)?.receivedAt ?? outage.openedAt.toISOString())
  const held = await heldFiles(db, outage.id)
  const summary = summaryOf(state, entries, recordFacts(state, now), now)
  const drawings = new Map<string, Uint8Array>()
  for (const { drawing, stands } of summary.signatures) {
    const bytes = stands && held.has(drawing) ? await readBytes(fileStorage(), drawing) : null
    if (bytes) drawings.set(drawing, await flattened(bytes))
  }
  const record = variant === 'record' ? textOf(state, entries, await readCheckpoints(db, outage.id)) : ''
  return { state, entries, summary, now, verified: await verifyEntries(state, entries), sealHolds: sealHolds(state, entries), drawings, held, picture: printedPhoto, variant, record }
}

/** A photo from the store, small; null where it cannot be had, which must not cost the reader the rest of the paper. */
async function printedPhoto(hash: string): Promise<Uint8Array | null> {
  try {
    const bytes = await readBytes(fileStorage(), hash)
    return bytes && await printed(bytes)
  } catch {
    return null
  }
}

let fonts: Promise<FontBytes> | null = null

/** The fonts that were built into the server. */
export function paperFonts(): Promise<FontBytes> {
  fonts ??= readFonts(async (name) => {
    const bytes: unknown = await useStorage(name.startsWith('ibm-plex-mono') ? 'assets:mono' : 'assets:fonts').getItemRaw(name)
    if (bytes instanceof Uint8Array) return bytes
    return bytes instanceof ArrayBuffer ? new Uint8Array(bytes) : null
  })
  return fonts
}

/** The name of a downloaded file: the outage's code where it has one. */
export function recordFileName(outage: { code: string }, extension: 'pdf' | 'csv' | 'json'): string {
  return `${outage.code.replace(/[^A-Za-z0-9-]/g, '-')}.${extension}`
}
