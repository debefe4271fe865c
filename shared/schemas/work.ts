import { z } from 'zod'

export const STEP_NAME_MAX = 120
export const STEPS_MAX = 40

/** One step of the work, with its three durations in minutes (shortest, likely, longest). */
export const stepPlanSchema = z.object({
  id: z.string().trim().min(1).max(40).regex(/^[a-z0-9-]+$/, 'Letters, digits and hyphens'),
  name: z.string().trim().min(1, 'Name the step').max(STEP_NAME_MAX),
  shortest: z.number().min(0).max(1440),
  likely: z.number().min(0).max(1440),
  longest: z.number().min(0).max(1440),
  dark: z.boolean(), // nothing is controlled during it
  after: z.array(z.string()).max(STEPS_MAX).default([]),
}).superRefine((step, context) => {
  if (step.likely < step.shortest) context.addIssue({ code: 'custom', path: ['likely'], message: 'The likely time is under the shortest' })
  if (step.longest < step.likely) context.addIssue({ code: 'custom', path: ['longest'], message: 'The longest time is under the likely one' })
})
export type StepPlan = z.output<typeof stepPlanSchema>

/** Steps as a whole: ids unique, `after` names steps before or after it in the list, at least one. */
export const stepsSchema = z.array(stepPlanSchema).max(STEPS_MAX).superRefine((steps, context) => {
  const ids = new Set(steps.map(step => step.id))
  steps.forEach((step, index) => {
    if (steps.findIndex(other => other.id === step.id) !== index) context.addIssue({ code: 'custom', path: [index, 'id'], message: `Step ${step.id} stands twice` })
    for (const before of step.after) {
      if (!ids.has(before)) context.addIssue({ code: 'custom', path: [index, 'after'], message: `No step is called ${before}` })
    }
  })
})

export const workKindSchema = z.object({
  name: z.string().trim().min(1, 'Name the kind of work').max(80),
  steps: stepsSchema.refine(steps => steps.length > 0, 'At least one step'),
  rollBack: stepsSchema.default([]),
})
