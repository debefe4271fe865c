import { z } from 'zod'
import { REFRIGERANT_IDS } from './refrigerants'

/** All sets of machines are tried, so their number is bounded. */
export const MOST_COMPRESSORS = 16

const finite = z.number().finite('must be finite')
const aboveZero = finite.positive('must be above 0')
const celsius = finite.min(-100, 'must be at least -100 °C').max(100, 'must be at most 100 °C')

const compressorFields = z.object({
  tag: z.string().trim().min(1, 'must not be empty').max(200, 'must be at most 200 characters'),
  /** Capacity at the target suction, kW. */
  kw: finite.optional(),
  /** Change of that capacity per K of suction, as a part of it; by suction group where absent. */
  slopePerK: finite.min(0, 'must be at least 0').max(1, 'must be at most 1').optional(),
  /** C1 … C10 of AHRI 540 for capacity in W, in °C; `kw` is then ignored. */
  ahri540: z.array(finite).length(10, 'must hold ten coefficients').optional(),
  /** Saturated condensing temperature for the ten coefficients, °C. */
  sctC: celsius.optional(),
  running: z.boolean().optional(),
  restartAllowedInMin: finite.min(0, 'must be at least 0').optional(),
  runHours: finite.min(0, 'must be at least 0').optional(),
  driveHz: aboveZero.max(400, 'must be at most 400 Hz').optional(),
  baseHz: aboveZero.max(400, 'must be at most 400 Hz').default(60),
}).superRefine((machine, context) => {
  if (machine.ahri540 !== undefined && machine.sctC === undefined) {
    context.addIssue({ code: 'custom', path: ['sctC'], message: 'is needed with ahri540' })
  }
  if (machine.ahri540 === undefined && machine.kw === undefined) {
    context.addIssue({ code: 'custom', path: ['kw'], message: 'is needed without ahri540' })
  }
  if (machine.ahri540 === undefined && machine.kw !== undefined && machine.kw <= 0) {
    context.addIssue({ code: 'custom', path: ['kw'], message: 'must be above 0' })
  }
})

const compressorSchema = z.preprocess((value) => {
  const isGivenByCurve = typeof value === 'object' && value !== null && 'ahri540' in value && value.ahri540 !== undefined
  return isGivenByCurve ? { ...value, kw: undefined } : value
}, compressorFields)

/** A constant load, or one through the cases' conductance from their air, kW/K and °C. */
export type CoverLoad = { kw: number } | { uaKwPerK: number, airC: number }

const loadSchema = z.object({
  kw: finite.min(0, 'must be at least 0').optional(),
  uaKwPerK: aboveZero.optional(),
  airC: celsius.optional(),
}).transform(({ kw, uaKwPerK, airC }, context): CoverLoad => {
  if (kw !== undefined && uaKwPerK === undefined && airC === undefined) {
    return { kw }
  }
  if (kw === undefined && uaKwPerK !== undefined && airC !== undefined) {
    return { uaKwPerK, airC }
  }
  context.addIssue({ code: 'custom', message: 'must be either kw, or uaKwPerK with airC' })
  return z.NEVER
})

/** What `POST /api/plan/cover` accepts. */
export const coverSchema = z.object({
  refrigerant: z.enum(REFRIGERANT_IDS),
  altitudeM: finite.min(-500, 'must be at least -500 m').max(9000, 'must be at most 9000 m').default(0),
  group: z.enum(['medium', 'low']).default('medium'),
  targetSstC: celsius,
  load: loadSchema,
  lowCutOutPsig: finite,
  compressors: z.array(compressorSchema)
    .min(1, 'must hold at least one machine')
    .max(MOST_COMPRESSORS, `must hold at most ${MOST_COMPRESSORS} machines`),
}).superRefine(({ compressors }, context) => {
  const tags = compressors.map(machine => machine.tag)
  const twice = tags.findIndex((tag, index) => tags.indexOf(tag) < index)
  if (twice >= 0) {
    context.addIssue({ code: 'custom', path: ['compressors', twice, 'tag'], message: `${tags[twice]} stands here twice` })
  }
})

export type CoverInput = z.output<typeof coverSchema>
export type Compressor = CoverInput['compressors'][number]
