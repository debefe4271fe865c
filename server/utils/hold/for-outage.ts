/** Hold times of the cases of a real outage, from its readings: estimates, shown as such. */
import { isFrozenKind, isOpenKind } from '~~/shared/schemas/case-kinds'
import { watchedCases } from '~~/shared/record/select'
import type { DarkInterval, OutageState } from '~~/shared/record/state'
import type { SnapshotCase } from '~~/shared/record/snapshot'
import { chilledAt } from './chilled'
import { holdInputOf } from './defaults'
import { darkAt, fitAt, limitC, MINUTE, SHOP_AIR_C, takenOf } from './evidence'
import type { RunningFit, Taken } from './evidence'
import { heldCase, isHeldOn, suctionOf } from './held-case'
import type { HeldCase } from './held-case'
import { holdTime } from './hold-time'
import { LOW_MARK_C } from './held-on'
import { roundDueMinutes } from './rounds'

export { SHOP_AIR_C } from './evidence'

/** A curve is drawn this far where it meets no limit, minutes. */
const LONGEST_CURVE_MINUTES = 600
const CURVE_STEPS = 40
/** Readings this far off their fitted course, root mean square over at least so many, K: more than a thermometer and its reader make (0.3 K). */
const SCATTER_K = 0.42
const SCATTER_READINGS = 4
/** A case held on by hand that has come this far up all the same is not held, K. */
const WARMING_K = 0.5

export interface CaseForecast {
  caseId: string
  /** what the minutes count to: its limit, or the low mark of a case held on by hand */
  toward: 'limit' | 'low-mark'
  /** minutes from `now`, the careful end; null: never reached */
  holdMinutes: number | null
  /** minutes from `now` at which the likely course meets it */
  likelyMinutes: number | null
  /** fitted to this many readings since control was lost; 0: the time constant and the start alone */
  readings: number
  /** the readings follow no single course: the careful end is then less sure than it should be */
  scattered: boolean
  /** when it must be read again, Unix ms */
  dueAt: number
  /** likely course from the last reading on, °C */
  curve: { at: number, c: number }[]
  /** where it is held on by hand: its low mark and its coil */
  held: HeldCase | null
}

/** Hold of a case with nothing running, from a temperature, minutes; null: the limit is never reached. */
export function bareHold(known: SnapshotCase, startC: number): number | null {
  return bareCourse(known, startC).minutes
}

function bareCourse(known: SnapshotCase, startC: number) {
  const frozenStart = isFrozenKind(known.kind) ? Math.max(startC, -40) : startC
  return holdTime(holdInputOf(known.kind, { startC: frozenStart, ambientC: SHOP_AIR_C, limitC: limitC(known), tauHours: known.tauHours }))
}

/** Minutes until a case is to be read again. @param holdLeftMinutes at its last reading; null: never reached */
export function dueMinutes(state: OutageState, { kind }: SnapshotCase, holdLeftMinutes: number | null): number {
  return roundDueMinutes({ holdLeftMinutes, open: isOpenKind(kind), slow: kind.startsWith('walk-in') || (isFrozenKind(kind) && !isOpenKind(kind)), intervalMinutes: state.snapshot.site.intervalMinutes })
}

/**
 * Where a case stands at a moment. Without control: fitted to its readings since then, the careful
 * end of the fit. With control, the hold that it would have from its last temperature.
 * @param now Unix ms
 */
export function forecastCase(state: OutageState, known: SnapshotCase, now: number): CaseForecast {
  const taken = takenOf(state, known.id)
  const last = taken.findLast(reading => reading.at <= now) ?? null
  const dark = darkAt(state, now)
  return dark === null ? withControl(state, known, last, now) : withoutControl(state, known, taken, last, dark, now)
}

/**
 * The hold that `forecastCase` gives, alone: minutes until a case comes to its limit, the careful end; null where
 * it never does, `held` where it is held on by hand and counts to its low mark. Asked of every case at every push.
 * @param now Unix ms
 */
export function holdToLimit(state: OutageState, known: SnapshotCase, now: number): number | 'held' | null {
  const taken = takenOf(state, known.id)
  const last = taken.findLast(reading => reading.at <= now) ?? null
  const dark = darkAt(state, now)
  if (dark === null) return bareHold(known, last?.c ?? known.usualC)
  const from = Math.max(last?.at ?? dark.from, dark.from)
  if (isHeldOn(state, known) && !isWarming(known, taken, dark, now) && suctionOf(state, known, from) !== null) return 'held'
  const { fit, start } = fitAt(state, known, taken, dark, now)
  return fit.minutesFrom((now - start) / MINUTE)?.careful ?? null
}

