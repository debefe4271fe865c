/** What a record holds of one case that its forecast rests on. */
import type { Act } from '~~/shared/record/kinds/rounds'
import { celsius, productReadings } from '~~/shared/record/select'
import type { SnapshotCase } from '~~/shared/record/snapshot'
import type { DarkInterval, OutageState } from '~~/shared/record/state'
import { DEFAULT_TAU_HOURS } from './defaults'
import { fitCase } from './case-fit'
import type { CaseFit } from './case-fit'

/** Air around the product of a shop whose air nobody measured, °C: an estimate. */
export const SHOP_AIR_C = 24
export const MINUTE = 60_000
/** Readings of this long before the course began stand for its start, ms. */
const BEFORE_MS = 60 * MINUTE
/** Acts after which a case warms otherwise than before, so that its course begins anew. */
const TURNING: ReadonlySet<Act> = new Set(['cooled', 'night-covers', 'ice', 'restored-by-hand'])

export interface Taken { at: number, c: number, seq: number }

/** Product readings of a case in °C, one for each moment, in the order in which they were taken. */
export function takenOf(state: OutageState, caseId: string): Taken[] {
  const readings = productReadings(state.cases[caseId]!)
  return readings.filter((reading, index) => index === 0 || reading.at > readings[index - 1]!.at).map(({ at, value, unit, seq }) => ({ at, c: celsius(value, unit), seq }))
}

/** The time without control that runs at a moment, or null. @param at Unix ms */
export function darkAt(state: OutageState, at: number): DarkInterval | null {
  return state.darks.findLast(dark => dark.from <= at && (dark.to === null || at <= dark.to)) ?? null
}

/** When the course that a case is on at a moment began: the loss of control, or an act since. Unix ms */
function courseStart(state: OutageState, caseId: string, dark: DarkInterval, at: number): { start: number, byAct: boolean } {
  const turns = state.cases[caseId]!.acts.filter(({ act, mark }) => TURNING.has(act) && mark.at > dark.from && mark.at <= at).map(({ mark }) => mark.at)
  return turns.length > 0 ? { start: Math.max(...turns), byAct: true } : { start: dark.from, byAct: false }
}

export interface RunningFit { fit: CaseFit, /** Unix ms */ start: number, /** readings since then */ since: number }

/**
 * The fit of a case at a moment without control, to the readings taken up to then.
 * @param taken all product readings of the case, as `takenOf` gives them
 * @param at Unix ms, within `dark`
 */
export function fitAt(state: OutageState, known: SnapshotCase, taken: readonly Taken[], dark: DarkInterval, at: number): RunningFit {
  const { start, byAct } = courseStart(state, known.id, dark, at)
  const before: number[] = []
  const since: { minutes: number, c: number }[] = []
  let last: number | null = null
  for (const reading of taken) {
    if (reading.at > at) break
    if (reading.at > start) since.push({ minutes: (reading.at - start) / MINUTE, c: reading.c })
    else {
      last = reading.c
      if (!byAct && reading.at >= start - BEFORE_MS) before.push(reading.c)
    }
  }
  if (before.length === 0 && last !== null) before.push(last)
  const fit = fitCase({
    kind: known.kind, usualC: known.usualC, limitC: limitC(known), ambientC: SHOP_AIR_C,
    priorTauHours: known.tauHours || DEFAULT_TAU_HOURS['open-multideck'], before, since,
  })
  return { fit, start, since: since.length }
}

export function limitC(known: SnapshotCase): number {
  return celsius(known.limit.value, known.limit.unit)
}
