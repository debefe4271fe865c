/** How a log is judged, whatever the rulebook. Figures are worked by hand; they have no published source. */
import { describe, expect, it } from 'vitest'
import { assess, limitFor, rulebookById, rulebooks } from '../../../server/utils/holding'
import { at, log } from './log'

const TCS = 'us-food-code-2022/tcs'

describe('careful and linear minutes', () => {
  it('count nothing between two readings within', () => {
    expect(assess(log(TCS, [[0, 40], [300, 41]])).minutesAbove).toEqual({ careful: 0, linear: 0 })
  })

  it('count the whole interval, or the part beyond the crossing', () => {
    const { minutesAbove } = assess(log(TCS, [[0, 40], [10, 44], [20, 43], [30, 39]]))
    expect(minutesAbove.careful).toBe(30)
    expect(minutesAbove.linear).toBeCloseTo(7.5 + 10 + 5, 9)
  })

  it('count the part of an interval before the loss of control too', () => {
    expect(assess(log(TCS, [[-10, 40], [10, 44]])).minutesAbove).toEqual({ careful: 20, linear: expect.closeTo(15, 9) })
  })

  it('count the interval at its warmer end', () => {
    expect(assess(log('us-mi-county/tcs', [[0, 40], [120, 50]])).verdict).toBe('discard')
    expect(assess(log('us-mi-county/tcs', [[0, 50], [120, 40]])).verdict).toBe('discard')
  })

  it('run on after a last reading above, and not after one within', () => {
    expect(assess(log(TCS, [[0, 40], [10, 44]], { now: 60 })).minutesAbove).toEqual({ careful: 60, linear: expect.closeTo(57.5, 9) })
    expect(assess(log(TCS, [[0, 44], [10, 40]], { now: 15 })).minutesAbove.careful).toBe(10)
  })

  it('do not count the time from the loss of control to a first reading within', () => {
    expect(assess(log(TCS, [[300, 40]]))).toMatchObject({ verdict: 'within', minutesAbove: { careful: 0, linear: 0 } })
  })

  it('are not rounded', () => {
    expect(assess(log(TCS, [[0, 44]], { now: 0.005 })).minutesAbove.careful).toBe(0.005)
  })

  it('decide in the middle of an interval', () => {
    const assessment = assess(log(TCS, [[0, 44], [240.5, 40]]))
    expect(assessment).toMatchObject({ verdict: 'discard', deadline: null })
    expect(assess(log('au-3-2-2/tcs', [[0, 6], [125, 4]])).verdict).toBe('act')
    expect(assess(log('us-wa-doh/tcs', [[0, 40], [10, 46], [241, 40]])).verdict).toBe('discard')
    expect(assess(log('us-wa-doh/tcs', [[0, 40], [10, 46], [240, 40]])).verdict).toBe('within')
  })
})

describe('a first reading already above', () => {
  it('starts the clock at the loss of control when that is earlier', () => {
    expect(assess(log(TCS, [[30, 44]]))).toMatchObject({ startedWarm: true, verdict: 'above', deadline: at(240), minutesAbove: { careful: 30, linear: 30 } })
  })

  it('starts the clock at the reading when that is earlier', () => {
    expect(assess(log(TCS, [[-30, 44]], { now: 0 }))).toMatchObject({ startedWarm: true, deadline: at(210) })
    expect(assess(log('us-wa-doh/tcs', [[-30, 52]], { now: 0 }))).toMatchObject({ verdict: 'act', deadline: at(90) })
  })

  it('says that a written time-control plan may not be invoked (Food Code 3-501.19(B)(1))', () => {
    expect(assess(log(TCS, [[0, 44]])).why.join(' ')).toContain('time-control plan may not be invoked')
    expect(assess(log(TCS, [[0, 40]]))).toMatchObject({ startedWarm: false })
  })
})

