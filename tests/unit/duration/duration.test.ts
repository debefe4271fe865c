import { errorFunction } from 'simple-statistics'
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { normalWithin, parseDurationInput, planDuration } from '../../../server/utils/duration'
import { durationDrawer, uniformStream } from '../../../server/utils/duration/draw'
import { criticalPath, networkOf, slackOf } from '../../../server/utils/duration/network'
import { normalBelow, Z_19_IN_20 } from '../../../server/utils/duration/normal'
import type { DurationStep } from '../../../shared/schemas/plan-duration'

const step = (id: string, shortest: number, likely: number, longest: number, ...after: string[]): DurationStep =>
  ({ id, shortest, likely, longest, after })

describe('the normal figures', () => {
  it('give the chain of Taylor, Introduction to Management Science', () => {
    const planned = planDuration({
      steps: [step('1', 5, 8, 17), step('2', 3, 5, 7, '1'), step('3', 4, 6, 8, '2'), step('4', 3, 4, 5, '3')],
      within: 28,
    })
    expect(planned.mean).toBeCloseTo(24, 10)
    expect(planned.sd ** 2).toBeCloseTo(5, 10)
    expect(planned.critical).toEqual(['1', '2', '3', '4'])
    expect(planned.normal.pWithin).toBeCloseTo(0.963, 3)
    expect(planned.normal.p95).toBeCloseTo(24 + 1.645 * Math.sqrt(5), 2)
    expect(planned.slack).toEqual({ 1: 0, 2: 0, 3: 0, 4: 0 })
  })

  it('give the project of Krajewski and others, Operations Management', () => {
    const sd = Math.sqrt(4.11)
    expect(normalWithin(25, 26, sd)).toBeCloseTo(0.311, 3)
    expect(normalWithin(30, 26, sd)).toBeCloseTo(0.976, 3)
  })

  it('agree with the error function of simple-statistics', () => {
    // Its error function is good to 1.2e-7.
    for (let z = -6; z <= 6; z += 0.01) expect(normalBelow(z)).toBeCloseTo((1 + errorFunction(z / Math.SQRT2)) / 2, 6)
    expect(normalBelow(Z_19_IN_20)).toBeCloseTo(0.95, 12)
    expect([normalBelow(-40), normalBelow(0), normalBelow(40)]).toEqual([0, 0.5, 1])
  })
})

describe('the critical path', () => {
  it('is the longest by mean durations, and slack is what the others have left', () => {
    const planned = planDuration({
      steps: [step('save', 4, 5, 6), step('swap', 10, 20, 30, 'save'), step('call', 1, 2, 3, 'save'), step('check', 5, 5, 5, 'swap', 'call')],
    })
    expect(planned.critical).toEqual(['save', 'swap', 'check'])
    expect(planned.mean).toBeCloseTo(30, 10)
    expect(planned.slack).toEqual({ save: 0, swap: 0, call: 18, check: 0 })
  })

  it('of several is the one with the largest variance', () => {
    const planned = planDuration({ steps: [step('a', 10, 10, 10), step('b', 4, 10, 16), step('c', 8, 10, 12), step('d', 1, 1, 1, 'a', 'b', 'c')] })
    expect(planned.critical).toEqual(['b', 'd'])
    expect(planned.sd).toBeCloseTo(2, 10)
    expect(planned.slack).toEqual({ a: 0, b: 0, c: 0, d: 0 })
  })

  it('agrees with brute force over all paths, and a step slips by its slack and no more', () => {
    const network = fc.array(fc.record({
      times: fc.tuple(fc.integer({ min: 0, max: 20 }), fc.integer({ min: 0, max: 20 }), fc.integer({ min: 0, max: 20 })),
      links: fc.array(fc.nat(6), { maxLength: 3 }),
    }), { minLength: 1, maxLength: 7 }).map(items => items.map(({ times, links }, index) => {
      const [shortest, likely, longest] = [...times].sort((one, other) => one - other) as [number, number, number]
      return step(`s${index}`, shortest, likely, longest, ...links.filter(link => link < index).map(link => `s${link}`))
    }))
    const mean = ({ shortest, likely, longest }: DurationStep) => (shortest + 4 * likely + longest) / 6
    const pathsTo = (steps: DurationStep[], last: DurationStep): DurationStep[][] => last.after!.length === 0
      ? [[last]]
      : last.after!.flatMap(id => pathsTo(steps, steps.find(one => one.id === id)!).map(path => [...path, last]))
    const longest = (steps: DurationStep[]) => Math.max(...steps.flatMap(last => pathsTo(steps, last)).map(path => path.reduce((sum, one) => sum + mean(one), 0)))
    fc.assert(fc.property(network, fc.nat(6), (steps, which) => {
      const network = networkOf(steps)
      if ('ring' in network) throw new Error('no ring was made')
      const planned = criticalPath(network)
      expect(planned.mean).toBeCloseTo(longest(steps), 8)
      const spread = Math.max(...steps.flatMap(last => pathsTo(steps, last))
        .filter(path => Math.abs(path.reduce((sum, one) => sum + mean(one), 0) - planned.mean) < 1e-7)
        .map(path => path.reduce((sum, one) => sum + ((one.longest - one.shortest) / 6) ** 2, 0)))
      expect(planned.variance).toBeCloseTo(spread, 6)
      const slipping = steps[which % steps.length]!
      const later = (minutes: number) => longest(steps.map(one => one === slipping
        ? { ...one, shortest: one.shortest + minutes, likely: one.likely + minutes, longest: one.longest + minutes }
        : one))
      const slack = slackOf(network, planned.mean)[which % steps.length]!
      expect(later(slack)).toBeCloseTo(planned.mean, 8)
      expect(later(slack + 1)).toBeCloseTo(planned.mean + 1, 8)
    }), { numRuns: 200 })
  })
})

