import { z } from 'zod'

/** Longest free text in an entry, characters. */
export const WORDS_MAX = 2000
/** Largest canonical entry that is taken, bytes: an opening with 2,000 points fits. */
export const ENTRY_MAX_BYTES = 2_000_000

export const uuid = z.string().uuid()
export const tag = z.string().min(1).max(32)
export const time = z.string().regex(/^\d{4}-\d{2}-\d{2}T\d{2}:\d{2}:\d{2}\.\d{3}Z$/, 'A time in UTC with milliseconds').refine(text => !Number.isNaN(Date.parse(text)), 'This is not a time')
export const fileHash = z.string().regex(/^[0-9a-f]{64}$/, 'A file is named by its SHA-256')
export const photos = z.array(fileHash).max(6).default([])

/** Free text that may be left empty. */
export const words = z.string().trim().max(WORDS_MAX, `At most ${WORDS_MAX} characters`).default('')
/** Free text that must say something. */
export const saying = (what: string) => z.string({ required_error: what }).trim().min(1, what).max(WORDS_MAX, `At most ${WORDS_MAX} characters`)
export const number = (min: number, max: number) => z.number({ invalid_type_error: 'Enter a number', required_error: 'Enter a number' }).finite().min(min, `At least ${min}`).max(max, `At most ${max}`)
