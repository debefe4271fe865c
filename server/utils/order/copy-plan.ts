/** A plan taken over from an earlier outage of the same controller. */
import { listWords } from '~~/shared/charts/words'
import type { Plan } from '~~/shared/record/plan'
import type { Snapshot } from '~~/shared/record/snapshot'
import { durationOf, orderOf, proposePlan } from './propose-plan'

export interface CopiedPlan {
  plan: Plan
  /** tags of the earlier plan that the controller no longer has */
  gone: string[]
  /** tags that came since, taken in as proposed */
  fresh: string[]
}

/**
 * The earlier plan on today's equipment: its hand positions with their reasons, cases, measures, assumptions
 * and steps, as far as what they name still exists; what is new comes as the product proposes it. What was
 * found in hand then says nothing of today.
 * @param code number of the outage that it is copied from
 * @param startsAt ISO
 */
export function copyPlan(earlier: Plan, code: string, snapshot: Snapshot, startsAt: string): CopiedPlan {
  const proposed = proposePlan(snapshot, { ...earlier.workKind, steps: earlier.steps, rollBack: earlier.rollBack }, startsAt)
  const known = new Set(snapshot.points.map(point => point.tag))
  const planned = new Set(earlier.points.map(point => point.tag))
  const gone = earlier.points.filter(point => !known.has(point.tag)).map(point => point.tag)
  const fresh = proposed.points.filter(point => !planned.has(point.tag)).map(point => point.tag)
  const points = snapshot.points.flatMap(({ tag }) => earlier.points.find(point => point.tag === tag) ?? proposed.points.find(point => point.tag === tag) ?? [])
  const { order, refusals } = orderOf(snapshot, points)
  const refused = new Set(refusals.map(refusal => refusal.tag))
  const isCase = (id: string) => snapshot.cases.some(item => item.id === id)
  const isThing = (id: string | null) => id === null || isCase(id) || snapshot.suctionGroups.some(group => group.id === id)
  const said = [`Copied from ${code}.`, gone.length > 0 ? `No longer there: ${listWords(gone)}.` : '', fresh.length > 0 ? `New since, as proposed: ${listWords(fresh)}.` : '']
  return {
    gone,
    fresh,
    plan: {
      ...proposed,
      duration: durationOf(earlier.steps, earlier.rollBack),
      points: points.filter(point => !refused.has(point.tag)),
      order,
      cases: proposed.cases.map(item => earlier.cases.find(other => other.id === item.id) ?? item),
      measures: earlier.measures.map(measure => ({ ...measure, caseIds: measure.caseIds.filter(isCase) })).filter(measure => measure.kind === 'other' || measure.caseIds.length > 0),
      assumptions: earlier.assumptions.filter(item => isThing(item.id)),
      watchDefrosts: earlier.watchDefrosts,
      note: [...said.filter(Boolean), earlier.note].join(' ').trim().slice(0, 2000),
    },
  }
}
