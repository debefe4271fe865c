import { z } from 'zod'
import { WORDS_MAX } from '../record/kinds/common'

/** How long records are kept after their last entry where nobody has set it otherwise, years. */
export const RETENTION_YEARS = 2
export const RETENTION_MAX_YEARS = 30

const wholeYears = z.number({ invalid_type_error: 'Enter a number of years', required_error: 'Enter a number of years' })
  .int('Whole years').min(1, 'At least 1 year').max(RETENTION_MAX_YEARS, `At most ${RETENTION_MAX_YEARS} years`)

/** How long the organisation keeps records. */
export const retentionSchema = z.object({ years: wholeYears }).strict()
/** How long one site keeps them where that is longer; null: as the organisation does. */
export const siteRetentionSchema = z.object({ years: wholeYears.nullable() }).strict()

/** Puts a record under legal hold, or lifts it. */
export const holdSchema = z.object({
  held: z.boolean(),
  reason: z.string({ required_error: 'Say why' }).trim().min(1, 'Say why').max(WORDS_MAX, `At most ${WORDS_MAX} characters`),
}).strict()

export interface SiteRetention { id: string, code: string, name: string, years: number | null }
/** What an administrator sets; every site, with its own years where it keeps longer. */
export interface RetentionSettings { years: number, sites: SiteRetention[] }

/** A legal hold that is or was on a record; times in ISO 8601 UTC. */
export interface HoldItem { id: string, by: string, at: string, reason: string, lifted: { by: string, at: string, reason: string } | null }

/** How one record stands to its retention. */
export interface RecordRetention {
  years: number
  /** it is sealed or called off: until then its retention has not begun */
  ended: boolean
  /** from when on it may be deleted, ISO 8601 UTC; null while it has not ended */
  over: string | null
  held: boolean
  /** the latest first */
  holds: HoldItem[]
  /** photos and drawings that the server holds of it */
  files: number
}

/** A record whose retention is over. */
export interface DueItem { id: string, code: string, site: { id: string, name: string, timeZone: string }, controller: string, phase: 'sealed' | 'called-off', size: number, endedAt: string, over: string, held: boolean }
export interface DuePage { items: DueItem[], next: string | null }

/** A record that was deleted: what stays of it. */
export interface DeletedItem { id: string, code: string, site: { id: string, name: string, timeZone: string }, controller: string, size: number, deletedAt: string, by: string, reason: string }
export interface DeletedPage { items: DeletedItem[], next: string | null }
