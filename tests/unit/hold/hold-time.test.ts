import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { heldOnHold, holdTime } from '~~/server/utils/hold'
import type { ChilledHold, FrozenHold } from '~~/shared/schemas/hold'

const chilled = (input: Partial<ChilledHold> = {}): ChilledHold =>
  ({ kind: 'chilled', startC: 2, ambientC: 22, tauHours: 3, limitC: 5, ...input })
const peas = (input: Partial<FrozenHold> = {}): FrozenHold =>
  ({ kind: 'frozen', food: 'peas', massKg: 1, uaWPerK: 0.25, startC: -20, ambientC: 22, limitC: -12, ...input })

describe('chilled hold, against published figures', () => {
  it('Çengel, Heat Transfer, example 4-1: thermocouple sphere reaches 99 % of the change in 10 s', () => {
    const lengthM = 0.001 / 6
    expect(210 * lengthM / 35).toBeCloseTo(0.001, 6)
    const tauHours = 8500 * 320 * lengthM / 210 / 3600
    const { minutes } = holdTime(chilled({ startC: 0, ambientC: 100, limitC: 99, tauHours }))
    expect(minutes! * 60).toBeCloseTo(10, 0)
  })

  it('Incropera, Fundamentals of Heat and Mass Transfer, example 5.1: bead of 7.06e-4 m reaches 199 °C in 5.2 s', () => {
    const diameterM = 6 * 400 * 1 / (8500 * 400)
    expect(diameterM).toBeCloseTo(7.06e-4, 6)
    const tauHours = 8500 * 400 * diameterM / 6 / 400 / 3600
    const { minutes } = holdTime(chilled({ startC: 25, ambientC: 200, limitC: 199, tauHours }))
    expect(minutes! * 60).toBeCloseTo(5.2, 1)
  })

  it('a measured rise of 5.5 K in 2.5 h in an open vertical case gives τ 8.69 h from 22 K under ambient, 7.77 h from 20 K', () => {
    for (const [belowK, tauHours] of [[22, 8.69], [20, 7.77]] as const) {
      const { minutes } = holdTime(chilled({ startC: 0, ambientC: belowK, limitC: 5.5, tauHours }))
      expect(minutes).toBeCloseTo(150, 0)
    }
  })

  it('τ 6 h, 36 °F to 5 °C in 24 °C: 49.1 min (computed by hand from the lumped formula)', () => {
    expect(holdTime(chilled({ startC: 2.222, ambientC: 24, tauHours: 6 })).minutes).toBeCloseTo(49.1, 1)
  })

  it('internal heat raises the ambient by P/UA (lumped balance with a source, Incropera ch. 5)', () => {
    const heated = holdTime(chilled({ heatW: 40, uaWPerK: 20 }))
    expect(heated).toEqual(holdTime(chilled({ ambientC: 24 })))
  })
})

