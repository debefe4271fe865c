import { z } from 'zod'
import { planSchema, planSchemaV1 } from '../plan'
import { snapshotSchema, snapshotSchemaV1 } from '../snapshot'
import { number, saying, time, words } from './common'

const opening = {
  planned: z.boolean(),
  lostAt: time.nullable(), // when control was lost, for an unplanned outage
  cause: words,
}

/** Kinds of the plan, its approval, and its end before anything was taken away. */
export const planKinds = {
  'outage-opened': { 1: z.object({ ...opening, snapshot: snapshotSchemaV1, plan: planSchemaV1 }).strict(), 2: z.object({ ...opening, snapshot: snapshotSchema, plan: planSchema }).strict() },
  'plan-changed': { 1: z.object({ plan: planSchemaV1, note: words }).strict(), 2: z.object({ plan: planSchema, note: words }).strict() },
  /** names the numbers that a supervisor takes upon themselves, in whole minutes; null: no such number */
  'margin-accepted': { 1: z.object({ minutes: number(-100_000, 100_000).int().nullable(), deadlineMinutes: number(-100_000, 100_000).int().nullable(), reason: saying('Say why the work goes on all the same') }).strict() },
  'plan-submitted': { 1: z.object({ note: words }).strict() },
  'plan-approved': { 1: z.object({ note: words }).strict() },
  'plan-returned': { 1: z.object({ reason: saying('Say what must change') }).strict() },
  'in-hand-begun': { 1: z.object({}).strict() },
  'called-off': { 1: z.object({ reason: saying('Say why') }).strict() },
}
