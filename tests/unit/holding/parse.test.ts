import { describe, expect, it } from 'vitest'
import { parseAssessInput } from '../../../server/utils/holding'
import { at, log } from './log'

const GOOD = log('us-food-code-2022/tcs', [[0, 40], [10, 41], [20, 42]], { now: 30 })

/** The fault of the good body with some of its fields changed. */
function faultOf(change: Record<string, unknown>) {
  const parsed = parseAssessInput({ ...GOOD, ...change })
  return parsed.ok ? null : { field: parsed.field, reason: parsed.reason }
}

/** The fault of the good body with its second reading changed. */
function readingFault(change: Record<string, unknown>) {
  return faultOf({ readings: GOOD.readings.map((reading, index) => index === 1 ? { ...reading, ...change } : reading) })
}

describe('a good body', () => {
  it('is taken over as it is', () => {
    expect(parseAssessInput(GOOD)).toEqual({ ok: true, input: GOOD })
  })

  it('may name a version, methods, accuracies and a site’s figures', () => {
    const body = {
      ...log('eu-853-2004/quick-frozen', [[0, -13, { method: 'infrared', accuracy: 1 }]]),
      version: '2026-01',
      site: { limit: -12, minutes: 60, addAccuracy: true, allowsMinus12: true },
    }
    expect(parseAssessInput(body)).toEqual({ ok: true, input: body })
  })

  it('may have times with an offset, and values at both ends', () => {
    expect(faultOf({ darkAt: '2026-03-01T03:00:00+01:00' })).toBeNull()
    expect(readingFault({ value: -76 })).toBeNull()
    expect(readingFault({ value: 176 })).toBeNull()
    expect(parseAssessInput(log('ca-4c/tcs', [[0, -60], [1, 80]])).ok).toBe(true)
  })

  it('may hold 5,000 readings', () => {
    const readings = Array.from({ length: 5_000 }, (_, index) => ({ at: at(index / 100), value: 40 }))
    expect(faultOf({ readings, now: at(50) })).toBeNull()
    expect(faultOf({ readings: [...readings, { at: at(50), value: 40 }], now: at(50) })).toEqual({ field: 'readings', reason: 'must hold at most 5000 readings' })
    // Too long is said before anything of its members.
    expect(faultOf({ readings: Array.from({ length: 5_001 }, () => 0) })).toEqual({ field: 'readings', reason: 'must hold at most 5000 readings' })
    expect(faultOf({ readings: Array.from({ length: 5_000 }, () => 0) })).toMatchObject({ field: 'readings[0]' })
  })
})

describe('a fault', () => {
  it.each([
    ['a body that is no object', null, 'body'],
    ['a body that is a list', [], 'body'],
    ['a body that is a text', 'log', 'body'],
    ['an empty body', {}, 'rulebook'],
  ])('names %s', (_, body, field) => {
    const parsed = parseAssessInput(body)
    expect(parsed).toMatchObject({ ok: false, field })
  })

  it.each([
    ['an unknown rulebook', { rulebook: 'nowhere' }, 'rulebook', 'is unknown'],
    ['an unknown version', { version: '1999-01' }, 'version', 'is not a version of us-food-code-2022'],
    ['an unknown class', { foodClass: 'meat' }, 'foodClass', 'is not a class of us-food-code-2022'],
    ['a missing class', { foodClass: undefined }, 'foodClass', 'is missing'],
    ['an unknown unit', { unit: 'K' }, 'unit', 'must be C or F'],
    ['a missing unit', { unit: undefined }, 'unit', 'must be C or F'],
    ['missing readings', { readings: undefined }, 'readings', 'is missing'],
    ['no reading', { readings: [] }, 'readings', 'at least one'],
    ['readings that are no list', { readings: {} }, 'readings', 'must be a list'],
    ['a missing loss of control', { darkAt: undefined }, 'darkAt', 'is missing'],
    ['a loss of control that is no time', { darkAt: 'yesterday' }, 'darkAt', 'ISO 8601'],
    ['a loss of control without an offset', { darkAt: '2026-03-01T02:00:00' }, 'darkAt', 'ISO 8601'],
    ['a loss of control after now', { darkAt: at(31) }, 'darkAt', 'not be later than now'],
    ['a missing now', { now: undefined }, 'now', 'is missing'],
    ['a day that does not exist', { now: '2026-02-30T02:00:00Z' }, 'now', 'ISO 8601'],
    ['an interval of nothing', { intervalMinutes: 0 }, 'intervalMinutes', 'above 0'],
    ['an interval below nothing', { intervalMinutes: -10 }, 'intervalMinutes', 'above 0'],
    ['an interval in a text', { intervalMinutes: '10' }, 'intervalMinutes', 'must be a number'],
    ['a missing interval', { intervalMinutes: undefined }, 'intervalMinutes', 'is missing'],
    ['a laxer limit', { site: { limit: 41.5 } }, 'site.limit', 'may only be stricter'],
    ['a longer time', { site: { minutes: 241 } }, 'site.minutes', 'may only be stricter'],
    ['a time of nothing', { site: { minutes: 0 } }, 'site.minutes', 'above 0'],
    ['a choice that is no yes or no', { site: { addAccuracy: 'yes' } }, 'site.addAccuracy', 'true or false'],
  ])('names %s', (_, change, field, reason) => {
    expect(faultOf(change)).toEqual({ field, reason: expect.stringContaining(reason) })
  })

  it.each([
    ['a time before the one before it', { at: at(-1) }, 'readings[1].at', 'later than the reading before'],
    ['the same time twice', { at: at(0) }, 'readings[1].at', 'later than the reading before'],
    ['a time later than now', { at: at(31) }, 'readings[1].at', 'not be later than now'],
    ['a time that is none', { at: 'noon' }, 'readings[1].at', 'ISO 8601'],
    ['a missing time', { at: undefined }, 'readings[1].at', 'is missing'],
    ['a value in a text', { value: '41' }, 'readings[1].value', 'must be a number'],
    ['a missing value', { value: undefined }, 'readings[1].value', 'is missing'],
    ['no value', { value: null }, 'readings[1].value', 'must be a number'],
    ['a value that is no number', { value: Number.NaN }, 'readings[1].value', 'must be a number'],
    ['a value without end', { value: Infinity }, 'readings[1].value', 'finite'],
    ['a value below −60 °C', { value: -76.01 }, 'readings[1].value', 'from −60 to 80 °C'],
    ['a value above 80 °C', { value: 176.01 }, 'readings[1].value', 'from −60 to 80 °C'],
    ['an unknown method', { method: 'guess' }, 'readings[1].method', 'product, air or infrared'],
    ['a negative accuracy', { accuracy: -1 }, 'readings[1].accuracy', 'negative'],
  ])('names %s', (_, change, field, reason) => {
    expect(readingFault(change)).toEqual({ field, reason: expect.stringContaining(reason) })
  })

  it('is that of the law’s own choice where it has been made', () => {
    const body = log('eu-853-2004/quick-frozen', [[0, -13]])
    expect(parseAssessInput({ ...body, site: { limit: -12 } })).toMatchObject({ ok: false, field: 'site.limit' })
    expect(parseAssessInput({ ...body, site: { limit: -12, allowsMinus12: true } }).ok).toBe(true)
  })
})
