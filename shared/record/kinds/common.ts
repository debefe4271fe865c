import { z } from 'zod'

/** Longest free text in an entry, characters. */
export const WORDS_MAX = 2000
/** Largest canonical entry that is taken, bytes: an opening with 2,000 points fits. */
export const ENTRY_MAX_BYTES = 2_000_000

export const uuid = z.string().uuid()
/** Points are looked up by tag, so a tag is none of the names that every object has. */
export const tag = z.string().min(1).max(32).refine(text => !(text in Object.prototype), 'This cannot be a tag')
/** A moment in UTC with milliseconds that the calendar has, from 1970 to 2199: 2026-03-03T02:24:00.000Z. */
export const time = z.string().regex(/^(19[7-9]|2[01]\d)\d-\d{2}-\d{2}T\d{2}:\d{2}:\d{2}\.\d{3}Z$/, 'A time is UTC with milliseconds, such as 2026-03-03T02:24:00.000Z').refine(isMoment, 'This is not a time')
export const fileHash = z.string().regex(/^[0-9a-f]{64}$/, 'A file is named by its SHA-256')
export const photos = z.array(fileHash).max(6).default([])

/** Free text that may be left empty. */
export const words = z.string().trim().max(WORDS_MAX, `At most ${WORDS_MAX} characters`).default('')
/** Free text that must say something. */
export const saying = (what: string) => z.string({ required_error: what }).trim().min(1, what).max(WORDS_MAX, `At most ${WORDS_MAX} characters`)
export const number = (min: number, max: number) => z.number({ invalid_type_error: 'Enter a number', required_error: 'Enter a number' }).finite().min(min, `At least ${min}`).max(max, `At most ${max}`)

/** Whether a time names a moment as the calendar writes it: not 30 February, not 24:00. */
function isMoment(text: string): boolean {
  const ms = Date.parse(text)
  return !Number.isNaN(ms) && new Date(ms).toISOString() === text
}