describe('the simulation', () => {
  it('draws betas with the mean and the spread that their shapes have', () => {
    // Mean α/(α + β) and variance αβ/((α + β)²(α + β + 1)) of the beta distribution (any textbook).
    const uniform = uniformStream(7)
    for (const [shortest, likely, longest] of [[0, 0, 1], [0, 1, 1], [0, 0.5, 1], [2, 3, 12], [5, 8, 17], [0, 0.01, 1], [10, 19, 20]] as const) {
      const draw = durationDrawer(shortest, likely, longest)
      const values = Array.from({ length: 60_000 }, () => draw(uniform))
      const range = longest - shortest
      const [rise, fall] = [1 + 4 * (likely - shortest) / range, 1 + 4 * (longest - likely) / range]
      const mean = values.reduce((sum, value) => sum + value, 0) / values.length
      const variance = values.reduce((sum, value) => sum + (value - mean) ** 2, 0) / values.length
      expect((mean - shortest) / range).toBeCloseTo(rise / 6, 2)
      expect(variance / range ** 2 / (rise * fall / (36 * 7))).toBeCloseTo(1, 1)
      expect(Math.min(...values.slice(0, 1000))).toBeGreaterThanOrEqual(shortest)
      expect(Math.max(...values.slice(0, 1000))).toBeLessThanOrEqual(longest)
    }
  })

  it('follows the distribution function of a beta throughout', () => {
    // Shapes 2 and 4: F(x) = 10x²(1 − x)³ + 10x³(1 − x)² + 5x⁴(1 − x) + x⁵, as a binomial sum (any textbook).
    const draw = durationDrawer(0, 0.25, 1)
    const uniform = uniformStream(11)
    const values = Array.from({ length: 60_000 }, () => draw(uniform))
    for (let x = 0.05; x < 1; x += 0.05) {
      const expected = 10 * x ** 2 * (1 - x) ** 3 + 10 * x ** 3 * (1 - x) ** 2 + 5 * x ** 4 * (1 - x) + x ** 5
      expect(Math.abs(values.filter(value => value <= x).length / values.length - expected)).toBeLessThan(0.007)
    }
  })

  it('gives the median and the 19-in-20 time of a single step whose distribution is a power', () => {
    // Likely = shortest: F(x) = 1 − (1 − x)⁵, so x at p is 1 − (1 − p)^(1/5).
    const within = 60 * (1 - 0.5 ** 0.2)
    const { simulated } = planDuration({ steps: [step('a', 0, 0, 60)], within })
    expect(simulated.p95 / 60).toBeCloseTo(1 - 0.05 ** 0.2, 2)
    expect(simulated.pWithin).toBeCloseTo(0.5, 2)
  })

  it('lies near the normal figure on a long chain and above it where paths merge', () => {
    const chain = planDuration({ steps: Array.from({ length: 12 }, (_, index) => step(`${index}`, 4, 8, 14, ...(index ? [`${index - 1}`] : []))) })
    expect(Math.abs(chain.simulated.p95 - chain.normal.p95) / chain.sd).toBeLessThan(0.3)
    const merging = planDuration({ steps: Array.from({ length: 8 }, (_, index) => step(`${index}`, 10, 20, 60)), within: 30 })
    expect(merging.simulated.p95).toBeGreaterThan(merging.normal.p95)
    expect(merging.simulated.pWithin!).toBeLessThan(merging.normal.pWithin!)
  })

  it('is the same every time', () => {
    const input = { steps: [step('a', 1, 3, 9), step('b', 2, 4, 5, 'a')], within: 8 }
    expect(planDuration(input)).toEqual(planDuration(input))
  })
})

