// The rules of the PIN are this project's own (minutes and gates as its record design lays down); the list of weak PINs is common practice, no source.
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { IDLE_MINUTES, isIdle, LONGEST_WAIT_MS, NO_TRIES, pinFault, waitAfterWrong, waitLeft } from '../../../shared/signing/pin'

const MINUTE = 60_000

describe('a PIN that may be chosen', () => {
  it.each(['407152', '280491', '918273', '013579'])('%s may', pin => expect(pinFault(pin)).toBeNull())
  it.each([
    ['000000', 'fewer than three'], ['121212', 'fewer than three'], ['777717', 'fewer than three'],
    ['123456', 'in a row'], ['654321', 'in a row'], ['890123', 'in a row'], ['210987', 'in a row'],
    ['123123', 'twice'], ['407407', 'twice'], ['112233', 'many people'], ['159753', 'many people'],
    ['12345', '6 digits'], ['1234567', '6 digits'], ['12a456', '6 digits'], ['', '6 digits'], ['４０７１５２', '6 digits'],
  ])('%s may not: %s', (pin, words) => expect(pinFault(pin)).toContain(words))
  it('leaves nearly all of the million: of every hundredth, a few in a thousand are refused', () => {
    const refused = Array.from({ length: 10_000 }, (_none, index) => String(index * 100 + 37).padStart(6, '0')).filter(pin => pinFault(pin) !== null).length
    expect(refused).toBeGreaterThan(5)
    expect(refused).toBeLessThan(80)
  })
})

describe('the quiet after which signing locks', () => {
  it('is 30 minutes while an outage is in hand or dark, else ten', () => {
    expect(IDLE_MINUTES).toEqual({ live: 30, quiet: 10 })
    expect([isIdle(0, 10 * MINUTE - 1, false), isIdle(0, 10 * MINUTE, false)]).toEqual([false, true])
    expect([isIdle(0, 30 * MINUTE - 1, true), isIdle(0, 30 * MINUTE, true)]).toEqual([false, true])
  })
  it('is not stretched by setting the clock back', () => {
    expect(isIdle(10 * MINUTE, 9 * MINUTE, true)).toBe(false)
    expect(isIdle(10 * MINUTE, 9 * MINUTE - 1, true)).toBe(true)
  })
})

describe('the wait after wrong PINs', () => {
  it('is none for two, then 15 s, doubling to an hour', () => {
    expect([0, 1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11, 12, 100].map(wrong => waitAfterWrong(wrong) / 1000)).toEqual([0, 0, 0, 15, 30, 60, 120, 240, 480, 960, 1920, 3600, 3600, 3600])
  })
  it('never shrinks with a further wrong one', () => {
    fc.assert(fc.property(fc.integer({ min: 0, max: 500 }), wrong => waitAfterWrong(wrong + 1) >= waitAfterWrong(wrong)), { seed: 5 })
  })
  it('counts down to nothing', () => {
    const tries = { wrong: 4, lastAt: 1_000_000 }
    expect([0, 10_000, 30_000, 90_000].map(later => waitLeft(tries, tries.lastAt + later))).toEqual([30_000, 20_000, 0, 0])
    expect(waitLeft(NO_TRIES, 5)).toBe(0)
  })
  it('is no longer than itself, whatever the clock did', () => {
    fc.assert(fc.property(fc.nat(60), fc.integer({ min: -1e13, max: 1e13 }), fc.integer({ min: -1e13, max: 1e13 }), (wrong, lastAt, now) => {
      const left = waitLeft({ wrong, lastAt }, now)
      return left >= 0 && left <= waitAfterWrong(wrong) && left <= LONGEST_WAIT_MS
    }), { seed: 6 })
  })
})
