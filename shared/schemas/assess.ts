/**
 * The body of `POST /api/holding/assess`: one case's temperature log, to be judged by one row of a rulebook.
 * The shape alone is checked here; what depends on a rulebook or on the order of the readings is checked
 * by the holding engine's `parseAssessInput`.
 */
import { z } from 'zod'

/** The most readings that one log may hold. */
export const MOST_READINGS = 5_000

/** The coldest and the warmest value that a reading may have, °C, both allowed. */
export const COLDEST_READING_C = -60
export const WARMEST_READING_C = 80

/** The largest accuracy that a thermometer may have and still be used, in degrees of the reading's unit. */
export const LARGEST_ACCURACY = 10

export const TEMPERATURE_UNITS = ['C', 'F'] as const

/** How a temperature was taken: core or simulated product, air beside it, or its surface by infrared. */
export const READING_METHODS = ['product', 'air', 'infrared'] as const

/** Words for a value of the wrong type, so that a fault reads as a sentence. */
const words = (required: string, invalid: string) => ({ required_error: required, invalid_type_error: invalid })

/** An ISO 8601 instant with its offset; the offset is demanded because a time without one is no instant. */
const instant = z
  .string(words('is missing', 'must be a time in ISO 8601, such as 2026-03-01T02:00:00Z'))
  .datetime({ offset: true, message: 'must be a time in ISO 8601, such as 2026-03-01T02:00:00Z' })
  .refine(text => Number.isFinite(Date.parse(text)), 'must be a time in ISO 8601, such as 2026-03-01T02:00:00Z')

const number = z
  .number(words('is missing', 'must be a number'))
  .finite('must be a finite number')

export const assessReadingSchema = z.object({
  at: instant,
  value: number,
  method: z.enum(READING_METHODS, {
    errorMap: () => ({ message: 'must be product, air or infrared' }),
  }).optional(),
  /** Degrees of the reading's unit, either way. */
  accuracy: number.min(0, 'must not be negative').max(LARGEST_ACCURACY, `must be at most ${LARGEST_ACCURACY} degrees`).optional(),
}, words('is missing', 'must be a reading with at and value'))

export const assessSiteSchema = z.object({
  /** In the rulebook's own unit. */
  limit: number.optional(),
  minutes: number.positive('must be above 0').optional(),
  addAccuracy: z.boolean(words('is missing', 'must be true or false')).optional(),
  allowsMinus12: z.boolean(words('is missing', 'must be true or false')).optional(),
}, words('is missing', 'must be an object'))

export const assessSchema = z.object({
  rulebook: z.string(words('is missing', 'must be the id of a rulebook')),
  version: z.string(words('is missing', 'must be a version of the rulebook')).optional(),
  foodClass: z.string(words('is missing', 'must be a class of the rulebook')),
  unit: z.enum(TEMPERATURE_UNITS, { errorMap: () => ({ message: 'must be C or F' }) }),
  /** When control was lost. */
  darkAt: instant,
  /** The interval of rounds at the site, minutes. */
  intervalMinutes: number.positive('must be above 0'),
  readings: z
    .array(assessReadingSchema, words('is missing', 'must be a list of readings'))
    .min(1, 'must hold at least one reading')
    .max(MOST_READINGS, `must hold at most ${MOST_READINGS} readings`),
  now: instant,
  site: assessSiteSchema.optional(),
}, words('is missing', 'must be an object'))

export type AssessInput = z.infer<typeof assessSchema>
export type AssessReading = z.infer<typeof assessReadingSchema>
export type AssessSite = z.infer<typeof assessSiteSchema>
export type TemperatureUnit = (typeof TEMPERATURE_UNITS)[number]
export type ReadingMethod = (typeof READING_METHODS)[number]