describe('where nothing varies', () => {
  it('the chance is 0 or 1, however the minutes add up', () => {
    const steps = [step('a', 0.1, 0.1, 0.1), step('b', 0.2, 0.2, 0.2, 'a')]
    for (const [within, chance] of [[0.3, 1], [0.29, 0], [1, 1]] as const) {
      const { normal, simulated, sd } = planDuration({ steps, within })
      expect([sd, normal.pWithin, simulated.pWithin]).toEqual([0, chance, chance])
    }
  })

  it('no steps take no time', () => {
    expect(planDuration({ steps: [], within: 0 })).toEqual({
      mean: 0, sd: 0, critical: [], normal: { p95: 0, pWithin: 1 }, simulated: { p95: 0, pWithin: 1 }, slack: {},
    })
  })

  it('and nothing was asked, the chances are null', () => {
    const { normal, simulated } = planDuration({ steps: [step('a', 1, 1, 1)] })
    expect([normal, simulated]).toEqual([{ p95: 1, pWithin: null }, { p95: 1, pWithin: null }])
  })
})

describe('the body of a duration', () => {
  const ok = { id: 'a', shortest: 1, likely: 2, longest: 3 }
  it.each([
    ['nothing', undefined, 'body'],
    ['no steps', {}, 'steps'],
    ['steps as a word', { steps: 'a' }, 'steps'],
    ['no id', { steps: [{ ...ok, id: '' }] }, 'steps[0].id'],
    ['minutes in words', { steps: [{ ...ok, likely: '2' }] }, 'steps[0].likely'],
    ['minutes below zero', { steps: [{ ...ok, shortest: -1 }] }, 'steps[0].shortest'],
    ['longest below likely', { steps: [ok, { ...ok, id: 'b', longest: 1 }] }, 'steps[1].longest'],
    ['likely below shortest', { steps: [{ ...ok, shortest: 2.5 }] }, 'steps[0].likely'],
    ['an id twice', { steps: [ok, ok] }, 'steps[1].id'],
    ['an unknown id', { steps: [{ ...ok, after: ['b'] }] }, 'steps[0].after[0]'],
    ['a step after itself', { steps: [{ ...ok, after: ['a'] }] }, 'steps'],
    ['a ring', { steps: [{ ...ok, after: ['b'] }, { ...ok, id: 'b', after: ['a'] }] }, 'steps'],
    ['within in words', { steps: [ok], within: 'soon' }, 'within'],
    ['dark in words', { steps: [{ ...ok, dark: 'yes' }] }, 'steps[0].dark'],
  ])('is refused with %s', (_what, body, field) => {
    const parsed = parseDurationInput(body)
    expect(parsed.ok ? 'accepted' : parsed.field).toBe(field)
    expect(parsed.ok ? '' : parsed.reason).toMatch(/\w+ \w+/)
  })

  it('names the steps of a ring', () => {
    const parsed = parseDurationInput({ steps: [{ ...ok, after: ['b'] }, { ...ok, id: 'b', after: ['a'] }] })
    expect(parsed.ok ? '' : parsed.reason).toMatch(/a.*b|b.*a/)
  })

  it('is taken as it is sent, with ids of any kind', () => {
    const body = { steps: [{ ...ok, id: '__proto__', dark: true }], within: 3 }
    const parsed = parseDurationInput(body)
    expect(parsed).toEqual({ ok: true, input: body })
    expect(parsed.ok && Object.keys(planDuration(parsed.input).slack)).toEqual(['__proto__'])
  })

  it('throws where a ring reaches the plan unparsed', () => {
    expect(() => planDuration({ steps: [step('a', 1, 1, 1, 'a')] })).toThrow(RangeError)
  })
})
