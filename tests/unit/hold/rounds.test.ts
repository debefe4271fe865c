import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { DEFAULT_FROZEN_HOLD, DEFAULT_TAU_HOURS, FOODS, holdInputOf, holdTime, roundDueMinutes } from '~~/server/utils/hold'
import { CASE_KIND_WORDS, CASE_KINDS, isFrozenKind, isOpenKind, isSlowKind } from '~~/shared/schemas/case-kinds'
import type { FoodId } from '~~/shared/schemas/hold'

describe('when a case is due again (common practice, no source)', () => {
  it.each([
    [{ holdLeftMinutes: 45, open: false, slow: false, intervalMinutes: 10 }, 15],
    [{ holdLeftMinutes: 45, open: true, slow: false, intervalMinutes: 10 }, 10],
    [{ holdLeftMinutes: 24, open: true, slow: false, intervalMinutes: 10 }, 8],
    [{ holdLeftMinutes: 6, open: true, slow: false, intervalMinutes: 10 }, 5],
    [{ holdLeftMinutes: 0, open: false, slow: true, intervalMinutes: 10 }, 5],
    [{ holdLeftMinutes: 600, open: false, slow: false, intervalMinutes: 10 }, 30],
    [{ holdLeftMinutes: 600, open: false, slow: true, intervalMinutes: 10 }, 60],
    [{ holdLeftMinutes: null, open: false, slow: true, intervalMinutes: 10 }, 60],
    [{ holdLeftMinutes: null, open: false, slow: false, intervalMinutes: 10 }, 30],
    [{ holdLeftMinutes: null, open: true, slow: false, intervalMinutes: 10 }, 10],
    [{ holdLeftMinutes: 2, open: true, slow: false, intervalMinutes: 3 }, 3],
  ])('%j: %d', (input, minutes) => {
    expect(roundDueMinutes(input)).toBe(minutes)
  })

  it('never past the site interval for an open case, never shorter for more hold', () => {
    fc.assert(fc.property(
      fc.double({ min: 0, max: 1000, noNaN: true }), fc.double({ min: 0, max: 100, noNaN: true }),
      fc.boolean(), fc.boolean(), fc.integer({ min: 1, max: 60 }),
      (holdLeftMinutes, more, open, slow, intervalMinutes) => {
        const due = roundDueMinutes({ holdLeftMinutes, open, slow, intervalMinutes })
        expect(due).toBeLessThanOrEqual(open ? intervalMinutes : 60)
        expect(roundDueMinutes({ holdLeftMinutes: holdLeftMinutes + more, open, slow, intervalMinutes }))
          .toBeGreaterThanOrEqual(due)
      }))
  })
})

describe('kinds of case', () => {
  it('each has words and a default of its own, estimates all', () => {
    for (const kind of CASE_KINDS) {
      expect(CASE_KIND_WORDS[kind].length).toBeGreaterThan(0)
      expect(isFrozenKind(kind) ? DEFAULT_FROZEN_HOLD[kind].uaPerKgWPerK : DEFAULT_TAU_HOURS[kind]).toBeGreaterThan(0)
    }
  })

  it('open and slow exclude each other', () => {
    expect(CASE_KINDS.filter(isOpenKind)).toEqual([
      'open-multideck', 'open-island', 'fish-counter', 'service-counter', 'produce-open', 'open-coffin',
    ])
    expect(CASE_KINDS.filter(isSlowKind)).toEqual(['walk-in-cooler', 'glass-door-frozen', 'walk-in-freezer'])
  })

  it('a case is asked about by its own figures where it has them, by those of its kind where not', () => {
    const known = { startC: 2, ambientC: 22, limitC: 5 }
    expect(holdInputOf('open-multideck', known)).toMatchObject({ kind: 'chilled', tauHours: 3 })
    expect(holdInputOf('open-multideck', { ...known, tauHours: 4.4 })).toMatchObject({ tauHours: 4.4 })
    expect(holdInputOf('walk-in-freezer', known)).toMatchObject({ kind: 'frozen', uaWPerK: 0.06, massKg: 1, food: 'peas' })
    expect(holdInputOf('walk-in-freezer', { ...known, food: 'cod', uaPerKgWPerK: 0.1 })).toMatchObject({ uaWPerK: 0.1, food: 'cod' })
    expect(holdTime(holdInputOf('walk-in-cooler', { startC: 3, ambientC: 2, limitC: 5 })).minutes).toBeNull()
  })

  it('the food taken by default is the one that reaches -12 °C first', () => {
    const minutes = (food: FoodId) =>
      holdTime(holdInputOf('open-coffin', { startC: -20, ambientC: 22, limitC: -12, food })).minutes!
    const first = (Object.keys(FOODS) as FoodId[]).sort((a, b) => minutes(a) - minutes(b))[0]
    expect(DEFAULT_FROZEN_HOLD['open-coffin'].food).toBe(first)
  })
})
