/** Published cases, each with its source: V read in the law or official text, VS in a secondary copy. */
import { describe, expect, it } from 'vitest'
import { assess, rulebooks } from '../../../server/utils/holding'
import { at, log } from './log'

describe('Washington State Department of Health outage chart (V)', () => {
  it('lets food that began at 41 °F or below and stands at 46 to 50 °F after 2 hours be sold up to 4 hours', () => {
    for (const value of [46, 50]) {
      const assessment = assess(log('us-wa-doh/tcs', [[0, 40], [130, value]], { now: 240 }))
      expect(assessment).toMatchObject({ verdict: 'above', deadline: at(240) })
      expect(assessment.act).toContain('may be sold')
      expect(assessment.act).toContain('at once')
    }
    expect(assess(log('us-wa-doh/tcs', [[0, 40], [130, 46]], { now: 240.01 })).verdict).toBe('discard')
  })

  it('discards at 51 °F or over after 2 hours', () => {
    expect(assess(log('us-wa-doh/tcs', [[0, 40], [120, 51]])).verdict).toBe('above')
    expect(assess(log('us-wa-doh/tcs', [[0, 40], [121, 51]]))).toMatchObject({ verdict: 'discard', deadline: null })
  })

  it('keeps 42 to 45 °F after 4 hours, with no number', () => {
    for (const value of [42, 45])
      expect(assess(log('us-wa-doh/tcs', [[0, 40], [250, value]], { now: 400 }))).toMatchObject({ verdict: 'above', deadline: null })
  })

  it('asks a decision on food that did not begin at 41 °F or below', () => {
    const assessment = assess(log('us-wa-doh/tcs', [[0, 43], [10, 40]]))
    expect(assessment).toMatchObject({ verdict: 'act', deadline: null, startedWarm: true })
    expect(assess(log('us-wa-doh/tcs', [[5, 47]]))).toMatchObject({ verdict: 'act', deadline: at(240) })
  })
})

describe('San Francisco Department of Public Health outage chart (V)', () => {
  it('asks for 45 °F within 2 hours of food at 46 to under 50 °F in the first 2 hours', () => {
    for (const value of [46, 49.9]) {
      const assessment = assess(log('us-sf-dph/tcs', [[0, value]], { now: 60 }))
      expect(assessment).toMatchObject({ verdict: 'above', deadline: at(120) })
      expect(assessment.act).toContain('45 °F or below within 2 hours')
    }
  })

  it('discards food at 46 to under 50 °F over 4 hours', () => {
    for (const value of [46, 49.9])
      expect(assess(log('us-sf-dph/tcs', [[0, 40], [241, value]])).verdict).toBe('discard')
  })

  it('discards food at 50 °F or over at any time', () => {
    expect(assess(log('us-sf-dph/tcs', [[0, 40], [1, 50]])).verdict).toBe('discard')
  })

  it('gives an hour from when 46 to under 50 °F was seen in the second row, and ends the act at 45 °F', () => {
    const seen = assess(log('us-sf-dph/tcs', [[0, 40], [130, 47]], { now: 150 }))
    expect(seen).toMatchObject({ verdict: 'act', deadline: at(190) })
    expect(assess(log('us-sf-dph/tcs', [[0, 40], [130, 47]], { now: 190 })).verdict).toBe('act')
    expect(assess(log('us-sf-dph/tcs', [[0, 40], [130, 47]], { now: 190.5 })).verdict).toBe('discard')
    expect(assess(log('us-sf-dph/tcs', [[0, 40], [130, 47], [190, 45]])).verdict).toBe('above')
    expect(assess(log('us-sf-dph/tcs', [[0, 40], [130, 47], [191, 45]])).verdict).toBe('discard')
  })

  it('counts the hour from the start of the row for food that was there before', () => {
    expect(assess(log('us-sf-dph/tcs', [[0, 40], [100, 47], [130, 47]]))).toMatchObject({ verdict: 'act', deadline: at(180) })
    expect(assess(log('us-sf-dph/tcs', [[0, 40], [200, 43]], { now: 241 }))).toMatchObject({ verdict: 'act', deadline: at(300) })
  })

  it('never gives past 4 hours what the chart discards there', () => {
    expect(assess(log('us-sf-dph/tcs', [[0, 40], [220, 47]]))).toMatchObject({ verdict: 'act', deadline: at(240) })
    expect(assess(log('us-sf-dph/tcs', [[0, 40], [220, 47]], { now: 240.5 })).verdict).toBe('discard')
  })

  it('gives an hour from when food to 45 °F was seen over 4 hours, and ends the act at 41 °F', () => {
    const points: [number, number][] = [[0, 40], [250, 40], [260, 44]]
    expect(assess(log('us-sf-dph/tcs', points))).toMatchObject({ verdict: 'act', deadline: at(320) })
    expect(assess(log('us-sf-dph/tcs', [...points, [315, 41]])).verdict).toBe('within')
    expect(assess(log('us-sf-dph/tcs', [...points, [315, 42]]))).toMatchObject({ verdict: 'act', deadline: at(320) })
    expect(assess(log('us-sf-dph/tcs', [...points, [325, 40]])).verdict).toBe('discard')
  })

  it('has food at 41 °F within at any time', () => {
    expect(assess(log('us-sf-dph/tcs', [[0, 40], [600, 41]])).verdict).toBe('within')
  })
})

