import { z } from 'zod'
import { CASE_KINDS } from './case-kinds'
import { handPositionSchema, POINT_KINDS } from './point-kinds'

export const TEMPERATURE_UNITS = ['F', 'C'] as const
export type TemperatureUnit = (typeof TEMPERATURE_UNITS)[number]
export const PRESSURE_UNITS = ['psig', 'kPa', 'bar'] as const
export type PressureUnit = (typeof PRESSURE_UNITS)[number]
export const PAPERS = ['A4', 'Letter'] as const
export const STAGES = ['medium', 'low'] as const
export const DEFROST_KINDS = ['electric', 'hot-gas', 'off-time', 'none'] as const
export const INSTRUMENT_KINDS = ['product', 'air', 'infrared'] as const
export const ON_LOSS = ['on', 'off', 'holds', 'unknown'] as const

export const CODE_MAX = 12
export const SHORT_MAX = 80
export const LONG_MAX = 400
export const TAG_MAX = 32
export const GUARDS_MAX = 12
export const POINTS_MAX = 2000

const short = (what: string) => z.string({ required_error: `Enter ${what}` }).trim().min(1, `Enter ${what}`).max(SHORT_MAX, `At most ${SHORT_MAX} characters`)
const words = z.string().trim().max(LONG_MAX, `At most ${LONG_MAX} characters`).default('')
const optionalEmail = z.union([z.literal(''), z.string().trim().toLowerCase().email('This is not an e-mail address').max(254)]).default('')
const clock = z.string().regex(/^([01]\d|2[0-3]):[0-5]\d$/, 'Write a time as 02:30')
const optionalNumber = (min: number, max: number) => z.number({ invalid_type_error: 'Enter a number' }).finite().min(min, `At least ${min}`).max(max, `At most ${max}`).nullable().default(null)
const id = z.string().uuid()

/** True for a name that this runtime's time zone data knows. */
export function isTimeZone(name: string): boolean {
  try { new Intl.DateTimeFormat('en', { timeZone: name }); return true } catch { return false }
}

export const quietHoursSchema = z.object({
  days: z.array(z.number().int().min(1).max(7)).min(1, 'Choose a day'),
  start: clock,
  end: clock,
  why: z.string().trim().min(1, 'Say why').max(SHORT_MAX),
})
export type QuietHours = z.output<typeof quietHoursSchema>

export const siteSchema = z.object({
  code: z.string().trim().toUpperCase().regex(/^[A-Z0-9]{2,12}$/, 'Two to twelve letters and digits, such as Q027'),
  name: short('a name'),
  address: words,
  timeZone: z.string().refine(isTimeZone, 'No such time zone; write it as Europe/London'),
  temperatureUnit: z.enum(TEMPERATURE_UNITS),
  pressureUnit: z.enum(PRESSURE_UNITS),
  altitudeM: z.number().min(-430).max(5000).default(0),
  rulebook: z.string().min(1, 'Choose a rulebook').max(40),
  intervalMinutes: z.number().int('Whole minutes').min(1, 'At least 1 minute').max(60, 'At most 60 minutes').default(10),
  paper: z.enum(PAPERS).default('A4'),
  contactName: words,
  contactEmail: optionalEmail,
  contactPhone: z.string().trim().max(40).default(''),
  monitoringEmail: optionalEmail,
  quietHours: z.array(quietHoursSchema).max(20).default([]),
})

/** Days after which an instrument's last check counts as overdue, where a site says nothing else. */
export const INSTRUMENT_CHECK_DAYS = 90
export const CHECK_DAYS_MAX = 730
/** No time that a rulebook allows is longer, minutes. */
export const STRICTER_MINUTES_MAX = 1440

/** What a site holds stricter for one class of its rulebook; null: as the rulebook has it. */
export const stricterClassSchema = z.object({
  foodClass: z.string().min(1, 'Choose a food class').max(SHORT_MAX),
  limit: z.number({ invalid_type_error: 'Enter a number' }).finite().min(-76, 'At least −76').max(140, 'At most 140').nullable(), // in the rulebook's own unit
  minutes: z.number({ invalid_type_error: 'Enter a number' }).int('Whole minutes').min(1, 'At least 1 minute').max(STRICTER_MINUTES_MAX, `At most ${STRICTER_MINUTES_MAX} minutes`).nullable(),
}).strict()
export type StricterClass = z.output<typeof stricterClassSchema>

/** How a site judges more strictly than its rulebook, and the choice that the law itself leaves to it. */
export const siteHoldingSchema = z.object({
  addAccuracy: z.boolean(), // each reading counts with its thermometer's accuracy added
  allowsMinus12: z.boolean(),
  classes: z.array(stricterClassSchema).max(40),
}).strict()
export type SiteHolding = z.output<typeof siteHoldingSchema>