describe('cold again', () => {
  it('ends above, keeps the sum and has no deadline', () => {
    expect(assess(log(TCS, [[0, 44], [100, 40]]))).toMatchObject({ verdict: 'within', deadline: null, act: null, minutesAbove: { careful: 100 } })
    expect(assess(log(TCS, [[0, 44], [100, 40], [110, 44]]))).toMatchObject({ verdict: 'above', deadline: at(240) })
    expect(assess(log(TCS, [[0, 44], [100, 40], [200, 40], [210, 44]]))).toMatchObject({ verdict: 'above', deadline: at(340) })
  })

  it('leaves act and discard as they are', () => {
    expect(assess(log('uk-england-2013/chilled-storage', [[0, 9], [10, 4]], { now: 900 })).verdict).toBe('act')
    expect(assess(log(TCS, [[0, 44], [250, 40]], { now: 900 })).verdict).toBe('discard')
  })
})

describe('unknown', () => {
  it('is more than the interval after a last reading within', () => {
    expect(assess(log(TCS, [[0, 40]], { now: 10 })).verdict).toBe('within')
    const assessment = assess(log(TCS, [[0, 40]], { now: 10.1 }))
    expect(assessment).toMatchObject({ verdict: 'unknown', deadline: null })
    expect(assessment.act).toContain('Take a product temperature')
    expect(assess(log(TCS, [[0, 40]], { now: 25, intervalMinutes: 30 })).verdict).toBe('within')
  })

  it('is what a log without a product reading gives', () => {
    expect(assess(log(TCS, [[0, 39, { method: 'air' }], [5, 50, { method: 'infrared' }]])))
      .toMatchObject({ verdict: 'unknown', deadline: null, suspect: true, minutesAbove: { careful: 0, linear: 0 } })
  })

  it('never hides a clock that runs', () => {
    expect(assess(log(TCS, [[0, 44]], { now: 100 })).verdict).toBe('above')
  })
})

describe('air and infrared readings', () => {
  it('count no minutes, clear nothing and set suspect above the limit', () => {
    const assessment = assess(log(TCS, [[0, 44], [10, 39, { method: 'air' }], [20, 38, { method: 'infrared' }]]))
    expect(assessment).toMatchObject({ verdict: 'above', suspect: false, minutesAbove: { careful: 20 } })
    expect(assess(log(TCS, [[0, 40], [10, 60, { method: 'infrared' }]]))).toMatchObject({ verdict: 'within', suspect: true })
    expect(assess(log(TCS, [[0, 40], [10, 41, { method: 'air' }]])).suspect).toBe(false)
  })
})

describe('low mark (coldest package of the ISO 23953 classes as in Reg (EU) 2019/2024 Annex III)', () => {
  it('is −1 °C or 30 °F, themselves allowed', () => {
    expect(assess(log('ca-4c/tcs', [[0, -1]])).tooCold).toBe(false)
    expect(assess(log('ca-4c/tcs', [[0, -1.1]]))).toMatchObject({ tooCold: true, verdict: 'within' })
    expect(assess(log(TCS, [[0, 30]])).tooCold).toBe(false)
    expect(assess(log(TCS, [[0, 29.9], [10, 39]])).tooCold).toBe(true)
  })

  it('is not for frozen food, ice cream and shell eggs', () => {
    const without = rulebooks.flatMap(({ classes }) => classes).filter(({ lowMark }) => lowMark === null).map(({ id }) => id)
    expect(new Set(without)).toEqual(new Set(['frozen', 'ice-cream', 'shell-eggs', 'quick-frozen', 'quick-frozen-storage']))
    expect(assess(log('us-food-code-2022/frozen', [[0, -10]])).tooCold).toBe(false)
  })

  it('looks at what was read, not at what an accuracy makes of it', () => {
    expect(assess(log(TCS, [[0, 29]], { site: { addAccuracy: true } })).tooCold).toBe(true)
  })
})

