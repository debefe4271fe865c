/** The forecasts of a whole outage beside what came: which readings were late, and how good the fits were. */
import { inUnit } from '~~/shared/record/select'
import type { ForecastLine, LateReading } from '~~/shared/record/record-lines'
import type { SnapshotCase } from '~~/shared/record/snapshot'
import type { DarkInterval, OutageState } from '~~/shared/record/state'
import { fitAt, limitC, MINUTE, takenOf } from './evidence'
import type { Taken } from './evidence'
import { dueMinutes } from './for-outage'

/** A reading may be this much over its time before it counts as late, ms. */
export const LATE_MS = 2 * MINUTE
/** A conversion's rounding, K. */
const ROUNDING_K = 1e-6

export interface History {
  late: LateReading[]
  /** one for each product reading without control, in the order of the log */
  forecasts: ForecastLine[]
}

/**
 * Goes through every time without control once, and makes one fit for each reading: what it says of
 * the next reading's time gives both how late that came and how far it lay from the forecast.
 * @param until Unix ms; until when a case that was not read counts as overdue
 */
export function historyOf(state: OutageState, until: number): History {
  const history: History = { late: [], forecasts: [] }
  for (const known of state.snapshot.cases) {
    if (!state.cases[known.id]?.touched || known.runsAlone) continue
    const taken = takenOf(state, known.id)
    for (const dark of state.darks) addInterval(history, state, known, taken, dark, until)
  }
  history.late.sort((a, b) => (a.seq ?? Infinity) - (b.seq ?? Infinity) || a.caseId.localeCompare(b.caseId))
  history.forecasts.sort((a, b) => a.seq - b.seq)
  return history
}

function addInterval(history: History, state: OutageState, known: SnapshotCase, taken: readonly Taken[], dark: DarkInterval, until: number): void {
  const to = dark.to ?? until
  const unit = state.snapshot.site.temperatureUnit
  let from = dark.from
  for (const reading of taken) {
    if (reading.at <= dark.from || reading.at > to) continue
    const { fit, start, since } = fitAt(state, known, taken, dark, from)
    const minutes = (from - start) / MINUTE
    const left = fit.minutesFrom(minutes)
    const dueAt = from + dueMinutes(state, known, left?.careful ?? null) * MINUTE
    if (reading.at > dueAt + LATE_MS) history.late.push({ caseId: known.id, seq: reading.seq, minutes: (reading.at - dueAt) / MINUTE })
    const foretold = fit.at((reading.at - start) / MINUTE)
    const over = reading.c > limitC(known) + ROUNDING_K
    history.forecasts.push({
      caseId: known.id, seq: reading.seq, at: reading.at, readings: since,
      foretold: inUnit(foretold, unit), came: inUnit(reading.c, unit), errorK: reading.c - foretold,
      early: over && left !== null && left.careful > 0 && from + left.careful * MINUTE > reading.at,
    })
    from = reading.at
  }
  if (dark.to !== null) return
  const item = state.cases[known.id]!
  const { fit, start } = fitAt(state, known, taken, dark, from)
  const dueAt = from + dueMinutes(state, known, fit.minutesFrom((from - start) / MINUTE)?.careful ?? null) * MINUTE
  const end = Math.min(to, item.empty ? item.acts.at(-1)?.mark.at ?? Infinity : Infinity)
  if (end > dueAt + LATE_MS) history.late.push({ caseId: known.id, seq: null, minutes: (end - dueAt) / MINUTE })
}
