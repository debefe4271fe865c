import { z } from 'zod'
import { recordFilterSchema } from './record-filter'

/** What an export is: each record as PDF in one ZIP with an index, all readings as CSV, or a record a line as JSON. */
export const EXPORT_KINDS = ['pdf', 'readings', 'json-lines'] as const
export type ExportKind = (typeof EXPORT_KINDS)[number]

export const EXPORT_KIND_WORDS: Record<ExportKind, string> = {
  'pdf': 'PDF files in a ZIP, with an index',
  'readings': 'Readings as CSV',
  'json-lines': 'Records as JSON lines',
}

/** So many records at most; PDF takes the longest. */
export const EXPORT_RECORDS_MAX: Record<ExportKind, number> = { 'pdf': 1000, 'readings': 5000, 'json-lines': 5000 }
/** So many that are not finished, a person. */
export const EXPORTS_OPEN_MAX = 3
/** Days for which a finished file is kept. */
export const EXPORT_DAYS = 7

export const EXPORT_STATES = ['waiting', 'working', 'done', 'failed', 'cancelled', 'expired'] as const
export type ExportState = (typeof EXPORT_STATES)[number]

/** An export as its owner sees it; times in ISO 8601, UTC. */
export interface ExportItem {
  id: string
  kind: ExportKind
  state: ExportState
  fileName: string
  /** records in it, and how many of them are done */
  total: number
  done: number
  /** of the finished file */
  bytes: number | null
  /** why it failed, in words */
  fault: string | null
  askedAt: string
  doneAt: string | null
  expiresAt: string | null
}

/** What is asked for: as what, and the search that finds the records, as it stands in an address. */
export const exportAskedSchema = z.object({
  kind: z.enum(EXPORT_KINDS, { errorMap: () => ({ message: `One of ${EXPORT_KINDS.join(', ')}` }) }),
  filter: recordFilterSchema,
}).strict()
export interface ExportAsked { kind: ExportKind, filter: Record<string, string | undefined> }
