import type { StepPlan } from '~~/shared/schemas/work'

/** The first fault of a list of steps, with the step that it is in. @param errors by path, as steps[2].likely */
export function stepFault(steps: readonly StepPlan[], errors: Partial<Record<string, string>>, field: 'steps' | 'rollBack'): string | undefined {
  const path = Object.keys(errors).find(one => one === field || one.startsWith(`${field}[`))
  const index = /\[(\d+)\]/.exec(path ?? '')?.[1]
  if (!path || !errors[path]) return undefined
  if (index === undefined) return errors[path]
  return `${steps[Number(index)]?.name || `Step ${Number(index) + 1}`}: ${errors[path]}`
}
