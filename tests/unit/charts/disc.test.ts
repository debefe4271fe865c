import { describe, expect, it } from 'vitest'
import { disc, onDisc, progress, turnFor, turnWords, type DiscCase } from '../../../shared/charts/disc'

const dairy: DiscCase = {
  id: 'dairy',
  name: 'Dairy wall 4–7',
  shortest: true,
  usual: 37,
  limit: 41,
  readings: [{ minute: 0, value: 38 }, { minute: 10, value: 39 }],
  forecast: [{ minute: 30, value: 41 }, { minute: 60, value: 44 }],
}
const meat: DiscCase = { ...dairy, id: 'meat', name: 'Meat 1–3', shortest: false, usual: 33 }
const input = { elapsedMinutes: 12, plannedMinutes: 31, turnMinutes: 60, cases: [dairy, meat] }

/** All coordinates of a path, as distances from the middle. */
function distances(path: string): number[] {
  return [...path.matchAll(/(-?[\d.]+),(-?[\d.]+)/g)].map(match => Math.hypot(Number(match[1]), Number(match[2])))
}

// Geometry of the product's own disc: angle is time, radius is the way from usual to limit. Plain trigonometry, no source.
describe('progress', () => {
  it('is 0 at usual, 1 at the limit, and runs on either side', () => {
    expect(progress(37, 37, 41)).toBe(0)
    expect(progress(41, 37, 41)).toBe(1)
    expect(progress(39, 37, 41)).toBe(0.5)
    expect(progress(36, 37, 41)).toBe(-0.25)
    expect(progress(43, 37, 41)).toBe(1.5)
  })

  it('is all or nothing where the limit is not above the usual temperature', () => {
    expect(progress(40, 41, 41)).toBe(0)
    expect(progress(41, 41, 41)).toBe(1)
  })
})

describe('turnFor', () => {
  it.each([
    [[12, 31, 29], 60],
    [[12, 31, 55], 60],
    [[12, 31, 55.1], 120],
    [[111, 31, null], 240],
    [[0, 0, 220.5], 480],
    [[2000, null, null], 480],
    [[null, null, null], 60],
    [[5, Number.POSITIVE_INFINITY, 20], 60],
  ])('gives %j a turn of %d minutes', (minutes, turn) => {
    expect(turnFor(...minutes)).toBe(turn)
  })

  it('is said in words', () => {
    expect(turnWords(60)).toBe('One turn is an hour.')
    expect(turnWords(240)).toBe('One turn is 4 hours.')
  })
})

