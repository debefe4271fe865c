/** What `POST /api/plan/duration` accepts: steps of work with three durations in minutes. */
import { z } from 'zod'

export const MAX_DURATION_STEPS = 200
/** A step of more than 30 days is a mistake. */
export const MAX_STEP_MINUTES = 43_200

const minutes = z.number()
  .min(0, 'must be at least 0 minutes')
  .max(MAX_STEP_MINUTES, `must be at most ${MAX_STEP_MINUTES} minutes`)
const id = z.string().min(1, 'must not be empty').max(200, 'must be at most 200 characters')

export const durationStepSchema = z.object({
  id,
  shortest: minutes,
  likely: minutes,
  longest: minutes,
  after: z.array(id).max(MAX_DURATION_STEPS, `must name at most ${MAX_DURATION_STEPS} steps`).optional(),
  dark: z.boolean().optional(),
}).superRefine((step, context) => {
  if (step.likely < step.shortest) context.addIssue({ code: 'custom', path: ['likely'], message: 'must not be less than the shortest' })
  if (step.longest < step.likely) context.addIssue({ code: 'custom', path: ['longest'], message: 'must not be less than the likely' })
})

export const planDurationSchema = z.object({
  steps: z.array(durationStepSchema).max(MAX_DURATION_STEPS, `must hold at most ${MAX_DURATION_STEPS} steps`),
  within: z.number().finite('must be a number of minutes').optional(),
})

export type DurationStep = z.output<typeof durationStepSchema>
export type PlanDurationInput = z.output<typeof planDurationSchema>
