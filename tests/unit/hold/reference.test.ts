/**
 * The frozen hold time beside odex, E. Hairer and G. Wanner's extrapolation method for differential equations:
 * it integrates the enthalpy balance dH/dt = UA·(T∞ − T)/m in time, knowing nothing of the closed form.
 * Enthalpy by Chen (ASHRAE Handbook, Refrigeration, ch. 19), written out here a second time.
 */
import { Solver } from 'odex'
import { describe, expect, it } from 'vitest'
import { holdTime } from '../../../server/utils/hold'

interface Food { water: number, protein: number, fat: number, carbohydrate: number, ash: number, freezingC: number }

// % by mass; peas compared with the table of ASHRAE ch. 19, the others from memory of it.
const FOODS: Record<string, Food> = {
  'peas': { water: 78.86, protein: 5.42, fat: 0.40, carbohydrate: 14.46, ash: 0.86, freezingC: -0.6 },
  'beef': { water: 58.21, protein: 17.48, fat: 22.55, carbohydrate: 0, ash: 0.82, freezingC: -1.7 },
  'chicken': { water: 65.99, protein: 18.60, fat: 15.06, carbohydrate: 0, ash: 0.79, freezingC: -2.8 },
  'cod': { water: 81.22, protein: 17.81, fat: 0.67, carbohydrate: 0, ash: 1.16, freezingC: -2.2 },
  'ice-cream': { water: 61.00, protein: 3.50, fat: 11.00, carbohydrate: 23.60, ash: 0.90, freezingC: -5.6 },
}

/** kJ/kg over −40 °C. */
function enthalpy({ water, protein, freezingC }: Food, celsius: number): number {
  const solids = 1 - water / 100
  const below = (t: number) => (t + 40) * (1.55 + 1.26 * solids - (water / 100 - 0.4 * protein / 100) * 333.6 * freezingC / (-40 * t))
  if (celsius <= freezingC) return below(celsius)
  return below(freezingC) + (celsius - freezingC) * (4.19 - 2.30 * solids - 0.628 * solids ** 3)
}

/** The temperature that goes with an enthalpy, by halving. °C */
function temperatureOf(food: Food, kjPerKg: number): number {
  let [low, high] = [-40, 60]
  for (let step = 0; step < 60; step += 1) {
    const middle = (low + high) / 2
    if (enthalpy(food, middle) < kjPerKg) low = middle
    else high = middle
  }
  return (low + high) / 2
}

/** Temperature after some minutes, °C. */
function integrated(food: Food, startC: number, ambientC: number, wPerKgPerK: number, minutes: number): number {
  const solver = new Solver(1)
  solver.absoluteTolerance = solver.relativeTolerance = 1e-9
  solver.maxSteps = 100_000
  const slopes = (_: number, [kjPerKg]: number[]) => [wPerKgPerK * (ambientC - temperatureOf(food, kjPerKg!)) / 1000 * 60]
  const { y, outcome } = solver.solve(slopes, 0, [enthalpy(food, startC)], minutes)
  expect(outcome).toBe(0)
  return temperatureOf(food, y[0]!)
}

describe('frozen hold beside an integration in time by odex', () => {
  it.each(Object.keys(FOODS))('%s is at its limit when the closed form says so', (food) => {
    // W/(kg·K): our own estimates for an open coffin, a glass door and a walk-in; °C.
    for (const [wPerKgPerK, startC, ambientC, limitC] of [[0.25, -22, 24, -12], [0.15, -20, 22, -5.6], [0.06, -18, 4, -1], [0.25, -25, 30, 5], [0.25, 4, -30, -18]] as const) {
      const { minutes } = holdTime({ kind: 'frozen', food: food as 'peas', massKg: 2, uaWPerK: 2 * wPerKgPerK, startC, ambientC, limitC })
      expect(integrated(FOODS[food]!, startC, ambientC, wPerKgPerK, minutes!)).toBeCloseTo(limitC, 4)
    }
  })
})
