// How honest forecasts of the hold time are on synthetic cases: the fit beside the prior alone and a straight line.
import { fitHold } from '~~/server/utils/hold/fit'
import { crossingMinutes, syntheticCases } from './synthetic-cases'
import type { SyntheticCase } from './synthetic-cases'

const CASES = 2_000

/** What one way of forecasting says of a case: minutes to the limit from the last reading; null when it sees none. */
type Forecast = (of: SyntheticCase) => { likely: number | null, careful: number | null }

const fit: Forecast = ({ ambientC, priorTauHours, limitC, readings, now }) => {
  const { minutesToLimit } = fitHold({ ambientC, priorTauHours, limitC, readings, now })
  return minutesToLimit ?? { likely: null, careful: null }
}

/** The known ambient and the prior time constant from the first reading on, whatever was read later. */
const prior: Forecast = ({ ambientC, priorTauHours, limitC, readings, nowMinutes }) => {
  const likely = crossingMinutes(readings[0]!.c, ambientC, priorTauHours, limitC)
  const left = likely === null ? null : Math.max(0, likely - nowMinutes)
  return { likely: left, careful: left }
}

/** A straight line through all readings by least squares. */
const line: Forecast = ({ readings, limitC, nowMinutes }) => {
  const minutes = readings.map((_, index) => index * 10)
  const mean = (values: number[]) => values.reduce((sum, value) => sum + value, 0) / values.length
  const [middle, level] = [mean(minutes), mean(readings.map(({ c }) => c))]
  const slope = readings.reduce((sum, { c }, index) => sum + (minutes[index]! - middle) * (c - level), 0) / minutes.reduce((sum, at) => sum + (at - middle) ** 2, 0)
  if (slope <= 0) return { likely: null, careful: null }
  const left = Math.max(0, middle + (limitC - level) / slope - nowMinutes)
  return { likely: left, careful: left }
}

const median = (values: number[]) => [...values].sort((a, b) => a - b)[Math.floor(values.length / 2)] ?? Number.NaN
const percent = (part: number) => Number((100 * part).toFixed(1))

/** A forecast that sees no limit is late: the product reaches it all the same. */
function honesty(cases: SyntheticCase[], forecast: Forecast) {
  const told = cases.map(of => ({ truth: of.truthMinutes, ...forecast(of) }))
  const seen = told.filter((one): one is { truth: number, likely: number, careful: number } => one.likely !== null && one.careful !== null)
  return {
    notLatePercent: percent(seen.filter(({ careful, truth }) => careful <= truth).length / cases.length),
    medianErrorOfLikelyPercent: percent(median(seen.map(({ likely, truth }) => Math.abs(likely - truth) / truth))),
    medianCarefulToTruth: Number(median(seen.map(({ careful, truth }) => careful / truth)).toFixed(2)),
    seesNoLimitPercent: percent(1 - seen.length / cases.length),
  }
}

function compare(cases: SyntheticCase[]) {
  return { cases: cases.length, fit: honesty(cases, fit), priorAlone: honesty(cases, prior), straightLine: honesty(cases, line) }
}

const asDescribed = compare(syntheticCases(CASES))
const byReadings = Object.fromEntries([[4, 6], [7, 9], [10, 12]].map(([least, most]) => [`${least} to ${most} readings`, honesty(syntheticCases(CASES).filter(({ readings }) => readings.length >= least! && readings.length <= most!), fit)]))
const fastAir = compare(syntheticCases(CASES, { fastTauMinutes: 20 }))
const noisy = compare(syntheticCases(CASES, { noiseK: 0.6 }))

process.stdout.write(`${JSON.stringify({
  name: 'honesty of forecasts on synthetic cases',
  ratio: Number((asDescribed.fit.medianErrorOfLikelyPercent / asDescribed.straightLine.medianErrorOfLikelyPercent).toFixed(2)),
  baseline: 'the median error of a straight line through the same readings',
  wanted: { notLatePercent: 95, medianErrorOfLikelyPercent: 15, medianCarefulToTruth: 0.4 },
  asDescribed,
  byReadings,
  airWithATimeConstantOf20Minutes: fastAir,
  noiseOf0_6K: noisy,
})}\n`)
