import type { OutageState } from '~~/shared/record/state'
import { fitAt, MINUTE, takenOf } from './evidence'

/**
 * The shortest hold of an outage, minutes: of every case that was read without control, the likely time from
 * the loss of control to its limit, fitted to all its readings of that interval. An interval that still runs
 * says nothing yet.
 * @returns null where no case was read, or none would reach its limit
 */
export function shortestHold(state: OutageState): number | null {
  let shortest: number | null = null
  for (const known of state.snapshot.cases) {
    if (known.runsAlone || !state.cases[known.id]?.touched) continue
    const taken = takenOf(state, known.id)
    for (const dark of state.darks) {
      if (dark.to === null) continue
      const { fit, start, since } = fitAt(state, known, taken, dark, dark.to)
      const left = since === 0 ? null : fit.minutesFrom(0)
      if (left === null) continue
      const minutes = (start - dark.from) / MINUTE + left.likely
      shortest = shortest === null ? minutes : Math.min(shortest, minutes)
    }
  }
  return shortest
}
