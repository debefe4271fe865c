/** Near deadlines: the last third of the rule's time, this project's default, no published source. */
import { describe, expect, it } from 'vitest'
import { assess, assessTimed } from '../../../server/utils/holding/judge'
import { isDeadlineNear } from '../../../server/utils/holding/near'

const at = (minutes: number) => new Date(Date.UTC(2026, 2, 3) + minutes * 60_000).toISOString()
const ms = (minutes: number) => Date.parse(at(minutes))

/** Within at the start, then at a value from five minutes on. */
const judged = (rulebook: string, foodClass: string, unit: 'F' | 'C', cold: number, value: number, now: number) => assessTimed({
  rulebook, foodClass, unit, darkAt: at(0), intervalMinutes: 10, readings: [{ at: at(0), value: cold }, { at: at(5), value }], now: at(now),
})

describe('the time of the rule that sets the deadline', () => {
  it.each([
    ['us-food-code-2022', 'tcs', 'F', 38, 46, 100, 240], // four hours over 41 °F
    ['au-3-2-2', 'tcs', 'C', 4, 8, 60, 120], // two hours, then use or sell
    ['au-3-2-2', 'tcs', 'C', 4, 8, 150, 240], // then four
    ['us-mi-county', 'tcs', 'F', 38, 52, 30, 120], // two hours at or over 50 °F
    ['us-wa-doh', 'tcs', 'F', 40, 48, 30, 240],
    ['us-wa-doh', 'tcs', 'F', 40, 52, 30, 120],
    ['ca-4c', 'tcs', 'C', 3, 8, 30, 120],
  ] as const)('%s %s %s: %s then %s, at %s min: %s min', (rulebook, foodClass, unit, cold, value, now, minutes) => {
    expect(judged(rulebook, foodClass, unit, cold, value, now).ruleMinutes).toBe(minutes)
  })
  it('is none where there is no deadline', () => {
    expect(judged('us-food-code-2022', 'tcs', 'F', 38, 40, 8).ruleMinutes).toBeNull()
    expect(judged('us-wa-doh', 'tcs', 'F', 40, 44, 30)).toMatchObject({ ruleMinutes: null, assessment: { verdict: 'above', deadline: null } })
    expect(assessTimed({ rulebook: 'us-food-code-2022', foodClass: 'tcs', unit: 'F', darkAt: at(0), intervalMinutes: 10, readings: [{ at: at(1), value: 60, method: 'air' }], now: at(2) }).ruleMinutes).toBeNull()
  })
  it('is no part of what the assessment tells', () => {
    const input = { rulebook: 'au-3-2-2', foodClass: 'tcs', unit: 'C' as const, darkAt: at(0), intervalMinutes: 10, readings: [{ at: at(5), value: 8 }], now: at(30) }
    expect(assess(input)).toEqual(assessTimed(input).assessment)
    expect(Object.keys(assess(input))).not.toContain('ruleMinutes')
  })
})

describe('near', () => {
  const deadline = at(240)
  it('is the last third and no sooner; a part may be given', () => {
    expect([159, 160, 240, 300].map(minutes => isDeadlineNear({ deadline, ruleMinutes: 240 }, ms(minutes)))).toEqual([false, true, true, true])
    expect([119, 120].map(minutes => isDeadlineNear({ deadline, ruleMinutes: 240 }, ms(minutes), 0.5))).toEqual([false, true])
  })
  it('is never without a deadline', () => {
    expect([isDeadlineNear({ deadline: null, ruleMinutes: 240 }, ms(300)), isDeadlineNear({ deadline, ruleMinutes: null }, ms(300))]).toEqual([false, false])
  })
})
