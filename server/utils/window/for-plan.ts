/** Defrosts in the window of a real plan, and better starts. */
import type { Plan } from '~~/shared/record/plan'
import type { Snapshot } from '~~/shared/record/snapshot'
import type { PlanWindowInput } from '~~/shared/schemas/plan-window'
import { MAX_WINDOW_CIRCUITS } from '~~/shared/schemas/plan-window'
import { MINUTE } from './local-time'
import type { DefrostConflict, WindowStart } from './plan'
import { planWindow } from './plan'

const DAYS = 7
const STEP_MIN = 5
/** A start sooner than this leaves no time for an approval, minutes. Our own estimate. */
const SOONEST_MINUTES = 60

export interface PlanWindow {
  /** defrosts and drips from 30 minutes before points go in hand until the end of dark */
  conflicts: DefrostConflict[]
  /** five best starts of the coming week, best first */
  starts: WindowStart[]
}

/** @param now Unix ms; starts are looked for from then on. @param leadMin minutes until control is taken away */
export function windowOf(snapshot: Snapshot, plan: Pick<Plan, 'startsAt' | 'duration'>, leadMin: number, now: number): PlanWindow {
  const input = (from: number, days: number): PlanWindowInput => ({
    timeZone: snapshot.site.timeZone,
    from: new Date(from).toISOString(),
    days,
    leadMin,
    darkMin: plan.duration.dark19in20,
    stepMin: STEP_MIN,
    avoid: snapshot.site.quietHours,
    circuits: snapshot.circuits.flatMap(({ name, defrosts, durationMin, dripMin }) => defrosts === null ? [] : [{ id: name, defrosts, durationMin, dripMin }]).slice(0, MAX_WINDOW_CIRCUITS),
  })
  const step = STEP_MIN * MINUTE
  const from = Math.ceil((now + SOONEST_MINUTES * MINUTE) / step) * step
  return {
    conflicts: plan.startsAt === null ? [] : planWindow(input(Date.parse(plan.startsAt), 1)).conflicts,
    starts: planWindow(input(from, DAYS)).starts,
  }
}