describe('a site’s own figures', () => {
  it('lower the limit and its clock', () => {
    expect(assess(log(TCS, [[0, 40]], { now: 5, site: { limit: 38 } }))).toMatchObject({ verdict: 'above', limit: { value: 38, unit: 'F' }, minutesAbove: { careful: 5 } })
    expect(assess(log('us-food-code-2022/frozen', [[0, 8]], { site: { limit: 0 } }))).toMatchObject({ verdict: 'above', deadline: null })
    expect(limitFor('us-food-code-2022', 'tcs', { limit: 38 })).toEqual({ value: 38, unit: 'F' })
    expect(limitFor('us-food-code-2022', 'tcs', { limit: 50 })).toEqual({ value: 41, unit: 'F' })
    expect(limitFor('eu-853-2004', 'quick-frozen', { allowsMinus12: true })).toEqual({ value: -12, unit: 'C' })
  })

  it('shorten every time that is longer', () => {
    expect(assess(log(TCS, [[0, 44]], { now: 60, site: { minutes: 90 } }))).toMatchObject({ verdict: 'above', deadline: at(90) })
    expect(assess(log('us-wa-doh/tcs', [[0, 40], [10, 52]], { site: { minutes: 60 } })).deadline).toBe(at(60))
    expect(assess(log('au-3-2-2/tcs', [[0, 6]], { now: 119, site: { minutes: 180 } })).deadline).toBe(at(120))
    expect(assess(log('au-3-2-2/tcs', [[0, 6]], { now: 180, site: { minutes: 180 } })).verdict).toBe('discard')
    expect(assess(log('us-sf-dph/tcs', [[0, 40], [10, 47]], { now: 101, site: { minutes: 100 } })).verdict).toBe('discard')
  })

  it('reach into what a chart asks', () => {
    const site = { limit: 38 }
    expect(assess(log('us-sf-dph/tcs', [[0, 37], [250, 37], [260, 40], [300, 39]], { site }))).toMatchObject({ verdict: 'act', deadline: at(320), act: expect.stringContaining('38 °F or below within 1 hour') })
    expect(assess(log('us-sf-dph/tcs', [[0, 40], [60, 43]], { site: { minutes: 50 } }))).toMatchObject({ verdict: 'act', deadline: at(110), act: expect.stringContaining('41 °F or below within 50 minutes') })
  })

  it('add the accuracy of each reading in its own unit', () => {
    const site = { addAccuracy: true }
    expect(assess(log(TCS, [[0, 40, { accuracy: 1 }]], { site })).verdict).toBe('within')
    expect(assess(log(TCS, [[0, 40, { accuracy: 1.1 }]], { site })).verdict).toBe('above')
    expect(assess(log(TCS, [[0, 4, { accuracy: 0.5 }]], { unit: 'C', site })).verdict).toBe('within')
    expect(assess(log(TCS, [[0, 4, { accuracy: 0.6 }]], { unit: 'C', site })).verdict).toBe('within')
    expect(assess(log(TCS, [[0, 4.5, { accuracy: 0.6 }]], { unit: 'C', site })).verdict).toBe('above')
    expect(assess(log(TCS, [[0, 40, { accuracy: 5 }]])).verdict).toBe('within')
  })

  it('take the accuracy that the Food Code demands where none is stated (4-203.11, 4-203.12)', () => {
    const site = { addAccuracy: true }
    expect(assess(log(TCS, [[0, 39]], { site })).verdict).toBe('within')
    expect(assess(log(TCS, [[0, 39.1]], { site })).verdict).toBe('above')
    expect(assess(log('us-food-code-2022/shell-eggs', [[0, 42.1, { method: 'air' }]], { site })).verdict).toBe('above')
    expect(assess(log('ca-4c/tcs', [[0, 3]], { site })).verdict).toBe('within')
    expect(assess(log('ca-4c/tcs', [[0, 3.1]], { site })).verdict).toBe('above')
  })
})

