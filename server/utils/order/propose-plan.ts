import type { Plan } from '~~/shared/record/plan'
import type { Snapshot } from '~~/shared/record/snapshot'
import type { StepPlan } from '~~/shared/schemas/work'
import { planDuration } from '../duration'
import { inHandOrder, proposePoints } from './for-outage'

export interface WorkKind { id: string | null, name: string, steps: StepPlan[], rollBack: StepPlan[] }

const NOTHING = { mean: 0, p95: 0 }

/** Mean and 19-in-20 time of steps, minutes; what a step comes after counts only where that stands in the list too. */
function timesOf(steps: StepPlan[]): { mean: number, p95: number } {
  if (steps.length === 0) return NOTHING
  const ids = new Set(steps.map(step => step.id))
  const { mean, simulated } = planDuration({ steps: steps.map(step => ({ ...step, after: step.after.filter(id => ids.has(id)) })) })
  return { mean, p95: simulated.p95 }
}

const tenth = (minutes: number) => Math.round(minutes * 10) / 10

/** How long the work takes and how long it keeps control away, minutes. */
export function durationOf(steps: StepPlan[], rollBack: StepPlan[]): Plan['duration'] {
  const dark = timesOf(steps.filter(step => step.dark))
  return { totalMean: tenth(timesOf(steps).mean), darkMean: tenth(dark.mean), dark19in20: tenth(dark.p95), rollBack19in20: tenth(timesOf(rollBack).p95) }
}

/** Order of a plan's points, with the refused ones left out: they stay in auto and must be excused or changed. */
export function orderOf(snapshot: Snapshot, points: Plan['points']): Pick<Plan, 'order'> & { refusals: { tag: string, rule: string, because: string }[] } {
  const { order, refusals } = inHandOrder(snapshot, points)
  return { order, refusals }
}

/** The whole plan as the product proposes it from the equipment and the kind of work. @param startsAt ISO, or null when unplanned */
export function proposePlan(snapshot: Snapshot, work: WorkKind, startsAt: string | null): Plan {
  const proposed = proposePoints(snapshot)
  const { order, refusals } = orderOf(snapshot, proposed)
  const refused = new Set(refusals.map(refusal => refusal.tag))
  return {
    startsAt,
    workKind: { id: work.id, name: work.name },
    steps: work.steps,
    rollBack: work.rollBack,
    duration: durationOf(work.steps, work.rollBack),
    points: proposed.filter(point => !refused.has(point.tag)),
    order,
    cases: snapshot.cases.map(item => ({ id: item.id, touched: !item.runsAlone, reason: '' })),
    census: [],
    measures: [],
    assumptions: [],
    watchDefrosts: false,
    note: '',
  }
}
