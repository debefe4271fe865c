import type { StepPlan } from '~~/shared/schemas/work'
import { workKindSchema } from '~~/shared/schemas/work'
import { formErrorMap } from '~/utils/form-errors'

/** What is wrong with a list of steps, with the step that it is in. @param message what the form says of the whole list */
export function stepFault(steps: readonly StepPlan[], message: string | undefined, field: 'steps' | 'rollBack'): string | undefined {
  if (!message) return undefined
  const parsed = workKindSchema.shape[field].safeParse(steps, { errorMap: formErrorMap })
  const [issue] = parsed.success ? [] : parsed.error.issues
  const index = issue?.path[0]
  return issue && typeof index === 'number' ? `${steps[index]?.name || `Step ${index + 1}`}: ${issue.message}` : message
}