describe('what goes with a verdict', () => {
  it('names the clause, the source, the intervals that counted and what to do', () => {
    const assessment = assess(log(TCS, [[0, 40], [10, 44], [20, 40], [100, 40], [110, 45]], { now: 120 }))
    expect(assessment.clause).toContain('outage practice')
    expect(assessment.source).toContain('Iowa DIAL')
    expect(assessment.why).toContain('Counted: 2026-03-01 02:00 UTC to 2026-03-01 02:20 UTC, 20 minutes, at up to 44 °F.')
    expect(assessment.why).toContain('Counted: 2026-03-01 03:40 UTC to 2026-03-01 04:00 UTC, 20 minutes, at up to 45 °F.')
    expect(assessment.act).toContain('before the deadline')
  })

  it('speaks of the last reading, and of no time without control before it was lost', () => {
    expect(assess(log('us-food-code-2022/frozen', [[0, 20], [10, 15]])).why[0]).toContain('15 °F at 2026-03-01 02:10 UTC')
    expect(assess(log('us-sf-dph/tcs', [[-20, 40], [-10, 52]], { now: 0 })).why[0]).toContain('52 °F at 0 minutes without control')
  })

  it('says what is from memory and what is common practice', () => {
    expect(assess(log('uk-england-2013/ice-cream', [[0, -5]]))).toMatchObject({ source: 'from memory' })
    expect(assess(log('us-food-code-2022/frozen', [[0, 5]]))).toMatchObject({ source: 'common practice, no source', act: null })
    expect(assess(log('us-mi-county/tcs', [[0, 40]])).why.join(' ')).toContain('read in a secondary copy')
  })

  it('lists at most twenty periods one by one', () => {
    const points = Array.from({ length: 100 }, (_, index): [number, number] => [index, index % 4 === 0 ? 44 : 40])
    const { why } = assess(log(TCS, points))
    expect(why.filter(line => line.startsWith('Counted:'))).toHaveLength(20)
    expect(why.join(' ')).toContain('Counted as well: 5 further periods')
  })

  it('is refused for a rulebook or class that does not exist', () => {
    expect(() => assess(log('nowhere/tcs', [[0, 40]]))).toThrow(RangeError)
    expect(() => assess(log('ca-4c/meat', [[0, 4]]))).toThrow(RangeError)
    expect(() => limitFor('ca-4c', 'meat')).toThrow(RangeError)
  })
})

describe('rulebooks as data', () => {
  it('are eight, found by id and version', () => {
    expect(rulebooks.map(({ id }) => id)).toEqual(['us-food-code-2022', 'us-wa-doh', 'us-sf-dph', 'us-mi-county', 'uk-england-2013', 'au-3-2-2', 'eu-853-2004', 'ca-4c'])
    expect(rulebookById('ca-4c', '2026-01')?.id).toBe('ca-4c')
    expect(rulebookById('ca-4c', '1999-01')).toBeUndefined()
    expect(rulebookById('nowhere')).toBeUndefined()
  })

  it('survive JSON whole, and name a clause and a source for every rule', () => {
    expect(JSON.parse(JSON.stringify(rulebooks))).toEqual(rulebooks)
    for (const { classes } of rulebooks) {
      for (const { within, rules } of classes) {
        for (const { clause, source } of [within, ...rules.map(({ authority }) => authority)]) {
          expect(clause).not.toBe('')
          expect(source).not.toBe('')
        }
      }
    }
  })

  it('have charts that cover every time and temperature', () => {
    const charts = rulebooks.flatMap(({ classes }) => classes.flatMap(({ rules }) => rules)).filter(rule => rule.kind === 'chart')
    expect(charts).toHaveLength(2)
    for (const { rows } of charts) {
      expect(rows.at(-1)?.until).toBeNull()
      for (const { cells } of rows) expect(cells.at(-1)?.to).toBeNull()
    }
  })
})
