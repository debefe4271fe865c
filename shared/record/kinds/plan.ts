import { z } from 'zod'
import { planSchema } from '../plan'
import { snapshotSchema, snapshotSchemaV1 } from '../snapshot'
import { saying, time, words } from './common'

const opening = {
  planned: z.boolean(),
  lostAt: time.nullable(), // when control was lost, for an unplanned outage
  cause: words,
  plan: planSchema,
}

/** Kinds of the plan, its approval, and its end before anything was taken away. */
export const planKinds = {
  'outage-opened': { 1: z.object({ ...opening, snapshot: snapshotSchemaV1 }).strict(), 2: z.object({ ...opening, snapshot: snapshotSchema }).strict() },
  'plan-changed': { 1: z.object({ plan: planSchema, note: words }).strict() },
  'plan-submitted': { 1: z.object({ note: words }).strict() },
  'plan-approved': { 1: z.object({ note: words }).strict() },
  'plan-returned': { 1: z.object({ reason: saying('Say what must change') }).strict() },
  'in-hand-begun': { 1: z.object({}).strict() },
  'called-off': { 1: z.object({ reason: saying('Say why') }).strict() },
}
