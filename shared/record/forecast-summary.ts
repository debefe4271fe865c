import { numberWords } from '../charts/words'
import type { ForecastLine } from './record-lines'
import { caseName } from './select'
import type { OutageState } from './state'

/** Forecasts of one case beside what came. Differences in the site's unit, without sign unless said. */
export interface CaseForecastSummary {
  caseId: string
  name: string
  lines: readonly ForecastLine[]
  median: number
  /** the largest difference, came less foretold, with its sign */
  largest: number
  early: boolean
}

export interface ForecastSummary {
  unit: 'F' | 'C'
  readings: number
  /** median difference of all readings, in the site's unit; 0 where there are none */
  median: number
  /** names of the cases found over their limit before the careful forecast had them there */
  early: string[]
  cases: CaseForecastSummary[]
}

/** Cases in the order of the equipment, those with readings without control only. */
export function forecastSummary(state: OutageState, lines: readonly ForecastLine[]): ForecastSummary {
  const cases = state.snapshot.cases.flatMap(({ id }): CaseForecastSummary[] => {
    const own = lines.filter(line => line.caseId === id)
    if (own.length === 0) return []
    const differences = own.map(differenceOf)
    const largest = differences.reduce((so, difference) => Math.abs(difference) > Math.abs(so) ? difference : so, 0)
    return [{ caseId: id, name: caseName(state, id), lines: own, median: medianOf(differences), largest, early: own.some(line => line.early) }]
  })
  return {
    unit: state.snapshot.site.temperatureUnit, readings: lines.length, median: medianOf(lines.map(differenceOf)),
    early: cases.filter(item => item.early).map(item => item.name), cases,
  }
}

/** What came less what was foretold, in the site's unit. */
export function differenceOf({ came, foretold }: ForecastLine): number {
  return came - foretold
}

/** "+0.4", "−1.2", and "0.0" for what is nothing when it is rounded. */
export function differenceWords(difference: number): string {
  const words = numberWords(Math.abs(difference))
  return words === numberWords(0) ? words : `${difference > 0 ? '+' : '−'}${words}`
}

function medianOf(differences: readonly number[]): number {
  const sorted = differences.map(Math.abs).sort((a, b) => a - b)
  const middle = sorted.length >> 1
  if (sorted.length === 0) return 0
  return sorted.length % 2 === 1 ? sorted[middle]! : (sorted[middle - 1]! + sorted[middle]!) / 2
}