describe('disc', () => {
  const drawn = disc(input)
  const trace = (id: string, from = drawn) => from.traces.find(item => item.id === id)!

  it('begins at twelve o\'clock and runs with the clock', () => {
    expect(onDisc(0, 100).x).toBeCloseTo(0)
    expect(onDisc(0, 100).y).toBeCloseTo(-100)
    expect(onDisc(0.25, 100).x).toBeCloseTo(100)
    expect(onDisc(0.5, 100).y).toBeCloseTo(100)
  })

  it('places a reading at its minute and its share of the way', () => {
    const [first, second] = trace('dairy').marks
    const quarter = drawn.usualRadius + 0.25 * (drawn.limitRadius - drawn.usualRadius)
    expect(first!.at.x).toBeCloseTo(0)
    expect(first!.at.y).toBeCloseTo(-quarter)
    expect(Math.hypot(second!.at.x, second!.at.y)).toBeCloseTo((drawn.usualRadius + drawn.limitRadius) / 2)
    expect(Math.atan2(second!.at.x, -second!.at.y)).toBeCloseTo(2 * Math.PI * 10 / 60)
  })

  it('ends a forecast on the ring, at the minute of meeting', () => {
    expect(trace('dairy').meets).toBe(30)
    expect(distances(trace('dairy').forecastPath).at(-1)).toBeCloseTo(drawn.limitRadius, 1)
    expect(trace('dairy').forecastPath).toMatch(/L0,130$/)
  })

  it('begins a forecast where the last reading lies', () => {
    const end = trace('dairy').path.split('L').at(-1)
    expect(trace('dairy').forecastPath.startsWith(`M${end}L`)).toBe(true)
  })

  it('ends a forecast at the end of the turn when it does not meet the ring', () => {
    const cold = disc({ ...input, cases: [{ ...dairy, forecast: [{ minute: 90, value: 40 }] }] })
    expect(trace('dairy', cold).meets).toBeNull()
    expect(trace('dairy', cold).forecastPath).toMatch(/L0,-\d/)
  })

  it('draws no forecast for a case at its limit', () => {
    const over = disc({ ...input, cases: [{ ...dairy, readings: [{ minute: 5, value: 41 }] }] })
    expect(trace('dairy', over).forecastPath).toBe('')
    expect(trace('dairy', over).meets).toBeNull()
    expect(trace('dairy', over).marks).toHaveLength(1)
  })

  it('keeps every pen between the words and the rim, however far the temperature runs', () => {
    const wild = disc({ ...input, cases: [{ ...dairy, readings: [{ minute: 0, value: -60 }, { minute: 30, value: 120 }], forecast: [] }] })
    for (const distance of distances(trace('dairy', wild).path)) {
      expect(distance).toBeGreaterThan(76)
      expect(distance).toBeLessThan(146)
    }
  })

  it('never makes a second lap', () => {
    const late = disc({ ...input, elapsedMinutes: 600, turnMinutes: 480, cases: [{ ...dairy, readings: [{ minute: 470, value: 38 }, { minute: 490, value: 39 }], forecast: [] }] })
    expect(late.beyond).toBe(true)
    expect(trace('dairy', late).marks.map(mark => mark.minute)).toEqual([470])
    expect(trace('dairy', late).path).toMatch(/L0,-\d+(\.\d+)?$/)
    expect(drawn.beyond).toBe(false)
  })

  it('leaves readings before control was lost off the disc, and joins across the moment', () => {
    const early = disc({ ...input, cases: [{ ...dairy, readings: [{ minute: -10, value: 37 }, { minute: 10, value: 39 }], forecast: [] }] })
    expect(trace('dairy', early).marks.map(mark => mark.minute)).toEqual([10])
    expect(trace('dairy', early).path).toMatch(/^M0,-94L/)
  })

  it('names twelve spokes of an hour in minutes, and whole hours of longer turns', () => {
    expect(drawn.labels.map(label => label.text)).toEqual(['5', '10', '15', '20', '25', '30', '35', '40', '45', '50', '55', '60'])
    expect(disc({ ...input, turnMinutes: 120 }).labels.at(-1)!.text).toBe('120')
    expect(disc({ ...input, turnMinutes: 240 }).labels.map(label => label.text)).toEqual(['1 h', '2 h', '3 h', '4 h'])
    expect(disc({ ...input, turnMinutes: 480 }).labels).toHaveLength(8)
  })

  it('draws the shortest hold on top and ties by id, whatever the order given', () => {
    const deli = { ...meat, id: 'deli' }
    expect(disc({ ...input, cases: [dairy, meat, deli] }).traces.map(item => item.id)).toEqual(['deli', 'meat', 'dairy'])
    expect(disc({ ...input, cases: [deli, meat, dairy] })).toEqual(disc({ ...input, cases: [dairy, meat, deli] }))
  })

  it('has no rim before the first minute and none without a plan', () => {
    const start = disc({ ...input, elapsedMinutes: 0, plannedMinutes: null })
    expect(start.elapsed).toBe('')
    expect(start.planned).toBe('')
    expect(drawn.elapsed).toMatch(/^M0,-158A158/)
  })

  it('draws a case without readings as nothing', () => {
    const empty = disc({ ...input, cases: [{ ...dairy, readings: [], forecast: [] }] })
    expect(trace('dairy', empty)).toMatchObject({ path: '', forecastPath: '', marks: [], meets: null })
  })
})
