/** What `POST /api/plan/order` accepts: the points of one controller and the direction of the work. */
import { z } from 'zod'
import { handPositionSchema, pointKindSchema } from './point-kinds'

/** As many points as an import may carry; beyond it a request is a mistake, not a controller. */
export const MAX_ORDER_POINTS = 2000

const name = z.string().trim().min(1, 'must not be empty').max(200, 'must be at most 200 characters')

export const orderPointSchema = z.object({
  tag: name,
  kind: pointKindSchema,
  hand: handPositionSchema,
  rack: name.optional(),
  suctionGroup: name.optional(),
  stage: z.enum(['low', 'medium']).optional(),
  circuit: name.optional(),
  place: z.string().max(200, 'must be at most 200 characters').optional(),
  running: z.boolean().optional(),
  guardInSeries: z.boolean().optional(),
  drives: name.optional(),
  stays: z.boolean().optional(),
  after: z.array(name).max(MAX_ORDER_POINTS).optional(),
})

export const planOrderSchema = z.object({
  direction: z.enum(['in-hand', 'hand-back']),
  externalHeatRejection: z.boolean().optional(),
  points: z.array(orderPointSchema).max(MAX_ORDER_POINTS, `must hold at most ${MAX_ORDER_POINTS} points`),
})

export type OrderPoint = z.infer<typeof orderPointSchema>
export type PlanOrderInput = z.infer<typeof planOrderSchema>
export type OrderDirection = PlanOrderInput['direction']