/** A site that judges as its rulebook does. */
export const PLAIN_HOLDING: SiteHolding = { addAccuracy: false, allowsMinus12: false, classes: [] }

export const siteLimitsSchema = z.object({
  holding: siteHoldingSchema,
  instrumentCheckDays: z.number({ invalid_type_error: 'Enter a number' }).int('Whole days').min(1, 'At least 1 day').max(CHECK_DAYS_MAX, `At most ${CHECK_DAYS_MAX} days`),
}).strict()
export type SiteLimits = z.output<typeof siteLimitsSchema>

export const controllerSchema = z.object({
  name: short('a name'),
  place: words,
  panelVolts: z.number().int().min(12).max(15_000).nullable().default(null),
  notes: words,
})

/** A relief valve as it is written: its tag, then its setting in bar gauge. */
export const RELIEF_VALVE = /^(\S.*?)\s+(\d{1,3}(?:[.,]\d+)?)(?:\s*bar)?$/
export const RELIEF_VALVES_MAX = 8

export const rackSchema = z.object({
  controllerId: id,
  name: short('a name'),
  refrigerant: short('a refrigerant'),
  highCutOutPsig: optionalNumber(0, 2000),
  warmestC: optionalNumber(-60, 60), // the warmest place where liquid may stand with everything off
  reliefValves: z.array(z.string().trim().regex(RELIEF_VALVE, 'A tag and its setting in bar gauge, as "RV-1 40"').max(SHORT_MAX)).max(RELIEF_VALVES_MAX).default([]),
})

export const suctionGroupSchema = z.object({
  rackId: id,
  name: short('a name'),
  stage: z.enum(STAGES),
  targetSuctionPsig: optionalNumber(-14, 800),
  lowCutOutPsig: optionalNumber(-14, 800),
})

export const defrostScheduleSchema = z.union([
  z.object({ times: z.array(clock).min(1, 'At least one time').max(24) }),
  z.object({ everyHours: z.number().int().refine(hours => 24 % hours === 0, 'Must divide 24'), offset: clock }),
])
export type DefrostSchedule = z.output<typeof defrostScheduleSchema>

export const circuitSchema = z.object({
  rackId: id,
  suctionGroupId: id.nullable().default(null),
  name: short('a name'),
  defrostKind: z.enum(DEFROST_KINDS),
  defrosts: defrostScheduleSchema.nullable().default(null),
  durationMin: z.number().int().min(0).max(240).default(30),
  dripMin: z.number().int().min(0).max(120).default(5),
})

export const caseSchema = z.object({
  controllerId: id,
  circuitId: id.nullable().default(null),
  name: short('a name'),
  kind: z.enum(CASE_KINDS),
  foodClass: short('a food class'),
  usualC: z.number({ invalid_type_error: 'Enter a number' }).min(-60).max(30),
  tauHours: optionalNumber(0.1, 200),
  limitStricter: optionalNumber(-60, 60),
  runsAlone: z.boolean().default(false),
})

export const pointSchema = z.object({
  controllerId: id,
  tag: z.string().trim().min(1, 'Enter a tag').max(TAG_MAX, `At most ${TAG_MAX} characters`).regex(/^[\p{L}\p{N}][\p{L}\p{N} ._/-]*$/u, 'Letters, digits, spaces and . _ / - only'),
  kind: z.enum(POINT_KINDS),
  name: short('a name'),
  address: z.string().trim().max(SHORT_MAX).default(''),
  place: words,
  means: words,
  guards: z.array(z.string().trim().min(1).max(SHORT_MAX)).max(GUARDS_MAX).default([]),
  rackId: id.nullable().default(null),
  suctionGroupId: id.nullable().default(null),
  circuitId: id.nullable().default(null),
  caseIds: z.array(id).max(200).default([]),
  drives: z.string().trim().max(TAG_MAX).nullable().default(null),
  ratedA: optionalNumber(0, 5000),
  capacityKw: optionalNumber(0, 5000),
  minOffMin: optionalNumber(0, 240),
  hand: handPositionSchema.nullable().default(null),
  onLoss: z.enum(ON_LOSS).default('unknown'),
  throughOff: z.boolean().default(false),
})

export const instrumentSchema = z.object({
  name: short('a name'),
  kind: z.enum(INSTRUMENT_KINDS),
  serial: z.string().trim().max(SHORT_MAX).default(''),
  accuracyC: z.number({ invalid_type_error: 'Enter a number' }).min(0).max(10),
  lastCheckOn: z.string().date('Write a date as 2026-11-30').nullable().default(null),
})
