import { describe, expect, it } from 'vitest'
import { differenceWords, forecastSummary } from '../../../shared/record/forecast-summary'
import type { ForecastLine } from '../../../shared/record/record-lines'
import { DAIRY, FISH, storyTo } from '../record/store'

const line = (caseId: string, foretold: number, came: number, change: Partial<ForecastLine> = {}): ForecastLine => ({ caseId, seq: 1, at: 0, readings: 1, foretold, came, errorK: (came - foretold) / 1.8, early: false, ...change })

describe('forecast against what came, in sum', () => {
  const { state } = storyTo('plan')

  it('takes the median of all readings, and of each case the median and the largest with its sign', () => {
    const summary = forecastSummary(state, [line(DAIRY, 38, 38.5), line(DAIRY, 39, 37.8), line(FISH, 36, 36.1), line(DAIRY, 40, 40.2)])
    expect(summary.median).toBeCloseTo(0.35, 9)
    expect(summary.cases.map(item => [item.name, item.lines.length])).toEqual([['Dairy wall', 3], ['Fish service', 1]])
    expect(summary.cases[0]!.median).toBeCloseTo(0.5, 9)
    expect(summary.cases[0]!.largest).toBeCloseTo(-1.2, 9)
  })

  it('names the cases that came early, once each', () => {
    expect(forecastSummary(state, [line(FISH, 36, 42, { early: true }), line(FISH, 36, 43, { early: true }), line(DAIRY, 36, 36)]).early).toEqual(['Fish service'])
  })

  it('has nothing to say of a record without readings in dark', () => {
    expect(forecastSummary(state, [])).toMatchObject({ readings: 0, median: 0, early: [], cases: [] })
  })
})

describe('a difference in words', () => {
  it('bears its sign, but none where it is nothing once it is rounded', () => {
    expect([0.44, -1.2, 0.04, -0.04, 0].map(differenceWords)).toEqual(['+0.4', '−1.2', '0.0', '0.0', '0.0'])
  })
})
