import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { bars, byHold, type BarsInput } from '../../../shared/charts/bars'
import { spreadLabels, temperatures } from '../../../shared/charts/temperatures'

// Geometry of the product's own drawings: linear scales, no source.
describe('temperatures', () => {
  const input = {
    width: 800,
    height: 280,
    dark: [{ from: 0, to: 23 }],
    limits: [{ value: 41, label: '41.0 limit' }],
    cases: [
      { id: 'a', name: 'Dairy wall', readings: [{ minute: 23, value: 40.6 }, { minute: -17, value: 37 }, { minute: 82, value: 37.1 }] },
      { id: 'b', name: 'Fish service', readings: [{ minute: 0, value: 35 }, { minute: 82, value: 37 }] },
    ],
  }

  it('draws readings in order of time, inside the plot', () => {
    const { lines, plot } = temperatures(input)
    expect(lines[0]!.dots.map(dot => dot.minute)).toEqual([-17, 23, 82])
    for (const dot of lines.flatMap(line => line.dots)) {
      expect(dot.x).toBeGreaterThanOrEqual(plot.left)
      expect(dot.x).toBeLessThanOrEqual(plot.right)
      expect(dot.y).toBeGreaterThanOrEqual(plot.top)
      expect(dot.y).toBeLessThanOrEqual(plot.bottom)
    }
  })

  it('shades the dark between its two readings', () => {
    const { dark, lines } = temperatures(input)
    expect(dark[0]!.x + dark[0]!.width).toBeCloseTo(lines[0]!.dots[1]!.x)
  })

  it('shades to the last reading while the dark lasts', () => {
    const { dark, plot } = temperatures({ ...input, dark: [{ from: 0, to: null }] })
    expect(dark[0]!.x + dark[0]!.width).toBeCloseTo(plot.right)
  })

  it('keeps names that end at the same place apart', () => {
    const [first, second] = temperatures(input).lines.map(line => line.label.y)
    expect(Math.abs(first! - second!)).toBeGreaterThanOrEqual(18)
  })

  it('stands with its limit when there is no reading', () => {
    const { lines, limits, plot } = temperatures({ ...input, cases: [], dark: [] })
    expect(lines).toEqual([])
    expect(limits[0]!.y).toBeGreaterThan(plot.top)
    expect(limits[0]!.y).toBeLessThan(plot.bottom)
  })

  it('names at most nine times, minute 0 among them', () => {
    const { xTicks } = temperatures(input)
    expect(xTicks.length).toBeLessThanOrEqual(9)
    expect(xTicks.map(tick => tick.minute)).toContain(0)
  })
})

describe('spreadLabels', () => {
  it('leaves what is apart where it is', () => {
    expect(spreadLabels([100, 10, 50], 18, 200)).toEqual([100, 10, 50])
  })

  it('keeps order and distance, and the bottom, for any labels that have room', () => {
    fc.assert(fc.property(fc.array(fc.double({ min: 0, max: 300, noNaN: true }), { maxLength: 12 }), (wanted) => {
      const spread = spreadLabels(wanted, 18, 300)
      const ranks = wanted.map((_, index) => index).sort((a, b) => wanted[a]! - wanted[b]! || a - b)
      ranks.slice(1).forEach((index, rank) => expect(spread[index]! - spread[ranks[rank]!]!).toBeGreaterThanOrEqual(18 - 1e-9))
      expect(Math.max(0, ...spread)).toBeLessThanOrEqual(300)
    }))
  })
})

describe('bars', () => {
  const input: BarsInput = {
    width: 900,
    labelWidth: 176,
    workMinutes: 31,
    likelihood: [{ minute: 14, density: 0 }, { minute: 24, density: 1 }, { minute: 40, density: 0 }],
    cases: [
      { id: '2', name: 'Dairy wall 4–7', plannedMinutes: 63, bareMinutes: 22 },
      { id: '1', name: 'Fish service', plannedMinutes: 47, bareMinutes: 40 },
      { id: '3', name: 'Walk-in cooler', plannedMinutes: null, bareMinutes: 170 },
    ],
  }

  it('sorts by the planned hold; what never ends comes last; ties break on id', () => {
    expect(byHold(input.cases).map(item => item.id)).toEqual(['1', '2', '3'])
    const endless = ['b', 'a'].map(id => ({ id, name: id, plannedMinutes: null, bareMinutes: null }))
    expect(byHold(endless).map(item => item.id)).toEqual(['a', 'b'])
  })

  it('draws all on one scale of minutes', () => {
    const drawn = bars(input)
    const perMinute = drawn.rows[0]!.width / 47
    expect(drawn.rows[1]!.width).toBeCloseTo(63 * perMinute)
    expect(drawn.rows[1]!.bareX! - drawn.left).toBeCloseTo(22 * perMinute)
    expect(drawn.workX - drawn.left).toBeCloseTo(31 * perMinute)
    expect(drawn.rows.map(row => row.shortest)).toEqual([true, false, false])
  })

  it('runs an endless hold to the end of the chart and leaves out what lies beyond', () => {
    const last = bars(input).rows[2]!
    expect(last.endless).toBe(true)
    expect(bars(input).left + last.width).toBeCloseTo(bars(input).right)
    expect(last.bareX).toBeNull()
  })

  it('brackets the margin, and says when it is short', () => {
    const { margin, workX } = bars(input)
    expect(margin).toMatchObject({ minutes: 16, short: false })
    expect(margin!.x).toBeCloseTo(workX)
    const late = bars({ ...input, workMinutes: 60 })
    expect(late.margin).toMatchObject({ minutes: -13, short: true })
    expect(late.margin!.x + late.margin!.width).toBeCloseTo(late.workX)
  })

  it('keeps the words of the work inside the drawing, on whichever side has room', () => {
    expect(bars(input).workWords).toMatchObject({ anchor: 'start' })
    const late = bars({ ...input, workMinutes: 60 }).workWords
    expect(late.anchor).toBe('end')
    const narrow = bars({ ...input, width: 300, labelWidth: 0, workMinutes: 60 })
    expect(narrow.workWords.x).toBeGreaterThanOrEqual(0)
    expect(narrow.workWords.x).toBeLessThan(40)
    expect(narrow.workWords.lineTop).toBeGreaterThan(narrow.gridTop + 18)
  })

  it('stands without cases and without a curve', () => {
    expect(bars({ ...input, cases: [], likelihood: [] })).toMatchObject({ rows: [], margin: null, curve: '' })
  })

  it('puts names above bars where there is no room beside them', () => {
    const narrow = bars({ ...input, width: 340, labelWidth: 0 })
    expect(narrow.rows[0]!.nameY).toBeLessThan(narrow.rows[0]!.y)
    expect(narrow.rows[1]!.nameY - 16).toBeGreaterThan(narrow.rows[0]!.y + narrow.barHeight)
  })
})
