import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { fitHold, holdTime } from '~~/server/utils/hold'
import type { FitInput } from '~~/shared/schemas/hold'
import { median, seeded } from '../../support/seeded'

const startMs = Date.parse('2026-03-01T02:00:00Z')
const at = (minutes: number) => new Date(startMs + minutes * 60_000).toISOString()

interface Truth { startC: number, ambientC: number, tauHours: number }

function truthC({ startC, ambientC, tauHours }: Truth, minutes: number): number {
  return ambientC + (startC - ambientC) * Math.exp(-minutes / (60 * tauHours))
}

function exactFit(truth: Truth, count: number, rest: Partial<FitInput> = {}) {
  const readings = Array.from({ length: count }, (_, index) => ({ at: at(10 * index), c: truthC(truth, 10 * index) }))
  return fitHold({
    ambientC: truth.ambientC, priorTauHours: truth.tauHours, limitC: 5, readings, now: readings.at(-1)!.at, ...rest,
  })
}

describe('fit to readings', () => {
  it('readings without error and a right prior give the truth back (the lumped formula itself)', () => {
    fc.assert(fc.property(
      fc.double({ min: -2, max: 2, noNaN: true }), fc.double({ min: 15, max: 30, noNaN: true }),
      fc.double({ min: 4, max: 15, noNaN: true }), fc.integer({ min: 1, max: 6 }),
      (startC, ambientC, tauHours, count) => {
        const truth = { startC, ambientC, tauHours }
        const fit = exactFit(truth, count)
        expect(fit.tauHours).toBeCloseTo(tauHours, 6)
        expect(fit.rmseK).toBeLessThan(1e-6)
        expect(fit.n).toBe(count)
        const left = holdTime({ kind: 'chilled', ...truth, startC: truthC(truth, 10 * (count - 1)), limitC: 5 })
        expect(fit.minutesToLimit!.likely).toBeCloseTo(left.minutes!, 4)
        expect(fit.minutesToLimit!.careful).toBeLessThanOrEqual(fit.minutesToLimit!.likely)
      }))
  })

  it('one reading alone: the prior decides and the careful time is well under the likely one', () => {
    const { minutesToLimit, tauHours, rmseK } = exactFit({ startC: 2, ambientC: 22, tauHours: 3 }, 1)
    expect(tauHours).toBeCloseTo(3, 9)
    expect(rmseK).toBeCloseTo(0, 9)
    expect(minutesToLimit!.likely).toBeCloseTo(180 * Math.log(20 / 17), 6)
    expect(minutesToLimit!.careful).toBeLessThan(0.5 * minutesToLimit!.likely)
  })

  it('its spread is the one that a numerical propagation of the same covariance gives', () => {
    // One reading at minute 0: the covariance is diagonal (0.3 K, 1.2 K, 0.4), so the terms add by hand.
    const { likely, careful } = exactFit({ startC: 2, ambientC: 22, tauHours: 3 }, 1).minutesToLimit!
    const minutes = (startC: number, ambientC: number, tauHours: number) =>
      60 * tauHours * Math.log((ambientC - startC) / (ambientC - 5))
    const h = 1e-5
    const byStart = (minutes(2 + h, 22, 3) - minutes(2 - h, 22, 3)) / (2 * h) * 0.3
    const byAmbient = (minutes(2, 22 + h, 3) - minutes(2, 22 - h, 3)) / (2 * h) * 1.2
    const byTau = minutes(2, 22, 3) * 0.4
    expect(likely - careful).toBeCloseTo(1.645 * Math.hypot(byStart, byAmbient, byTau), 4)
  })

  it('minutes count from now, not from the last reading', () => {
    const truth = { startC: 1, ambientC: 22, tauHours: 5 }
    const early = exactFit(truth, 3).minutesToLimit!
    const late = exactFit(truth, 3, { now: at(32) }).minutesToLimit!
    expect(early.likely - late.likely).toBeCloseTo(12, 6)
  })

  it('at or over the limit: 0, even where the ambient would draw it back', () => {
    expect(exactFit({ startC: 6, ambientC: 22, tauHours: 3 }, 4).minutesToLimit).toEqual({ likely: 0, careful: 0 })
    expect(exactFit({ startC: 8, ambientC: 4, tauHours: 9 }, 4).minutesToLimit).toEqual({ likely: 0, careful: 0 })
    expect(exactFit({ startC: 1, ambientC: 22, tauHours: 3 }, 4, { now: at(600) }).minutesToLimit)
      .toEqual({ likely: 0, careful: 0 })
  })

  it('an ambient that is not over the limit: never', () => {
    expect(exactFit({ startC: 2, ambientC: 4, tauHours: 3 }, 4).minutesToLimit).toBeNull()
    expect(exactFit({ startC: 4, ambientC: -6, tauHours: 3 }, 4).minutesToLimit).toBeNull()
  })

  it('draws τ from a prior that is out by a factor 2 toward the truth', () => {
    const truth = { startC: 0, ambientC: 24, tauHours: 4 }
    for (const priorTauHours of [2, 8]) {
      const { tauHours } = exactFit(truth, 9, { priorTauHours })
      expect(Math.abs(Math.log(tauHours / 4))).toBeLessThan(0.25)
    }
  })

  it('takes any readings that the parser lets through: always finite, careful never over likely', () => {
    fc.assert(fc.property(
      fc.array(fc.double({ min: -30, max: 60, noNaN: true }), { minLength: 1, maxLength: 12 }),
      fc.double({ min: -20, max: 45, noNaN: true }), fc.double({ min: 0.1, max: 50, noNaN: true }),
      fc.integer({ min: 0, max: 30 }),
      (temperatures, ambientC, priorTauHours, gap) => {
        const readings = temperatures.map((c, index) => ({ at: at(gap * index), c }))
        const fit = fitHold({ ambientC, priorTauHours, limitC: 5, readings, now: readings.at(-1)!.at })
        expect(Number.isFinite(fit.tauHours) && fit.tauHours > 0).toBe(true)
        expect(Number.isFinite(fit.rmseK)).toBe(true)
        if (fit.minutesToLimit !== null) {
          const { likely, careful } = fit.minutesToLimit
          expect(careful).toBeGreaterThanOrEqual(0)
          expect(likely).toBeGreaterThanOrEqual(careful)
          expect(Number.isFinite(likely)).toBe(true)
        }
      }))
  })
})

