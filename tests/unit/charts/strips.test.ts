import { describe, expect, it } from 'vitest'
import { strip } from '../../../shared/charts/strip'
import { timeline, type TimelineInput } from '../../../shared/charts/timeline'

// Geometry of the product's own drawings: linear scales, no source.
describe('strip', () => {
  const input = {
    width: 120,
    height: 60,
    fromMinute: 0,
    toMinute: 40,
    usual: 37,
    limit: 41,
    readings: [{ minute: 10, value: 39 }, { minute: 0, value: 38 }],
    forecast: [{ minute: 30, value: 41 }, { minute: 50, value: 43 }],
  }

  it('puts later to the right, warmer above, and the limit in the upper part', () => {
    const drawn = strip(input)
    expect(drawn.dots.map(dot => dot.x)).toEqual([0, 30])
    expect(drawn.dots[1]!.y).toBeLessThan(drawn.dots[0]!.y)
    expect(drawn.limitY).toBeGreaterThan(0)
    expect(drawn.limitY).toBeLessThan(20)
    expect(drawn.meets).toBe(30)
  })

  it('keeps every reading and forecast inside the box', () => {
    const drawn = strip({ ...input, readings: [{ minute: 0, value: 20 }, { minute: 10, value: 70 }], forecast: [{ minute: 40, value: 400 }] })
    const ys = [...`${drawn.path}${drawn.forecastPath}`.matchAll(/,(-?[\d.]+)/g)].map(match => Number(match[1]))
    expect(ys.length).toBeGreaterThan(3)
    expect(Math.min(...ys, drawn.limitY)).toBeGreaterThanOrEqual(0)
    expect(Math.max(...ys, drawn.limitY)).toBeLessThanOrEqual(60)
  })

  it('shows only the minutes asked for', () => {
    const drawn = strip({ ...input, fromMinute: 5, toMinute: 20 })
    expect(drawn.dots.map(dot => dot.minute)).toEqual([10])
    expect(drawn.path).toMatch(/^M0,/)
    expect(drawn.forecastPath).toMatch(/L120,[\d.]+$/)
  })

  it('stands with its limit when there is no reading', () => {
    expect(strip({ ...input, readings: [], forecast: [] })).toMatchObject({ path: '', forecastPath: '', dots: [], meets: null })
  })
})

describe('timeline', () => {
  const input: TimelineInput = {
    width: 160,
    height: 64,
    fromMinute: -30,
    toMinute: 130,
    nowMinute: 13,
    inHandMinute: -24,
    backMinute: null,
    plannedMinute: 25,
    deadlineMinute: 41,
    rounds: [{ minute: 15, taken: false }, { minute: 5, taken: true }],
  }

  it('lays in hand, dark and the planned rest end to end', () => {
    const { inHand, dark, planned } = timeline(input)
    expect([inHand!.x, inHand!.x + inHand!.width]).toEqual([6, 30])
    expect([dark!.x, dark!.x + dark!.width]).toEqual([30, 43])
    expect([planned!.x, planned!.x + planned!.width]).toEqual([43, 55])
  })

  it('shades from the deadline to the end', () => {
    const { deadline, past } = timeline(input)
    expect(deadline!.x + deadline!.width / 2).toBe(71)
    expect(past!.x + past!.width).toBe(160)
    expect(timeline({ ...input, deadlineMinute: 400 })).toMatchObject({ deadline: null, past: null })
  })

  it('ends the dark when control is back, and leaves no planned rest when the work is late', () => {
    expect(timeline({ ...input, backMinute: 10 }).dark!.width).toBe(10)
    expect(timeline({ ...input, nowMinute: 30 }).planned).toBeNull()
  })

  it('puts rounds in order and says what they lie on', () => {
    expect(timeline(input).rounds.map(({ minute, on }) => [minute, on])).toEqual([[5, 'dark'], [15, 'ground']])
  })

  it('has a grid of tens for a watch of hours, and few lines for a watch of a day', () => {
    expect(timeline(input).grid.map(line => line.minute)).toContain(0)
    expect(timeline(input).grid).toHaveLength(17)
    expect(timeline({ ...input, toMinute: 1440 }).grid.length).toBeLessThanOrEqual(17)
  })

  it('shows nothing in hand for an unplanned outage', () => {
    expect(timeline({ ...input, inHandMinute: null, plannedMinute: null, deadlineMinute: null })).toMatchObject({
      inHand: null, planned: null, deadline: null, past: null,
    })
  })
})
