import { progress, turnFor } from '../charts/disc'
import type { DiscCase, DiscInput } from '../charts/disc'
import type { TemperatureInput } from '../charts/temperatures'
import { temperatureWords } from '../charts/words'
import { celsius, firstDarkAt, inUnit, productReadings } from './select'
import type { SnapshotCase } from './snapshot'
import type { OutageState } from './state'

const MINUTE = 60_000
/** More traces than this hide each other; the cases nearest to their limit are drawn. */
export const TRACES_MAX = 12

/** One chart for all cases of one limit. */
export interface LimitChart extends Pick<TemperatureInput, 'dark' | 'limits' | 'cases'> {
  limit: number
  unit: 'F' | 'C'
  /** cases of this limit that are not drawn */
  left: number
  /** the minute 0 of the chart, Unix ms */
  origin: number
}

/** Minute 0 of the charts: the loss of control, or the first reading where there was none. Unix ms; null: nothing to draw. */
function originOf(state: OutageState): number | null {
  const first = Math.min(...Object.values(state.cases).flatMap(item => productReadings(item).map(reading => reading.at)))
  return firstDarkAt(state) ?? (Number.isFinite(first) ? first : null)
}

function minuteReadings(state: OutageState, item: SnapshotCase, origin: number) {
  const unit = state.snapshot.site.temperatureUnit
  const known = state.cases[item.id]
  return known ? productReadings(known).map(reading => ({ minute: (reading.at - origin) / MINUTE, value: inUnit(celsius(reading.value, reading.unit), unit) })) : []
}

/** Cases with readings, the one that came nearest to its limit first; ties break on id. */
function byNearness(state: OutageState, origin: number) {
  const unit = state.snapshot.site.temperatureUnit
  return state.snapshot.cases.map((item) => {
    const readings = minuteReadings(state, item, origin)
    const limit = inUnit(celsius(item.limit.value, item.limit.unit), unit)
    const usual = inUnit(item.usualC, unit)
    const nearness = Math.max(-Infinity, ...readings.filter(reading => reading.minute >= 0 || readings.length === 1).map(reading => progress(reading.value, usual, limit)))
    return { item, readings, limit, usual, nearness }
  }).filter(known => known.readings.length > 0).sort((a, b) => b.nearness - a.nearness || a.item.id.localeCompare(b.item.id))
}

/** The disc of a record: from the loss of control until it was back, all cases with readings. @param now for an outage still dark, Unix ms */
export function recordDisc(state: OutageState, now: number): DiscInput | null {
  const origin = firstDarkAt(state)
  if (origin === null) return null
  const end = state.darks.at(-1)!.to ?? now
  const elapsedMinutes = Math.max(0, (end - origin) / MINUTE)
  const plannedMinutes = state.planned && state.plan.duration.darkMean > 0 ? state.plan.duration.darkMean : null
  const cases = byNearness(state, origin).map(({ item, readings, limit, usual }, index): DiscCase => ({
    id: item.id, name: item.name, shortest: index === 0, usual, limit, readings: readings.filter(reading => reading.minute <= elapsedMinutes), forecast: [],
  }))
  return { elapsedMinutes, plannedMinutes, turnMinutes: turnFor(elapsedMinutes, plannedMinutes), cases }
}

/** Product temperatures over the whole outage, one chart for each limit, lowest limit last. @param now for an outage still dark, Unix ms */
export function temperatureCharts(state: OutageState, now: number): LimitChart[] {
  const origin = originOf(state)
  if (origin === null) return []
  const unit = state.snapshot.site.temperatureUnit
  const known = byNearness(state, origin)
  const limits = [...new Set(known.map(({ limit }) => Math.round(limit * 10) / 10))].sort((a, b) => b - a)
  const dark = state.darks.map(({ from, to }) => ({ from: (from - origin) / MINUTE, to: ((to ?? now) - origin) / MINUTE }))
  return limits.map((limit) => {
    const own = known.filter(item => Math.round(item.limit * 10) / 10 === limit)
    return {
      limit, unit, origin, dark,
      limits: [{ value: limit, label: `${temperatureWords(limit, unit)} limit` }],
      cases: own.slice(0, TRACES_MAX).map(({ item, readings }) => ({ id: item.id, name: item.name, readings })),
      left: Math.max(0, own.length - TRACES_MAX),
    }
  })
}
