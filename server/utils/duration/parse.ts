import { parseWith, type Parsed } from '~~/shared/schemas/parsed'
import { planDurationSchema, type PlanDurationInput } from '~~/shared/schemas/plan-duration'
import { networkOf } from './network'

/**
 * The input of `planDuration` from a request's body. Refused, with the field and the reason in
 * words: durations out of order, an id twice, `after` naming no step, steps that wait for each other.
 */
export function parseDurationInput(body: unknown): Parsed<PlanDurationInput> {
  const parsed = parseWith(planDurationSchema, body)
  if (!parsed.ok) return parsed
  const { steps } = parsed.input
  const ids = new Set<string>()
  for (const [index, { id }] of steps.entries()) {
    if (ids.has(id)) return refuse(`steps[${index}].id`, `names ${id}, which stands twice`)
    ids.add(id)
  }
  for (const [index, { after }] of steps.entries()) {
    for (const [at, id] of (after ?? []).entries()) {
      if (!ids.has(id)) return refuse(`steps[${index}].after[${at}]`, `names ${id}, and no step has that id`)
    }
  }
  const network = networkOf(steps)
  return 'ring' in network ? refuse('steps', `wait for each other in a ring: ${network.ring.join(', ')}`) : parsed
}

function refuse(field: string, words: string): Parsed<never> {
  return { ok: false, field, reason: `${field} ${words}` }
}
