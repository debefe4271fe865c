import { describe, expect, it } from 'vitest'
import { fitCase } from '~~/server/utils/hold/case-fit'
import { isScattered } from '~~/server/utils/hold/for-outage'

/** A multideck warming in a shop, its readings off the true course by so much, up and down in turn. */
function readAt(offK: number) {
  const since = [8, 16, 24, 32, 40, 48].map((minutes, index) => ({ minutes, c: 24 - 22 * Math.exp(-minutes / 240) + (index % 2 === 0 ? offK : -offK) }))
  return fitCase({ kind: 'open-multideck', usualC: 2, limitC: 5, ambientC: 24, priorTauHours: 3, before: [2], since })
}

// A thermometer and its reader: 0.3 K (estimate).
describe('readings that follow no single course', () => {
  it('are those that lie further off it than reading them makes', () => {
    expect(isScattered(readAt(0.1))).toBe(false)
    expect(isScattered(readAt(0.3))).toBe(false)
    expect(isScattered(readAt(0.8))).toBe(true)
  })

  it('are not told from fewer than four', () => {
    expect(isScattered({ n: 3, rmseK: 2 })).toBe(false)
    expect(isScattered({ n: 4, rmseK: 2 })).toBe(true)
  })
})