describe('Berrien County, Michigan (VS)', () => {
  it('discards at 46 °F or over for 4 hours or more', () => {
    expect(assess(log('us-mi-county/tcs', [[0, 46]], { now: 239 }))).toMatchObject({ verdict: 'above', deadline: at(240) })
    expect(assess(log('us-mi-county/tcs', [[0, 46]], { now: 240 })).verdict).toBe('discard')
  })

  it('discards at 50 °F or over for 2 hours or more', () => {
    expect(assess(log('us-mi-county/tcs', [[0, 50]], { now: 119 }))).toMatchObject({ verdict: 'above', deadline: at(120) })
    expect(assess(log('us-mi-county/tcs', [[0, 50]], { now: 120 })).verdict).toBe('discard')
  })

  it('counts 41 °F itself for 5 hours, within until then', () => {
    const steady = (until: number) => Array.from({ length: until / 10 + 1 }, (_, index): [number, number] => [index * 10, 41])
    expect(assess(log('us-mi-county/tcs', steady(290)))).toMatchObject({ verdict: 'within', deadline: null, minutesAbove: { careful: 0, linear: 0 } })
    expect(assess(log('us-mi-county/tcs', steady(300)))).toMatchObject({ verdict: 'discard', minutesAbove: { careful: 0, linear: 0 } })
    expect(assess(log('us-mi-county/tcs', [[0, 41]], { now: 100 })).verdict).toBe('unknown')
    expect(assess(log('us-mi-county/tcs', [[0, 41]], { now: 100 })).why.join(' ')).toContain('The clock at or over 41 °F runs: 100 minutes')
    expect(assess(log('us-mi-county/tcs', [[0, 41]], { now: 300 })).verdict).toBe('discard')
  })
})

describe('44 °F for 4 h 30 min (Berrien, VS; Iowa DIAL, El Paso, Washoe, V; applied)', () => {
  it('is above in the Michigan county and discard by the Food Code’s outage practice', () => {
    expect(assess(log('us-mi-county/tcs', [[0, 44]], { now: 270 })).verdict).toBe('above')
    expect(assess(log('us-food-code-2022/tcs', [[0, 44]], { now: 270 })).verdict).toBe('discard')
  })
})