describe('honesty of the fit on synthetic cases (our own, seeded)', () => {
  it('is not late in at least 95 of 100, errs by a median of at most 15 %, and careful is at least 0.4 of the truth', () => {
    const { notLate, medianError, medianShare } = honesty(-3, 2)
    expect(notLate).toBeGreaterThanOrEqual(0.95)
    expect(medianError).toBeLessThanOrEqual(0.15)
    expect(medianShare).toBeGreaterThanOrEqual(0.4)
  })

  it('stays honest for cases that start close under their limit, where there is less of a rise to see', () => {
    const { notLate, medianError, medianShare } = honesty(1, 4.5)
    expect(notLate).toBeGreaterThanOrEqual(0.95)
    expect(medianError).toBeLessThanOrEqual(0.3)
    expect(medianShare).toBeGreaterThanOrEqual(0.4)
  })
})

/**
 * 600 cases with τ 1 to 15 h, an ambient known to ±2 K, a prior out by up to a
 * factor 2, 4 to 12 readings ten minutes apart with σ 0.3 K in steps of 0.1 K,
 * and at least ten minutes to go.
 */
function honesty(lowestStartC: number, highestStartC: number) {
  const random = seeded(20260301)
  const uniform = (low: number, high: number) => low + (high - low) * random()
  const normal = () => Math.sqrt(-2 * Math.log(1 - random())) * Math.cos(2 * Math.PI * random())
  const errors: number[] = []
  const shares: number[] = []
  let late = 0
  while (errors.length < 600) {
    const tauHours = Math.exp(uniform(0, Math.log(15)))
    const truth = { startC: uniform(lowestStartC, highestStartC), ambientC: uniform(18, 28), tauHours }
    const last = 10 * (3 + Math.floor(random() * 9))
    const left = 60 * tauHours * Math.log((truth.ambientC - truthC(truth, last)) / (truth.ambientC - 5))
    if (left < 10) {
      continue
    }
    const readings = Array.from({ length: last / 10 + 1 }, (_, index) => ({
      at: at(10 * index),
      c: Math.round(10 * (truthC(truth, 10 * index) + 0.3 * normal())) / 10,
    }))
    const fit = fitHold({
      ambientC: truth.ambientC + uniform(-2, 2),
      priorTauHours: tauHours * 2 ** uniform(-1, 1),
      limitC: 5, readings, now: at(last),
    })
    const { likely, careful } = fit.minutesToLimit!
    errors.push(Math.abs(likely - left) / left)
    shares.push(careful / left)
    late += careful > left ? 1 : 0
  }
  return { notLate: 1 - late / errors.length, medianError: median(errors), medianShare: median(shares) }
}
