/** Hold times of the cases of a real outage, from its readings: estimates, shown as such. */
import { isFrozenKind, isOpenKind } from '~~/shared/schemas/case-kinds'
import { isoTime } from '~~/shared/record/entry'
import { celsius, firstDarkAt, productReadings, watchedCases } from '~~/shared/record/select'
import type { OutageState } from '~~/shared/record/state'
import type { SnapshotCase } from '~~/shared/record/snapshot'
import { DEFAULT_TAU_HOURS, holdInputOf } from './defaults'
import { fitHold } from './fit'
import { holdTime } from './hold-time'
import { roundDueMinutes, SHORTEST_MINUTES } from './rounds'

/** Air around the product of a shop whose air nobody measured, °C: an estimate. */
export const SHOP_AIR_C = 24
const MINUTE = 60_000

export interface CaseForecast {
  caseId: string
  /** minutes from `now` to the limit, the careful end; null: never reached */
  holdMinutes: number | null
  /** minutes from `now` at which the likely course meets the limit */
  likelyMinutes: number | null
  /** when it must be read again, Unix ms */
  dueAt: number
  /** likely course from `now`, °C */
  curve: { at: number, c: number }[]
}

function limitC(known: SnapshotCase): number {
  return celsius(known.limit.value, known.limit.unit)
}

/** Hold of a case with nothing running, from a temperature, minutes; null: the limit is never reached. */
export function bareHold(known: SnapshotCase, startC: number): number | null {
  return curveOf(known, startC).minutes
}

function curveOf(known: SnapshotCase, startC: number, tauHours = known.tauHours) {
  const frozenStart = isFrozenKind(known.kind) ? Math.max(startC, -40) : startC
  return holdTime(holdInputOf(known.kind, { startC: frozenStart, ambientC: SHOP_AIR_C, limitC: limitC(known), tauHours }))
}

/**
 * Where a case stands at a moment: fitted to its readings since control was lost, or, before the
 * second one, from its time constant alone.
 * @param now Unix ms
 */
export function forecastCase(state: OutageState, known: SnapshotCase, now: number): CaseForecast {
  const readings = productReadings(state.cases[known.id]!).filter(reading => reading.at <= now)
  const last = readings.at(-1)
  const darkAt = firstDarkAt(state)
  const startC = last ? celsius(last.value, last.unit) : known.usualC
  const sinceDark = darkAt === null ? [] : readings.filter((reading, index) => reading.at >= darkAt || readings[index + 1] === undefined || readings[index + 1]!.at > darkAt)
  const elapsed = last ? Math.max(0, (now - Math.max(last.at, darkAt ?? now)) / MINUTE) : 0
  let tauHours = known.tauHours
  let held: { likely: number, careful: number } | null
  if (!isFrozenKind(known.kind) && sinceDark.length >= 2) {
    const fit = fitHold({ ambientC: SHOP_AIR_C, priorTauHours: known.tauHours || DEFAULT_TAU_HOURS['open-multideck'], limitC: limitC(known), readings: distinct(sinceDark), now: isoTime(now) })
    tauHours = fit.tauHours
    held = fit.minutesToLimit
  } else {
    const { minutes } = curveOf(known, startC)
    held = minutes === null ? null : { likely: Math.max(0, minutes - elapsed), careful: Math.max(0, minutes - elapsed) }
  }
  const { curve } = curveOf(known, startC, tauHours)
  const from = last ? Math.max(last.at, darkAt ?? last.at) : now
  const holdAtLast = held === null ? null : held.careful + elapsed
  const due = roundDueMinutes({ holdLeftMinutes: holdAtLast, open: isOpenKind(known.kind), slow: known.kind.startsWith('walk-in') || (isFrozenKind(known.kind) && !isOpenKind(known.kind)), intervalMinutes: state.snapshot.site.intervalMinutes })
  return {
    caseId: known.id,
    holdMinutes: held?.careful ?? null,
    likelyMinutes: held?.likely ?? null,
    dueAt: from + due * MINUTE,
    curve: curve.map(point => ({ at: from + point.minute * MINUTE, c: point.c })).filter(point => point.at >= from),
  }
}

/** Fit wants times in strict order. */
function distinct(readings: { at: number, value: number, unit: 'F' | 'C' }[]) {
  return readings.filter((reading, index) => index === 0 || reading.at > readings[index - 1]!.at).map(reading => ({ at: isoTime(reading.at), c: celsius(reading.value, reading.unit) }))
}

/** Forecasts of all watched cases with product in them, shortest hold first. */
export function forecastCases(state: OutageState, now: number): CaseForecast[] {
  const watched = new Set(watchedCases(state).filter(item => !item.empty).map(item => item.id))
  return state.snapshot.cases.filter(known => watched.has(known.id)).map(known => forecastCase(state, known, now))
    .sort((a, b) => (a.holdMinutes ?? Infinity) - (b.holdMinutes ?? Infinity) || a.caseId.localeCompare(b.caseId))
}

/** Readings taken later than they were due by more than two minutes, with how late, minutes. */
export function lateReadings(state: OutageState, until: number): { caseId: string, seq: number | null, minutes: number }[] {
  const late: { caseId: string, seq: number | null, minutes: number }[] = []
  const soonest = Math.min(SHORTEST_MINUTES, state.snapshot.site.intervalMinutes) * MINUTE
  for (const known of state.snapshot.cases) {
    const item = state.cases[known.id]
    if (!item?.touched || known.runsAlone) continue
    for (const dark of state.darks) {
      const to = dark.to ?? until
      const inDark = productReadings(item).filter(reading => reading.at > dark.from && reading.at <= to)
      let last = dark.from
      for (const reading of inDark) {
        // A forecast is dear, so none is made where the reading came before any case could be due.
        const dueAt = last > dark.from && reading.at <= last + soonest ? reading.at : forecastCase(state, known, last).dueAt
        if (reading.at > dueAt + 2 * MINUTE) late.push({ caseId: known.id, seq: reading.seq, minutes: (reading.at - dueAt) / MINUTE })
        last = reading.at
      }
      if (dark.to !== null) continue
      const dueAt = forecastCase(state, known, last).dueAt
      const emptied = item.empty ? item.acts.at(-1)?.mark.at ?? Infinity : Infinity
      if (Math.min(to, emptied) > dueAt + 2 * MINUTE) late.push({ caseId: known.id, seq: null, minutes: (Math.min(to, emptied) - dueAt) / MINUTE })
    }
  }
  return late.sort((a, b) => (a.seq ?? Infinity) - (b.seq ?? Infinity) || a.caseId.localeCompare(b.caseId))
}
