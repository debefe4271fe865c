import { z } from 'zod'
import { handPositionSchema } from '../schemas/point-kinds'
import { stepsSchema } from '../schemas/work'
import { saying, tag, time, uuid, words } from './kinds/common'

const orderLine = z.object({ tag, after: z.array(tag).max(2000), because: z.string().max(400) }).strict()

/** What the plan says: the points touched with their hand positions, their order, the cases, the work. */
export const planSchema = z.object({
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
  measures: z.array(saying('Say what is done')).max(20),
  watchDefrosts: z.boolean(), // one defrost of each kind is watched while settling
  note: words,
}).strict()

export type Plan = z.output<typeof planSchema>