describe('Food Code 2022 with outage practice', () => {
  it('discards after more than 240 minutes, not at 240 (Iowa DIAL, El Paso, Washoe, V)', () => {
    expect(assess(log('us-food-code-2022/tcs', [[0, 44]], { now: 240 }))).toMatchObject({ verdict: 'above', deadline: at(240) })
    expect(assess(log('us-food-code-2022/tcs', [[0, 44]], { now: 240.1 })).verdict).toBe('discard')
  })

  it('lets thawed food not above 41 °F for more than 4 hours be refrozen (Iowa DIAL, V)', () => {
    const cold = assess(log('us-food-code-2022/frozen', [[0, 5], [60, 33]], { now: 700 }))
    expect(cold).toMatchObject({ verdict: 'above', deadline: null })
    expect(cold.act).toContain('refrozen')
    expect(assess(log('us-food-code-2022/frozen', [[0, 5], [60, 45]], { now: 240 }))).toMatchObject({ verdict: 'above', deadline: at(240) })
    expect(assess(log('us-food-code-2022/frozen', [[0, 5], [60, 45]], { now: 241 })).verdict).toBe('discard')
  })

  it('discards ice cream once partly thawed (FoodSafety.gov, V; 22 °F from memory)', () => {
    expect(assess(log('us-food-code-2022/ice-cream', [[0, 5], [60, 22]])).verdict).toBe('act')
    expect(assess(log('us-food-code-2022/ice-cream', [[0, 5], [60, 22.5], [70, 5]])).verdict).toBe('discard')
    expect(assess(log('us-food-code-2022/ice-cream', [[0, 10]])).verdict).toBe('within')
  })

  it('has shell eggs within at 45 °F air (3-501.16(B), VA), judged by air alone', () => {
    expect(assess(log('us-food-code-2022/shell-eggs', [[0, 45, { method: 'air' }]])).verdict).toBe('within')
    expect(assess(log('us-food-code-2022/shell-eggs', [[0, 46, { method: 'air' }]], { now: 100 }))).toMatchObject({ verdict: 'above', deadline: at(240) })
    expect(assess(log('us-food-code-2022/shell-eggs', [[0, 46]])).verdict).toBe('above')
    expect(assess(log('us-food-code-2022/shell-eggs', [[0, 44, { method: 'air' }], [5, 60, { method: 'product' }]])))
      .toMatchObject({ verdict: 'within', suspect: true, minutesAbove: { careful: 0 } })
  })

  it('does not use the consumer chart of 40 °F for 2 hours (USDA FSIS, VS)', () => {
    expect(rulebooks.flatMap(({ classes }) => classes).some(({ limit }) => limit === 40)).toBe(false)
    expect(assess(log('us-food-code-2022/tcs', [[0, 40.5], [60, 40.5], [120, 40.5], [180, 40.5]])).verdict).toBe('within')
  })
})

describe('Australia, 2-hour/4-hour rule (FSANZ, NSW, V)', () => {
  it('keeps 60 + 45 minutes above while still over 5 °C', () => {
    const assessment = assess(log('au-3-2-2/tcs', [[0, 6], [60, 4], [70, 4], [70.001, 6]], { now: 115.001 }))
    expect(assessment.verdict).toBe('above')
    expect(assessment.minutesAbove.careful).toBeCloseTo(105, 1)
  })

  it('acts at 90 + 60 minutes, cold again or not', () => {
    const points: [number, number][] = [[0, 6], [90, 5], [100, 5], [100.001, 6]]
    expect(assess(log('au-3-2-2/tcs', points, { now: 160 }))).toMatchObject({ verdict: 'act', deadline: at(250) })
    expect(assess(log('au-3-2-2/tcs', [...points, [160, 4]]))).toMatchObject({ verdict: 'act', deadline: null })
  })

  it('acts at 120 minutes itself and discards at 240 itself', () => {
    expect(assess(log('au-3-2-2/tcs', [[0, 6]], { now: 119 }))).toMatchObject({ verdict: 'above', deadline: at(120) })
    expect(assess(log('au-3-2-2/tcs', [[0, 6]], { now: 120 }))).toMatchObject({ verdict: 'act', deadline: at(240) })
    expect(assess(log('au-3-2-2/tcs', [[0, 6]], { now: 240 })).verdict).toBe('discard')
  })

  it('lets frozen food be refrozen once (common practice, no source)', () => {
    expect(assess(log('au-3-2-2/frozen', [[0, -18], [10, -10]], { now: 900 }))).toMatchObject({ verdict: 'above', deadline: null })
    expect(assess(log('au-3-2-2/frozen', [[0, -18], [10, -10], [20, -16], [30, -10]])).verdict).toBe('act')
    expect(assess(log('au-3-2-2/frozen', [[0, 6]], { now: 120 })).verdict).toBe('act')
    expect(assess(log('au-3-2-2/frozen', [[0, 6]], { now: 240 })).verdict).toBe('discard')
  })

  it('does not count hot holding at 60 °C and over (Standard 3.2.2, V)', () => {
    expect(assess(log('au-3-2-2/tcs', [[0, 65], [300, 60]]))).toMatchObject({ verdict: 'above', deadline: null, minutesAbove: { careful: 0, linear: 0 } })
    expect(assess(log('au-3-2-2/tcs', [[0, 65], [110, 0]])).minutesAbove).toEqual({ careful: 110, linear: expect.closeTo(110 * 55 / 65, 9) })
    expect(assess(log('au-3-2-2/tcs', [[0, 59.9]], { now: 240 })).verdict).toBe('discard')
  })
})

