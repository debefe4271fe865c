import { z } from 'zod'
import { handPositionSchema } from '../schemas/point-kinds'
import { stepsSchema } from '../schemas/work'
import { ASSUMPTIONS, MEASURE_KINDS } from '../schemas/plan-facts'
import { saying, tag, time, uuid, words } from './kinds/common'

const orderLine = z.object({ tag, after: z.array(tag).max(2000), because: z.string().max(400) }).strict()

const planShape = {
  startsAt: time.nullable(), // when points begin to go in hand; null for an unplanned outage
  workKind: z.object({ id: uuid.nullable(), name: z.string().min(1).max(80) }).strict(),
  steps: stepsSchema,
  rollBack: stepsSchema,
  /** minutes: total of all steps, and of those without control; mean and the time by which it is over 19 times in 20 */
  duration: z.object({ totalMean: z.number().min(0), darkMean: z.number().min(0), dark19in20: z.number().min(0), rollBack19in20: z.number().min(0) }).strict(),
  points: z.array(z.object({
    tag,
    hand: handPositionSchema,
    reason: words, // needed where the position goes against a rule or differs from what was proposed
  }).strict()).max(2000),
  order: z.array(orderLine).max(2000),
  cases: z.array(z.object({ id: uuid, touched: z.boolean(), reason: words }).strict()).max(400),
  /** points found in hand before anyone began */
  census: z.array(z.object({ tag, words: saying('Say how it was found') }).strict()).max(2000),
  watchDefrosts: z.boolean(), // one defrost of each kind is watched while settling
  note: words,
}

/** A plan of version 1: measures in words alone, and nothing that was assumed. */
export const planSchemaV1 = z.object({ ...planShape, measures: z.array(saying('Say what is done')).max(20) }).strict()

/** What is done so that product outlasts the work. `factor`: so many times as long do its cases hold, an estimate. */
export const measureSchema = z.object({
  kind: z.enum(MEASURE_KINDS),
  caseIds: z.array(uuid).max(400),
  factor: z.number().finite().min(1).max(10),
  words,
}).strict()
export type Measure = z.output<typeof measureSchema>

/** A figure that the technician knows better than the product: which, of what, how much, and why. */
export const assumptionSchema = z.object({
  about: z.enum(ASSUMPTIONS),
  id: uuid.nullable(), // of the case or suction group; null where it is the plan's own
  value: z.number().finite().min(-60).max(100_000),
  reason: saying('Say why'),
}).strict()
export type Assumption = z.output<typeof assumptionSchema>

/** What the plan says: the points touched with their hand positions, their order, the cases, the work, and what was assumed. */
export const planSchema = z.object({
  ...planShape,
  measures: z.array(measureSchema).max(40),
  assumptions: z.array(assumptionSchema).max(900),
}).strict()

export type Plan = z.output<typeof planSchema>