function withControl(state: OutageState, known: SnapshotCase, last: Taken | null, now: number): CaseForecast {
  const { minutes, curve } = bareCourse(known, last?.c ?? known.usualC)
  const from = last?.at ?? now
  return {
    caseId: known.id, toward: 'limit', holdMinutes: minutes, likelyMinutes: minutes, readings: 0, scattered: false, held: null,
    dueAt: from + dueMinutes(state, known, minutes) * MINUTE,
    curve: curve.map(point => ({ at: from + point.minute * MINUTE, c: point.c })),
  }
}

function withoutControl(state: OutageState, known: SnapshotCase, taken: readonly Taken[], last: Taken | null, dark: DarkInterval, now: number): CaseForecast {
  const running = fitAt(state, known, taken, dark, now)
  const { fit, start } = running
  const from = Math.max(last?.at ?? dark.from, dark.from)
  const minutes = fit.minutesFrom((now - start) / MINUTE)
  const atReading = fit.minutesFrom(Math.max(0, (from - start) / MINUTE))
  const held = isHeldOn(state, known) ? heldCase(state, known, last?.c ?? known.usualC, from) : null
  const holds = held !== null && !isWarming(known, taken, dark, now)
  const forecast = {
    caseId: known.id, readings: fit.n, scattered: isScattered(fit), held,
    // A case that seems held is still read as if it were not: nobody knows until it has been read.
    dueAt: from + dueMinutes(state, known, atReading?.careful ?? null) * MINUTE,
  }
  if (!holds) return { ...forecast, toward: 'limit', holdMinutes: minutes?.careful ?? null, likelyMinutes: minutes?.likely ?? null, curve: warmingCurve(running, last, from, now, minutes?.likely ?? null) }
  const left = held.minutesToLowMark === null ? null : Math.max(0, held.minutesToLowMark - (now - from) / MINUTE)
  return { ...forecast, toward: 'low-mark', holdMinutes: left, likelyMinutes: left, curve: coolingCurve(known, held, last?.c ?? known.usualC, from) }
}

/** Whether the readings lie off their course by more than reading them makes. */
export function isScattered({ n, rmseK }: { n: number, rmseK: number }): boolean {
  return n >= SCATTER_READINGS && rmseK > SCATTER_K
}

/** Whether the last two readings since control was lost lie over the one before it by more than a thermometer and its reader make. */
export function isWarming(known: SnapshotCase, taken: readonly Taken[], dark: DarkInterval, now: number): boolean {
  const start = taken.findLast(reading => reading.at <= dark.from)?.c ?? known.usualC
  const since = taken.filter(reading => reading.at > dark.from && reading.at <= now).slice(-2)
  return since.length > 0 && since.reduce((sum, reading) => sum + reading.c, 0) / since.length > start + WARMING_K
}

function warmingCurve({ fit, start }: RunningFit, last: Taken | null, from: number, now: number, likely: number | null): CaseForecast['curve'] {
  const end = likely === null ? from + LONGEST_CURVE_MINUTES * MINUTE : Math.max(now + likely * MINUTE, from)
  const points = Array.from({ length: CURVE_STEPS + 1 }, (_, step) => {
    const at = from + (end - from) * step / CURVE_STEPS
    return { at, c: fit.at((at - start) / MINUTE) }
  })
  // The pen goes on from where the last reading stands, not beside it.
  return last && last.at === from ? [{ at: from, c: last.c }, ...points.slice(1)] : points
}

function coolingCurve(known: SnapshotCase, { supplyC, minutesToLowMark }: HeldCase, startC: number, from: number): CaseForecast['curve'] {
  const end = startC <= LOW_MARK_C ? LONGEST_CURVE_MINUTES : minutesToLowMark ?? LONGEST_CURVE_MINUTES
  return Array.from({ length: CURVE_STEPS + 1 }, (_, step) => ({ at: from + end * step / CURVE_STEPS * MINUTE, c: chilledAt(startC, supplyC, known.tauHours, end * step / CURVE_STEPS) }))
}

/**
 * Forecasts of all watched cases with product in them: the shortest hold to a limit first, then those
 * held on by hand by the time to their low mark.
 */
export function forecastCases(state: OutageState, now: number): CaseForecast[] {
  const watched = new Set(watchedCases(state).filter(item => !item.empty).map(item => item.id))
  const rank = (forecast: CaseForecast) => forecast.toward === 'limit' && forecast.holdMinutes !== null ? 0 : 1
  return state.snapshot.cases.filter(known => watched.has(known.id)).map(known => forecastCase(state, known, now))
    .sort((a, b) => rank(a) - rank(b) || (a.holdMinutes ?? Infinity) - (b.holdMinutes ?? Infinity) || a.caseId.localeCompare(b.caseId))
}
