import { parseWith, type Parsed } from '~~/shared/schemas/parsed'
import { planWindowSchema, type PlanWindowInput } from '~~/shared/schemas/plan-window'

/** The input of `planWindow` from a request's body, or the field at fault and the reason in words. */
export function parseWindowInput(body: unknown): Parsed<PlanWindowInput> {
  return parseWith(planWindowSchema, body)
}