describe('England, SI 2013/2996 Schedule 4 (para 2, V; para 5(1), VA) and SI 2007/191 (V)', () => {
  it('keeps 12 °C for the first time up to 3 h 59, and discards at 4 hours', () => {
    expect(assess(log('uk-england-2013/chilled', [[0, 12]], { now: 239 }))).toMatchObject({ verdict: 'above', deadline: at(240) })
    expect(assess(log('uk-england-2013/chilled', [[0, 12]], { now: 240 })).verdict).toBe('discard')
  })

  it('discards in a second period above 8 °C', () => {
    expect(assess(log('uk-england-2013/chilled', [[0, 12], [10, 8], [20, 9]]))).toMatchObject({ verdict: 'discard', clause: 'Schedule 4 paragraph 5(1)' })
    expect(assess(log('uk-england-2013/chilled', [[0, 12], [10, 8], [20, 8]])).verdict).toBe('within')
    expect(assess(log('uk-england-2013/chilled', [[0, 12], [10, 8, { method: 'air' }], [20, 9]])).verdict).toBe('above')
  })

  it('acts at once on chilled storage', () => {
    expect(assess(log('uk-england-2013/chilled-storage', [[0, 8]])).verdict).toBe('within')
    expect(assess(log('uk-england-2013/chilled-storage', [[0, 8.1], [10, 4]]))).toMatchObject({ verdict: 'act', deadline: null })
  })

  it('judges quick-frozen food by −12 °C in a cabinet and −18 °C in storage', () => {
    expect(assess(log('uk-england-2013/quick-frozen', [[0, -12]])).verdict).toBe('within')
    expect(assess(log('uk-england-2013/quick-frozen', [[0, 8]], { now: 900 }))).toMatchObject({ verdict: 'above', deadline: null })
    expect(assess(log('uk-england-2013/quick-frozen', [[0, 9]], { now: 240 }))).toMatchObject({ verdict: 'above', deadline: at(240) })
    expect(assess(log('uk-england-2013/quick-frozen', [[0, 9]], { now: 241 })).verdict).toBe('discard')
    expect(assess(log('uk-england-2013/quick-frozen-storage', [[0, -18]])).verdict).toBe('within')
    expect(assess(log('uk-england-2013/quick-frozen-storage', [[0, -17]])).verdict).toBe('act')
  })

  it('judges ice cream by −12 °C (common practice, no source) and −5.6 °C (from memory)', () => {
    expect(assess(log('uk-england-2013/ice-cream', [[0, -12]])).verdict).toBe('within')
    expect(assess(log('uk-england-2013/ice-cream', [[0, -5.6]])).verdict).toBe('act')
    expect(assess(log('uk-england-2013/ice-cream', [[0, -5.5]])).verdict).toBe('discard')
  })
})

