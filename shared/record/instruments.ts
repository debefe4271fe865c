/** Whether the thermometers of an outage can be relied upon. */
import { localTime } from '../utils/zoned-time'
import { celsius } from './select'
import type { InstrumentCheck, OutageState, ReadingState } from './state'

const DAY = 86_400_000
/** Readings are compared to within this, kelvin. */
const SAME_K = 1e-6

/** Whether a thermometer in crushed ice and water reads the ice point, 0 °C or 32 °F, to its own accuracy. @param accuracyC ± kelvin */
export function readsIcePoint(value: number, unit: 'F' | 'C', accuracyC: number): boolean {
  return Math.abs(celsius(value, unit)) <= accuracyC + SAME_K
}

export interface CheckStanding {
  /** the day at the site, 2026-03-03; null: never */
  lastOn: string | null
  /** whole days since then; null: never */
  days: number | null
  overdue: boolean
  /** the last check in this outage found it out of tolerance */
  out: boolean
}

/**
 * How an instrument stands at a moment. A check in ice that it passed renews its date; one that it
 * failed does not, and puts it out of tolerance until it passes one.
 * @param at Unix ms @param days how many days a check holds
 */
export function checkStanding(state: OutageState, instrumentId: string, at: number, days = state.snapshot.site.instrumentCheckDays): CheckStanding {
  const { timeZone } = state.snapshot.site
  const own = checksOf(state, instrumentId).filter(check => check.at <= at)
  const passed = own.filter(check => check.within).at(-1)
  const entered = state.snapshot.instruments.find(item => item.id === instrumentId)?.lastCheckOn ?? null
  const renewed = passed ? localTime(passed.at, timeZone).slice(0, 10) : null
  const lastOn = renewed !== null && (entered === null || renewed > entered) ? renewed : entered
  const since = lastOn === null ? null : Math.max(0, Math.round((Date.parse(localTime(at, timeZone).slice(0, 10)) - Date.parse(lastOn)) / DAY))
  return { lastOn, days: since, overdue: since === null || since > days, out: own.at(-1)?.within === false }
}

function checksOf(state: OutageState, instrumentId: string): InstrumentCheck[] {
  return state.instrumentChecks.filter(check => check.instrumentId === instrumentId).sort((a, b) => a.at - b.at || a.mark.seq - b.mark.seq)
}

/** What stands against a reading's instrument; `out`: the check before it or the next one after it was failed. */
export type ReadingDoubt = 'out' | 'overdue'

/** What stands against a reading for its instrument's sake; null where nothing does, or where it names none. */
export function readingDoubt(state: OutageState, reading: Pick<ReadingState, 'instrumentId' | 'at'>): ReadingDoubt | null {
  if (reading.instrumentId === null) return null
  const checks = checksOf(state, reading.instrumentId)
  const next = checks.find(check => check.at > reading.at)
  const standing = checkStanding(state, reading.instrumentId, reading.at)
  if (standing.out || next?.within === false) return 'out'
  return standing.overdue ? 'overdue' : null
}

/** The instrument that a person named last in this outage, else the first for product temperatures; null where there is none. */
export function lastInstrument(state: OutageState, person: string): string | null {
  const own = Object.values(state.cases).flatMap(item => item.readings).filter(reading => reading.by === person && reading.instrumentId !== null)
  const last = own.sort((a, b) => a.seq - b.seq || a.at - b.at).at(-1)
  return last?.instrumentId ?? state.snapshot.instruments.find(item => item.kind === 'product')?.id ?? null
}

export interface InstrumentLine extends CheckStanding {
  id: string
  name: string
  accuracyC: number
  readings: number
  /** readings taken while its check was overdue, and while it was out of tolerance */
  overdueReadings: number
  outReadings: number
  checks: InstrumentCheck[]
}

/** Every instrument that a reading names or that was checked, with how it stood when it was last used. */
export function instrumentLines(state: OutageState): InstrumentLine[] {
  const readings = Object.values(state.cases).flatMap(item => item.readings).filter(reading => !reading.struck)
  return state.snapshot.instruments.flatMap(({ id, name, accuracyC }) => {
    const own = readings.filter(reading => reading.instrumentId === id)
    const checks = checksOf(state, id)
    if (own.length === 0 && checks.length === 0) return []
    const doubts = own.map(reading => readingDoubt(state, reading))
    const last = Math.max(...own.map(reading => reading.at), ...checks.map(check => check.at))
    return [{ id, name, accuracyC, ...checkStanding(state, id, last), readings: own.length, checks, overdueReadings: doubts.filter(doubt => doubt === 'overdue').length, outReadings: doubts.filter(doubt => doubt === 'out').length }]
  })
}
