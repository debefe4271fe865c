import { describe, expect, it } from 'vitest'
import { fitCase } from '~~/server/utils/hold/case-fit'
import type { CaseEvidence } from '~~/server/utils/hold/case-fit'
import { DEFAULT_FROZEN_HOLD, holdInputOf } from '~~/server/utils/hold/defaults'
import { holdTime } from '~~/server/utils/hold'
import { median, seeded } from '../../support/seeded'

const LIMIT_C = 5
const rounded = (c: number) => Math.round(10 * c) / 10

const chilled = (change: Partial<CaseEvidence>): CaseEvidence => ({ kind: 'open-multideck', usualC: 2, limitC: LIMIT_C, ambientC: 24, priorTauHours: 3, before: [], since: [], ...change })

describe('fit of a case since control was lost', () => {
  it('with its start alone, says what the time constant says, and is careful by the spread of the prior', () => {
    const { minutesFrom, tauHours, n } = fitCase(chilled({ before: [2] }))
    expect(n).toBe(0)
    expect(tauHours).toBeCloseTo(3, 9)
    const { likely, careful } = minutesFrom(0)!
    expect(likely).toBeCloseTo(180 * Math.log(22 / 19), 6) // the lumped formula, Incropera ch. 5
    expect(careful).toBeGreaterThan(0.4 * likely)
    expect(careful).toBeLessThan(0.5 * likely)
  })

  it('takes what was read before for the start only: a long wait before does not slow the course', () => {
    const since = [{ minutes: 10, c: 3 }, { minutes: 20, c: 3.9 }]
    const { tauHours } = fitCase(chilled({ before: [2, 2, 2, 2], since }))
    expect(Math.abs(Math.log(tauHours! / 3.7))).toBeLessThan(0.25) // 1.9 K of 22 in 20 minutes: τ 3.7 h
  })

  it('with two readings keeps a careful time that somebody can use', () => {
    const { minutesFrom } = fitCase(chilled({ usualC: 3.1, before: [3.1, 3.2], since: [{ minutes: 6, c: 3.3 }, { minutes: 14, c: 3.6 }] }))
    const { likely, careful } = minutesFrom(14)!
    expect(likely).toBeGreaterThan(15)
    expect(careful).toBeGreaterThan(0.35 * likely)
  })

  it('a case that nobody read begins near its usual temperature, and says so by a wide spread', () => {
    const share = (before: number[]) => { const { likely, careful } = fitCase(chilled({ before })).minutesFrom(0)!; return careful / likely }
    expect(share([])).toBeLessThan(share([2]))
    expect(fitCase(chilled({})).at(0)).toBeCloseTo(2, 9)
  })

  it('over its limit: no time left', () => {
    const { minutesFrom } = fitCase(chilled({ before: [4], since: [{ minutes: 20, c: 6 }, { minutes: 30, c: 6.6 }] }))
    expect(minutesFrom(30)).toEqual({ likely: 0, careful: 0 })
  })

  it('is honest from the first reading on, on 600 synthetic cases each (our own, seeded)', () => {
    for (const count of [0, 1, 2, 3]) {
      const { notLate, medianShare, useless } = honesty(600, () => count)
      expect(notLate, `${count} readings`).toBeGreaterThanOrEqual(0.95)
      expect(medianShare, `${count} readings`).toBeGreaterThanOrEqual(0.4)
      expect(useless, `${count} readings`).toBeLessThanOrEqual(0.01)
    }
  })

  it('with 4 to 12 readings is not late in 95 of 100, errs by at most 15 % and uses 0.4 of the truth', () => {
    const { notLate, medianError, medianShare } = honesty(600, random => 4 + Math.floor(random() * 9))
    expect(notLate).toBeGreaterThanOrEqual(0.95)
    expect(medianError).toBeLessThanOrEqual(0.15)
    expect(medianShare).toBeGreaterThanOrEqual(0.4)
  })
})

