import { computed } from 'vue'
import type { DiscCase } from '~~/shared/charts/disc'
import { celsius, firstDarkAt, inUnit, openDark, productReadings } from '~~/shared/record/select'
import { nextToDo } from '~~/shared/record/next-to-do'
import { actNeeded } from '~~/server/utils/hold/act-needed'
import { forecastCases } from '~~/server/utils/hold/for-outage'
import { latestTurnBack } from '~~/server/utils/hold/turn-back'
import { assessCase } from '~~/server/utils/holding/for-outage'

const MINUTE = 60_000

/** What the dark screen draws: the disc's pens and the list of cases, shortest hold first. */
export function useDarkView() {
  const { state, now } = useRun()
  const unit = computed(() => state.value.snapshot.site.temperatureUnit)
  const from = computed(() => openDark(state.value)?.from ?? firstDarkAt(state.value) ?? now.value)
  const until = computed(() => state.value.darks.at(-1)?.to ?? now.value)
  const elapsed = computed(() => Math.max(0, (until.value - from.value) / MINUTE))
  /** The minute matters to the forecasts, not the second: they are worked out anew six times a minute. */
  const coarse = computed(() => Math.floor(now.value / 10_000) * 10_000)
  const forecasts = computed(() => forecastCases(state.value, Math.max(coarse.value, from.value)))

  const rows = computed(() => forecasts.value.map((forecast) => {
    const known = state.value.snapshot.cases.find(item => item.id === forecast.caseId)!
    const item = state.value.cases[forecast.caseId]!
    const readings = productReadings(item)
    const last = readings.at(-1) ?? null
    const usual = inUnit(known.usualC, unit.value)
    // A reading signed within the last seconds counts at once.
    const at = Math.max(coarse.value, from.value, ...item.readings.map(reading => reading.at))
    const assessed = assessCase(state.value, known.id, at)
    const judged = assessed && { ...assessed, deadline: assessed.deadline === null ? null : Date.parse(assessed.deadline) }
    const need = actNeeded(state.value, known.id, at, assessed)
    return {
      id: known.id,
      name: known.name,
      last: last ? inUnit(celsius(last.value, last.unit), unit.value) : null,
      limit: inUnit(celsius(known.limit.value, known.limit.unit), unit.value),
      usual,
      toward: forecast.toward,
      holdMinutes: forecast.holdMinutes,
      likelyMinutes: forecast.likelyMinutes,
      fitted: forecast.readings,
      scattered: forecast.scattered,
      held: forecast.held,
      dueAt: forecast.dueAt,
      judged,
      need,
      toDo: nextToDo(state.value, known.id, { judged, cause: need?.cause ?? null, dueAt: state.value.phase === 'dark' ? forecast.dueAt : null }, at),
      readings: atDark(readings.map(reading => ({ minute: (reading.at - from.value) / MINUTE, value: inUnit(celsius(reading.value, reading.unit), unit.value) }))),
      forecast: forecast.curve.map(point => ({ minute: (point.at - from.value) / MINUTE, value: inUnit(point.c, unit.value) })),
    }
  }))

  const shortest = computed(() => rows.value.find(row => row.toward === 'limit' && row.holdMinutes !== null) ?? null)
  const discCases = computed<DiscCase[]>(() => rows.value.slice(0, PENS).map(row => ({ id: row.id, name: row.name, shortest: row.id === shortest.value?.id, usual: row.usual, limit: row.limit, readings: row.readings, forecast: row.forecast })))
  const due = computed(() => rows.value.filter(row => row.dueAt <= now.value + 2 * MINUTE))
  const nextDue = computed(() => rows.value.length === 0 ? null : Math.min(...rows.value.map(row => row.dueAt)))
  const shortestAt = computed(() => shortest.value?.holdMinutes == null ? null : elapsed.value + shortest.value.holdMinutes)
  const turnBack = computed(() => latestTurnBack(state.value, forecasts.value, Math.max(coarse.value, from.value)))

  return { unit, from, elapsed, rows, shortest, discCases, due, nextDue, shortestAt, turnBack }
}

/** More pens than this no eye tells apart; the list below has them all. */
const PENS = 5

/** Readings from the moment of control lost on; the last one before it stands at that moment. */
function atDark(readings: { minute: number, value: number }[]): { minute: number, value: number }[] {
  const start = readings.filter(reading => reading.minute <= 0).at(-1)
  const after = readings.filter(reading => reading.minute > 0)
  return start ? [{ minute: 0, value: start.value }, ...after] : after
}
