/** Conversions by the definition of the degree Fahrenheit, T(°F) = 1.8·T(°C) + 32. */
import { describe, expect, it } from 'vitest'
import { assess } from '../../../server/utils/holding'
import { convertDifference, convertTemperature, isAtOrOver, isBelow, isOver } from '../../../server/utils/holding/units'
import { log } from './log'

describe('conversion', () => {
  it.each([[40, 4.44], [41, 5.00], [45, 7.22], [50, 10.0], [70, 21.11], [0, -17.78]])('%d °F is %d °C to two decimals', (fahrenheit, celsius) => {
    expect(Number(convertTemperature(fahrenheit, 'F', 'C').toFixed(2))).toBe(celsius)
    expect(convertTemperature(convertTemperature(fahrenheit, 'F', 'C'), 'C', 'F')).toBeCloseTo(fahrenheit, 9)
  })

  it('moves no zero for a difference', () => {
    expect(convertDifference(1, 'C', 'F')).toBe(1.8)
    expect(convertDifference(1.8, 'F', 'C')).toBe(1)
    expect(convertDifference(1.8, 'F', 'F')).toBe(1.8)
  })
})

describe('comparison within a millionth of a degree', () => {
  it('has 39.2 °F at 4 °C', () => {
    const celsius = convertTemperature(39.2, 'F', 'C')
    expect(isOver(celsius, 4)).toBe(false)
    expect(isAtOrOver(celsius, 4)).toBe(true)
    expect(isBelow(celsius, 4)).toBe(false)
    expect(isOver(4.00001, 4)).toBe(true)
    expect(isBelow(3.99999, 4)).toBe(true)
  })

  it('judges a reading by the rulebook’s own unit', () => {
    expect(assess(log('ca-4c/tcs', [[0, 39.2]], { unit: 'F' }))).toMatchObject({ verdict: 'within', limit: { value: 4, unit: 'C' } })
    expect(assess(log('ca-4c/tcs', [[0, 39.21]], { unit: 'F' })).verdict).toBe('above')
    expect(assess(log('us-food-code-2022/tcs', [[0, 5]], { unit: 'C' }))).toMatchObject({ verdict: 'within', limit: { value: 41, unit: 'F' } })
    expect(assess(log('us-food-code-2022/tcs', [[0, 5.01]], { unit: 'C' })).verdict).toBe('above')
    // 4.44 °C is 40 °F rounded: a limit of 41 °F has room above it, one of 4 °C has none.
    expect(assess(log('us-food-code-2022/tcs', [[0, 4.44]], { unit: 'C' })).verdict).toBe('within')
    expect(assess(log('ca-4c/tcs', [[0, 4.44]])).verdict).toBe('above')
    // 7.22 °C is a little under 45 °F, 7.23 °C a little over; 10 °C is 50 °F itself.
    expect(assess(log('us-food-code-2022/shell-eggs', [[0, 7.22]], { unit: 'C' })).verdict).toBe('within')
    expect(assess(log('us-food-code-2022/shell-eggs', [[0, 7.23]], { unit: 'C' })).verdict).toBe('above')
    expect(assess(log('us-sf-dph/tcs', [[0, 10]], { unit: 'C' })).verdict).toBe('discard')
    expect(assess(log('us-sf-dph/tcs', [[0, 9.99]], { unit: 'C' })).verdict).toBe('above')
    // 0 °F is warmer than −18 °C.
    expect(assess(log('eu-853-2004/quick-frozen-storage', [[0, 0]], { unit: 'F' })).verdict).toBe('act')
    expect(assess(log('eu-853-2004/quick-frozen-storage', [[0, -0.4]], { unit: 'F' })).verdict).toBe('within')
    // 21.11 °C is 70 °F rounded down.
    expect(assess(log('us-wa-doh/tcs', [[0, 5], [121, 21.11]], { unit: 'C' })).verdict).toBe('discard')
  })
})