describe('fit of frozen product', () => {
  const frozen = (change: Partial<CaseEvidence>): CaseEvidence => ({ kind: 'open-coffin', usualC: -20, limitC: -12, ambientC: 24, priorTauHours: 24, before: [-20], since: [], ...change })
  const truth = (speed: number, minutes: number) => {
    const input = holdInputOf('open-coffin', { startC: -20, ambientC: 24, limitC: -1, uaPerKgWPerK: speed * DEFAULT_FROZEN_HOLD['open-coffin'].uaPerKgWPerK })
    const { curve } = holdTime(input)
    const next = curve.findIndex(point => point.minute >= minutes)
    const [a, b] = [curve[Math.max(0, next - 1)]!, curve[next]!]
    return a.minute === b.minute ? a.c : a.c + (b.c - a.c) * (minutes - a.minute) / (b.minute - a.minute)
  }

  it('with its start alone is the enthalpy balance with the prior conductance (Chen, ASHRAE Refrigeration ch. 19)', () => {
    const { minutesFrom, tauHours } = fitCase(frozen({}))
    const expected = holdTime(holdInputOf('open-coffin', { startC: -20, ambientC: 24, limitC: -12 })).minutes!
    expect(minutesFrom(0)!.likely).toBeCloseTo(expected, 4)
    expect(minutesFrom(0)!.careful).toBeGreaterThan(0.35 * expected)
    expect(minutesFrom(0)!.careful).toBeLessThan(0.6 * expected)
    expect(tauHours).toBeNull()
  })

  it('follows readings of product that warms faster or slower than the prior', () => {
    for (const speed of [0.6, 1.6]) {
      const since = [10, 20, 30, 40, 50, 60].map(minutes => ({ minutes, c: truth(speed, minutes) }))
      const { at, minutesFrom } = fitCase(frozen({ since }))
      const whole = holdTime(holdInputOf('open-coffin', { startC: -20, ambientC: 24, limitC: -12, uaPerKgWPerK: speed * 0.25 })).minutes!
      expect(Math.abs(minutesFrom(0)!.likely / whole - 1)).toBeLessThan(0.1)
      expect(at(30)).toBeCloseTo(truth(speed, 30), 1)
    }
  })
})

/** Chilled cases with τ 1 to 15 h, read once before control was lost and every ten minutes after, σ 0.3 K; the prior out by up to a factor 2. */
function honesty(cases: number, countOf: (random: () => number) => number) {
  const random = seeded(20260302)
  const uniform = (low: number, high: number) => low + (high - low) * random()
  const normal = () => Math.sqrt(-2 * Math.log(1 - random())) * Math.cos(2 * Math.PI * random())
  const errors: number[] = []
  const shares: number[] = []
  while (errors.length < cases) {
    const tauHours = Math.exp(uniform(0, Math.log(15)))
    const [startC, ambientC] = [uniform(-3, 2), uniform(18, 28)]
    const truthC = (minutes: number) => ambientC + (startC - ambientC) * Math.exp(-minutes / (60 * tauHours))
    const count = countOf(random)
    const left = 60 * tauHours * Math.log((ambientC - truthC(10 * count)) / (ambientC - LIMIT_C))
    if (left < 10) continue
    const since = Array.from({ length: count }, (_, index) => ({ minutes: 10 * (index + 1), c: rounded(truthC(10 * (index + 1)) + 0.3 * normal()) }))
    const { minutesFrom } = fitCase(chilled({ ambientC: ambientC + uniform(-2, 2), priorTauHours: tauHours * 2 ** uniform(-1, 1), before: [rounded(startC + uniform(-0.3, 0.3) + 0.3 * normal())], since }))
    const { likely, careful } = minutesFrom(10 * count)!
    errors.push(Math.abs(likely - left) / left)
    shares.push(careful / left)
  }
  return {
    notLate: shares.filter(share => share <= 1).length / cases, medianError: median(errors), medianShare: median(shares),
    useless: shares.filter(share => share < 0.1).length / cases,
  }
}
