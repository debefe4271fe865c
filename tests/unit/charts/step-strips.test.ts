import { describe, expect, it } from 'vitest'
import { stepStrips } from '../../../shared/charts/step-strips'

// Geometry of the product's own drawing: a linear scale, no source.
describe('strips of steps', () => {
  const load = { id: 'load', name: 'Load', shortest: 10, likely: 20, longest: 40, took: [15, 50] }
  const start = { id: 'start', name: 'Start', shortest: 2, likely: 3, longest: 4, took: [1] }

  it('lay all steps on one scale, and mark what lies outside the planned times', () => {
    const { rows, left, right, ticks } = stepStrips({ width: 600, steps: [load, start], labelWidth: 100 })
    const minute = (x: number) => (x - left) / (right - left) * 52.5 // the longest of all, 50, and a twentieth
    expect(rows.map(row => [minute(row.from), minute(row.from + row.width), minute(row.likelyX)].map(Math.round))).toEqual([[10, 40, 20], [2, 4, 3]])
    expect(rows.map(row => row.marks.map(({ x, outside }) => [Math.round(minute(x)), outside]))).toEqual([[[15, false], [50, true]], [[1, true]]])
    expect(ticks[0]).toEqual({ minute: 0, x: left })
    expect(rows[1]!.y).toBeGreaterThan(rows[0]!.y)
  })

  it('put names above the strips where there is no room beside them, and keep everything inside', () => {
    const { rows, width, height, axisY } = stepStrips({ width: 320, steps: [load, start], labelWidth: 0 })
    for (const row of rows) expect(row.nameY).toBeLessThan(row.y)
    expect(axisY).toBeGreaterThan(rows.at(-1)!.y)
    expect(height).toBeGreaterThan(axisY)
    expect(Math.max(...rows.flatMap(row => [row.from + row.width, ...row.marks.map(mark => mark.x)]))).toBeLessThan(width)
  })
})
