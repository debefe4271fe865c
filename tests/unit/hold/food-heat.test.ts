import { describe, expect, it } from 'vitest'
import { enthalpyKjPerKg, FOODS, iceFraction, unfrozenSpecificHeat } from '~~/server/utils/hold'

describe('heat of foods, against ASHRAE Handbook, Refrigeration, ch. 19 (examples from memory, formulas published)', () => {
  it('example 2: 150 kg of lamb from 10 to 0 °C: c 3.591 kJ/(kg·K), 5 386 kJ (book 5 390)', () => {
    const c = unfrozenSpecificHeat({ water: 0.7342, protein: 0.2029, fat: 0.0525, ash: 0.0106 }, 5)
    expect(c).toBeCloseTo(3.591, 3)
    expect(150 * c * 10).toBeCloseTo(5386, 0)
  })

  it('example 3: 150 kg of beef from 10 to -20 °C: 48.79, 243.13 and 280.37 kJ/kg; 34 737 kJ (book 34 700)', () => {
    const [cold, freezing, warm] = [-20, -1.7, 10].map(c => enthalpyKjPerKg(FOODS.beef, c))
    expect(cold).toBeCloseTo(48.79, 2)
    expect(freezing).toBeCloseTo(243.13, 2)
    expect(warm).toBeCloseTo(280.37, 2)
    expect(150 * (warm! - cold!)).toBeCloseTo(34737, 0)
  })

  it('example 1: beef at -20 °C is 0.516 ice; 77.5 kg of 150 kg (book, from 0.52: 78)', () => {
    const fraction = iceFraction(0.58, -1.7, -20)
    expect(fraction).toBeCloseTo(0.516, 3)
    expect(150 * fraction).toBeCloseTo(77.5, 1)
  })

  it('Choi and Okos at 0 °C give the leading terms of their published polynomials', () => {
    const parts = { water: 0.5, protein: 0.2, fat: 0.1, carbohydrate: 0.1, fibre: 0.05, ash: 0.05 }
    const byHand = 0.5 * 4.1762 + 0.2 * 2.0082 + 0.1 * 1.9842 + 0.1 * 1.5488 + 0.05 * 1.8459 + 0.05 * 1.0926
    expect(unfrozenSpecificHeat(parts, 0)).toBeCloseTo(byHand, 12)
  })

  it('enthalpy is 0 at -40 °C, continuous at freezing, and refused below -40 °C', () => {
    for (const food of Object.values(FOODS)) {
      expect(enthalpyKjPerKg(food, -40)).toBe(0)
      const jump = enthalpyKjPerKg(food, food.freezingC + 1e-9) - enthalpyKjPerKg(food, food.freezingC)
      expect(Math.abs(jump)).toBeLessThan(1e-6)
      expect(() => enthalpyKjPerKg(food, -40.1)).toThrow(RangeError)
    }
  })

  it('there is no ice at or above the freezing point, and more of it the colder', () => {
    expect(iceFraction(0.58, -1.7, -1.7)).toBe(0)
    expect(iceFraction(0.58, -1.7, 4)).toBe(0)
    expect(iceFraction(0.58, -1.7, -30)).toBeGreaterThan(iceFraction(0.58, -1.7, -10))
  })
})