describe('A pack at −13 °C (SI 2007/191; 89/108/EEC, V)', () => {
  it('is within in England, act in the Union, and within where the state allows −12 °C', () => {
    expect(assess(log('uk-england-2013/quick-frozen', [[0, -13]])).verdict).toBe('within')
    expect(assess(log('eu-853-2004/quick-frozen', [[0, -13]])).verdict).toBe('act')
    expect(assess(log('eu-853-2004/quick-frozen', [[0, -13]], { site: { allowsMinus12: true } }))).toMatchObject({ verdict: 'within', limit: { value: -12, unit: 'C' } })
    expect(assess(log('eu-853-2004/quick-frozen', [[0, -11]], { site: { allowsMinus12: true } })).verdict).toBe('act')
    expect(assess(log('eu-853-2004/quick-frozen-storage', [[0, -13]], { site: { allowsMinus12: true } })).verdict).toBe('act')
  })
})

describe('European Union (853/2004 Annex III, 852/2004 Annex II ch. IX, 89/108/EEC Art 5(2), V)', () => {
  it.each([['meat', 7], ['offal', 3], ['poultry', 4], ['minced-meat', 2], ['meat-preparations', 4], ['fish', 2]])('holds %s at %d °C with no clock', (foodClass, limit) => {
    expect(assess(log(`eu-853-2004/${foodClass}`, [[0, limit]])).verdict).toBe('within')
    const assessment = assess(log(`eu-853-2004/${foodClass}`, [[0, limit + 0.1]], { now: 900 }))
    expect(assessment).toMatchObject({ verdict: 'act', deadline: null })
    expect(assessment.why.join(' ')).toContain('does not bind ordinary retail (from memory)')
  })

  it('allows 3 K at retail over −18 °C', () => {
    expect(assess(log('eu-853-2004/quick-frozen', [[0, -15]], { now: 60 }))).toMatchObject({ verdict: 'above', deadline: null })
    expect(assess(log('eu-853-2004/quick-frozen', [[0, -14.9]])).verdict).toBe('act')
    expect(assess(log('eu-853-2004/quick-frozen-storage', [[0, -17.9]])).verdict).toBe('act')
  })
})

describe('Canadian outage sheet for food service (V copy)', () => {
  it('keeps up to 120 minutes over 4 °C and discards after', () => {
    expect(assess(log('ca-4c/tcs', [[0, 5]], { now: 120 }))).toMatchObject({ verdict: 'above', deadline: at(120) })
    expect(assess(log('ca-4c/tcs', [[0, 5]], { now: 120.5 })).verdict).toBe('discard')
  })

  it('adds overdue time after a last reading within, from that reading', () => {
    expect(assess(log('ca-4c/tcs', [[0, 4]], { now: 10 })).verdict).toBe('within')
    expect(assess(log('ca-4c/tcs', [[0, 4]], { now: 120 }))).toMatchObject({ verdict: 'unknown', deadline: null })
    expect(assess(log('ca-4c/tcs', [[0, 4]], { now: 121 })).verdict).toBe('discard')
    expect(assess(log('ca-4c/tcs', [[0, 5], [50, 4]], { now: 120 })).verdict).toBe('unknown')
    expect(assess(log('ca-4c/tcs', [[0, 5], [50, 4]], { now: 120.5 }))).toMatchObject({ verdict: 'discard', minutesAbove: { careful: 50 } })
  })

  it('keeps an overdue gap in the sum when a reading within ends it', () => {
    expect(assess(log('ca-4c/tcs', [[0, 4], [121, 4]])).verdict).toBe('discard')
    expect(assess(log('ca-4c/tcs', [[0, 4], [100, 4], [110, 4]])).verdict).toBe('within')
    expect(assess(log('ca-4c/tcs', [[0, 5], [115, 4], [125, 4]])).verdict).toBe('within')
    expect(assess(log('ca-4c/tcs', [[0, 5], [115, 4], [125.1, 4]])).verdict).toBe('discard')
    expect(assess(log('ca-4c/tcs', [[130, 4]])).verdict).toBe('within')
  })
})
