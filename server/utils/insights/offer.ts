/** What finished outages would make of a kind of work's times. Pure. */
import type { StepOffer, OutageMark } from '../../../shared/schemas/insights'
import type { StepTimes } from '../../../shared/schemas/lessons'
import type { StepPlan } from '../../../shared/schemas/work'
import { correctedTimes } from '../learn/from-record'

/** A step that took so many minutes in a sealed outage, not yet taken over into its kind of work. */
export interface PendingStep { step: string, minutes: number, outage: OutageMark }

/** One correction after another, as if each outage had been accepted on its own. */
export interface Correction extends PendingStep { before: StepTimes, after: StepTimes }

/**
 * @param seen outages from which the times of a step come already
 * @param pending the oldest first
 */
export function correctionsOf(step: StepPlan, seen: number, pending: readonly PendingStep[]): Correction[] {
  let times: StepTimes = { shortest: step.shortest, likely: step.likely, longest: step.longest }
  return pending.filter(item => item.step === step.id).map((item, index) => {
    const before = times
    times = correctedTimes(before, item.minutes, seen + index)
    return { ...item, before, after: times }
  })
}

/** Steps whose times would change, in their order in the kind of work, the way back last. */
export function offersFor(kind: { steps: readonly StepPlan[], rollBack: readonly StepPlan[] }, seen: ReadonlyMap<string, number>, pending: readonly PendingStep[]): StepOffer[] {
  return [...kind.steps, ...kind.rollBack].flatMap((step): StepOffer[] => {
    const corrections = correctionsOf(step, seen.get(step.id) ?? 0, pending)
    const last = corrections.at(-1)
    return last ? [{ step: step.id, name: step.name, was: corrections[0]!.before, proposed: last.after, outages: corrections.map(item => item.outage) }] : []
  })
}
