/** When the coils of a plan count as iced: nothing defrosts them while points are in hand. */
import type { Plan } from '~~/shared/record/plan'
import type { Snapshot } from '~~/shared/record/snapshot'
import { DAY, localClock, MINUTE } from '../window/local-time'
import { defrostsBetween } from '../window/schedule'
import { CLEAR_MINUTES } from '../window/plan'

/** A coil carries its ice so many times as long as its usual gap between defrosts: our own estimate. */
export const GAPS_UNTIL_ICED = 1.5

/** When points begin to go in hand and when control is gone, Unix ms; null: not known. */
export interface PlanTimes { inHandAt: number | null, darkAt: number | null }

/**
 * Minutes from the beginning of dark until each circuit's coil counts as iced, by circuit id; circuits
 * without a schedule are absent. From its last defrost before points go in hand by the schedule, or,
 * where the plan runs one early, from 30 minutes before.
 */
export function icedMinutes(snapshot: Snapshot, plan: Pick<Plan, 'measures'>, { inHandAt, darkAt }: PlanTimes): Map<string, number> {
  if (inHandAt === null || darkAt === null) return new Map()
  const clock = localClock(snapshot.site.timeZone)
  return new Map(snapshot.circuits.flatMap((circuit) => {
    if (circuit.defrosts === null || circuit.defrostKind === 'none') return []
    const early = snapshot.cases.some(item => item.circuitId === circuit.id && plan.measures.some(measure => measure.kind === 'earlier-defrost' && measure.caseIds.includes(item.id)))
    const past = defrostsBetween([{ ...circuit, id: circuit.id, defrosts: circuit.defrosts }], clock, inHandAt - 2 * DAY, inHandAt).filter(defrost => defrost.end <= inHandAt)
    const lastEnd = early ? inHandAt - CLEAR_MINUTES * MINUTE : past.at(-1)?.end
    if (lastEnd === undefined) return []
    const perDay = 'times' in circuit.defrosts ? circuit.defrosts.times.length : 24 / circuit.defrosts.everyHours
    return [[circuit.id, Math.max(0, (lastEnd + GAPS_UNTIL_ICED * DAY / perDay - darkAt) / MINUTE)] as const]
  }))
}