describe('direction of drift', () => {
  it.each([
    ['at the limit', chilled({ startC: 5 }), 0],
    ['over it and warming', chilled({ startC: 6 }), 0],
    ['ambient at the limit', chilled({ ambientC: 5 }), null],
    ['ambient under the limit', chilled({ ambientC: 4 }), null],
    ['past the low mark and cooling', chilled({ startC: -2, ambientC: -5, limitC: -1 }), 0],
    ['supply air not under the low mark', chilled({ startC: 3, ambientC: 0, limitC: -1 }), null],
    ['over the limit, cooling, never back', chilled({ startC: 8, ambientC: 6 }), null],
    ['no drift, under the limit', chilled({ startC: 2, ambientC: 2 }), null],
    ['no drift, over the limit', chilled({ startC: 6, ambientC: 6 }), 0],
    ['no drift, above a low mark', chilled({ startC: 2, ambientC: 2, limitC: -1, limitSide: 'lower' }), null],
    ['under an upper limit and cooling', chilled({ startC: 3, ambientC: 2, limitSide: 'upper' }), null],
    ['above a low mark and warming', chilled({ startC: 3, ambientC: 20, limitC: -1, limitSide: 'lower' }), null],
    ['over an upper limit and warming', chilled({ startC: 6, limitSide: 'upper' }), 0],
    ['frozen, at the limit', peas({ startC: -12 }), 0],
    ['frozen, ambient under the limit', peas({ ambientC: -14 }), null],
  ])('%s', (_, input, minutes) => {
    expect(holdTime(input).minutes).toBe(minutes)
  })

  it('a limit within a rounding of the start counts as reached', () => {
    expect(holdTime(chilled({ startC: 0, ambientC: 20, limitC: 5e-324 })).minutes).toBe(0)
  })

  it('a start past the limit that drifts back gives the minutes until it is back', () => {
    const { minutes, curve } = holdTime(chilled({ startC: 8, ambientC: 2 }))
    expect(minutes).toBeCloseTo(180 * Math.log(2), 9)
    expect(curve.at(-1)).toEqual({ minute: minutes, c: 5 })
  })

  it('a case held on by hand: supply air 5 K over suction, time to -1 °C, and the gap since its defrost', () => {
    const held = heldOnHold({
      startC: 3, tauHours: 3, sstC: -8, usualGapHours: 6,
      lastDefrostAt: '2026-03-01T00:00:00Z', now: '2026-03-01T02:30:00Z',
    })
    expect(held.supplyC).toBe(-3)
    expect(held.minutesToLowMark).toBeCloseTo(180 * Math.log(6 / 2), 9)
    expect(held.minutesSinceDefrost).toBe(150)
    expect(held.minutesOfGapLeft).toBe(210)
  })

  it('a case held on by a mild suction never gets to the low mark, and an unknown defrost stays unknown', () => {
    const held = heldOnHold({
      startC: 3, tauHours: 3, sstC: -6, usualGapHours: 6, lastDefrostAt: null, now: '2026-03-01T02:30:00Z',
    })
    expect(held).toEqual({ supplyC: -1, minutesToLowMark: null, minutesSinceDefrost: null, minutesOfGapLeft: null })
  })
})

describe('frozen hold', () => {
  it('peas against the same balance integrated step by step by Simpson (our own)', () => {
    for (const [startC, ambientC, limitC] of [[-25, 22, -12], [-20, 22, 3], [4, -30, -18], [-20, 0, -5], [-20, 0.01, -1], [-20, 1, -1]] as const) {
      const { minutes } = holdTime(peas({ startC, ambientC, limitC }))
      expect(minutes! / integratedMinutes(startC, ambientC, limitC)).toBeCloseTo(1, 5)
    }
  })

  it('an ambient close to 0 °C gives the same as one beside it: the two forms of the integral agree', () => {
    const around = [-0.0301, -0.0299, 0.0299, 0.0301].map(ambientC =>
      holdTime(peas({ ambientC, limitC: -0.6 - 1e-9 })).minutes!)
    expect(around[0]! / around[1]!).toBeCloseTo(1, 3)
    expect(around[3]! / around[2]!).toBeCloseTo(1, 3)
    expect(around[0]).toBeGreaterThan(around[1]!)
    expect(around[2]).toBeGreaterThan(around[3]!)
  })

  it('a named food and the same figures sent by hand agree', () => {
    const food = { water: 78.86, protein: 5.42, fat: 0.4, carbohydrate: 14.46, ash: 0.86, freezingC: -0.6 }
    expect(holdTime(peas({ food }))).toEqual(holdTime(peas()))
  })

  it('warms slower through the melting range than below it', () => {
    const { minutes, curve } = holdTime(peas({ limitC: 3 }))
    expect(minutes).toBeGreaterThan(300)
    const steps = curve.slice(1).map((point, index) => point.c - curve[index]!.c)
    expect(steps[0]).toBeGreaterThan(5 * steps[steps.length >> 1]!)
  })
})

