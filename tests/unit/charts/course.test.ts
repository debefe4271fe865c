/** Geometry of the course of a verdict; worked by hand, no published source. */
import { describe, expect, it } from 'vitest'
import { course } from '../../../shared/charts/course'
import type { CourseInput } from '../../../shared/charts/course'

const input: CourseInput = {
  width: 800, height: 300, limit: 41,
  readings: [{ minute: 20, value: 44 }, { minute: 0, value: 40 }, { minute: 10, value: 40 }],
  bands: [{ verdict: 'within', from: 0, to: 20 }, { verdict: 'above', from: 20, to: 60 }],
  darkMinute: 0, nowMinute: 60, deadlineMinute: 250,
}

describe('the course of a verdict', () => {
  it('lays bands end to end under the plot', () => {
    const { bands, plot, strip, nowX } = course(input)
    expect(bands[0]!.x).toBe(plot.left)
    expect(bands[0]!.x + bands[0]!.width).toBeCloseTo(bands[1]!.x)
    expect(bands[1]!.x + bands[1]!.width).toBeCloseTo(nowX)
    expect(strip.y).toBeGreaterThan(plot.bottom)
    expect(strip.y + strip.height).toBeLessThan(300)
  })

  it('draws readings in order of time, warmer higher, and the last one held to now', () => {
    const { dots, limitY, held, line } = course(input)
    expect(dots.map(dot => dot.minute)).toEqual([0, 10, 20])
    expect(dots[2]!.y).toBeLessThan(limitY)
    expect(dots[0]!.y).toBeGreaterThan(limitY)
    expect(line.match(/[ML]/g)).toHaveLength(3)
    expect(held).not.toBe('')
    expect(course({ ...input, nowMinute: 20 }).held).toBe('')
  })

  it('shows a deadline only where it at most doubles the axis', () => {
    expect(course(input).deadlineX).toBeNull()
    const near = course({ ...input, deadlineMinute: 90 })
    expect(near.deadlineX).toBeCloseTo(near.plot.right)
    expect(near.nowX).toBeLessThan(near.plot.right)
    expect(course({ ...input, deadlineMinute: null }).deadlineX).toBeNull()
  })

  it('leaves room for the words of each tick, on a phone too', () => {
    for (const width of [320, 390, 800, 1200]) {
      const { xTicks } = course({ ...input, width, deadlineMinute: 110 })
      expect(xTicks.length).toBeGreaterThan(1)
      xTicks.slice(1).forEach((tick, index) => expect(tick.x - xTicks[index]!.x).toBeGreaterThan(60))
    }
  })

  it('stands with one reading, and draws a verdict of a moment', () => {
    const { dots, bands, plot, line } = course({ ...input, readings: [{ minute: 0, value: 44 }], nowMinute: 0, bands: [{ verdict: 'above', from: 0, to: 0 }], deadlineMinute: null })
    expect(dots).toHaveLength(1)
    expect(line).toBe('')
    expect(bands[0]!.width).toBe(2)
    expect(plot.right).toBeGreaterThan(plot.left)
  })
})