describe('properties', () => {
  const hundredths = (low: number, high: number) => fc.integer({ min: 100 * low, max: 100 * high }).map(value => value / 100)
  const anyCase = fc.record({
    startC: hundredths(-30, 30),
    ambientC: hundredths(-30, 40),
    limitC: hundredths(-30, 30),
    tauHours: hundredths(1, 20),
  })
  const either = fc.tuple(anyCase, fc.boolean()).map(([known, isFrozen]) =>
    isFrozen ? peas({ startC: known.startC, ambientC: known.ambientC, limitC: known.limitC }) : chilled(known))

  it('a colder start never shortens the hold of a warming case', () => {
    fc.assert(fc.property(
      fc.double({ min: -30, max: 4.9, noNaN: true }), fc.double({ min: 0, max: 10, noNaN: true }), fc.boolean(),
      (startC, colderK, isFrozen) => {
        const start = Math.max(-40, startC - colderK)
        const [warm, cold] = isFrozen
          ? [peas({ startC, limitC: 5 }), peas({ startC: start, limitC: 5 })]
          : [chilled({ startC }), chilled({ startC: start })]
        expect(holdTime(cold).minutes!).toBeGreaterThanOrEqual(holdTime(warm).minutes! - 1e-9)
      }))
  })

  it('hold is in proportion to τ, and a hotter shop never lengthens it', () => {
    fc.assert(fc.property(
      fc.double({ min: -5, max: 4.9, noNaN: true }), fc.double({ min: 0.1, max: 10, noNaN: true }),
      fc.double({ min: 6, max: 40, noNaN: true }), fc.double({ min: 0, max: 10, noNaN: true }),
      (startC, factor, ambientC, hotterK) => {
        const once = holdTime(chilled({ startC, ambientC })).minutes!
        expect(holdTime(chilled({ startC, ambientC, tauHours: 3 * factor })).minutes! / once).toBeCloseTo(factor, 6)
        expect(holdTime(chilled({ startC, ambientC: ambientC + hotterK })).minutes!).toBeLessThanOrEqual(once + 1e-9)
      }))
  })

  it('every curve begins at the start, runs one way, stays short of the ambient and ends at the limit or at 10 h', () => {
    fc.assert(fc.property(either, (input) => {
      const { minutes, curve } = holdTime(input)
      expect(curve.length).toBeGreaterThanOrEqual(20)
      expect(curve[0]).toEqual({ minute: 0, c: input.startC })
      const last = curve.at(-1)!
      const reached = minutes !== null && minutes > 0 && minutes <= 600
      expect(last.minute).toBe(reached ? minutes : 600)
      if (reached) {
        expect(last.c).toBe(input.limitC)
      }
      const sign = Math.sign(input.ambientC - input.startC)
      expect(curve.slice(1).every((point, index) =>
        point.minute > curve[index]!.minute
        && sign * (point.c - curve[index]!.c) >= -1e-9
        && sign * (input.ambientC - point.c) >= -1e-9)).toBe(true)
    }))
  })
})

/** The frozen balance of one kilogram of peas at 0.25 W/K, stepped in temperature. */
function integratedMinutes(startC: number, ambientC: number, limitC: number): number {
  const solids = 1 - 0.7886
  const melt = (0.7886 - 0.4 * 0.0542) * 333.6 * 0.6 / 40
  const heatAt = (c: number) => c <= -0.6
    ? 1.55 + 1.26 * solids + 40 * melt / c ** 2
    : 4.19 - 2.3 * solids - 0.628 * solids ** 3
  const stops = [startC, limitC]
  if ((startC + 0.6) * (limitC + 0.6) < 0) {
    stops.splice(1, 0, -0.6)
  }
  let seconds = 0
  for (let leg = 1; leg < stops.length; leg += 1) {
    const steps = 4000
    const width = (stops[leg]! - stops[leg - 1]!) / steps
    // The heat jumps at the freezing point: each leg keeps to its own side of it.
    const inward = (c: number) => c === -0.6 ? c + (stops[leg]! + stops[leg - 1]! > -1.2 ? 1e-12 : 0) : c
    const rate = (c: number) => 1000 * heatAt(inward(c)) / (0.25 * (ambientC - c))
    for (let step = 0; step < steps; step += 1) {
      const c = stops[leg - 1]! + step * width
      seconds += width / 6 * (rate(c) + 4 * rate(c + width / 2) + rate(c + width))
    }
  }
  return seconds / 60
}
