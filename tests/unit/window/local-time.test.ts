/** Changes of the clocks are those of the IANA time zone database. */
import { describe, expect, it } from 'vitest'
import { DAY, localClock, midnightOf, MINUTE, minutesOfDay, wallWords, weekdayOf } from '../../../server/utils/window/local-time'

const at = (timeZone: string, wall: string) => new Date(localClock(timeZone).momentOf(Date.parse(`${wall}Z`))).toISOString()

describe('a local clock', () => {
  it('reads wall times on either side of a change', () => {
    expect(at('Europe/London', '2026-01-15T02:30:00')).toBe('2026-01-15T02:30:00.000Z')
    expect(at('Europe/London', '2026-07-15T02:30:00')).toBe('2026-07-15T01:30:00.000Z')
    expect(at('America/New_York', '2026-01-15T02:30:00')).toBe('2026-01-15T07:30:00.000Z')
    expect(at('Asia/Kathmandu', '2026-01-15T00:00:00')).toBe('2026-01-14T18:15:00.000Z')
  })

  it('puts a skipped time at the first moment after the gap', () => {
    expect(at('Europe/London', '2026-03-29T00:59:00')).toBe('2026-03-29T00:59:00.000Z')
    expect(at('Europe/London', '2026-03-29T01:00:00')).toBe('2026-03-29T01:00:00.000Z')
    expect(at('Europe/London', '2026-03-29T01:45:00')).toBe('2026-03-29T01:00:00.000Z')
    expect(at('Europe/London', '2026-03-29T02:00:00')).toBe('2026-03-29T01:00:00.000Z')
    expect(at('America/New_York', '2026-03-08T02:30:00')).toBe('2026-03-08T07:00:00.000Z')
    expect(at('Australia/Lord_Howe', '2026-10-04T02:15:00')).toBe('2026-10-03T15:30:00.000Z')
  })

  it('takes the first of a time that comes twice', () => {
    expect(at('Europe/London', '2026-10-25T00:59:00')).toBe('2026-10-24T23:59:00.000Z')
    expect(at('Europe/London', '2026-10-25T01:30:00')).toBe('2026-10-25T00:30:00.000Z')
    expect(at('Europe/London', '2026-10-25T02:00:00')).toBe('2026-10-25T02:00:00.000Z')
    expect(at('America/New_York', '2026-11-01T01:30:00')).toBe('2026-11-01T05:30:00.000Z')
  })

  it('manages a day that never was', () => {
    expect(at('Pacific/Apia', '2011-12-30T12:00:00')).toBe('2011-12-30T10:00:00.000Z')
  })

  it('gives back the wall time of every moment whose wall time comes once', () => {
    for (const timeZone of ['Europe/London', 'America/New_York', 'Australia/Lord_Howe', 'Pacific/Chatham', 'UTC']) {
      const clock = localClock(timeZone)
      for (let moment = Date.parse('2026-01-01T00:00:00Z'); moment < Date.parse('2027-01-01T00:00:00Z'); moment += 37 * 60 * MINUTE) {
        expect(clock.momentOf(clock.wallAt(moment))).toBe(moment)
      }
    }
  })

  it('knows days and times of day', () => {
    const wall = Date.parse('2026-03-29T01:45:00Z')
    expect(weekdayOf(wall)).toBe(7)
    expect(weekdayOf(wall + DAY)).toBe(1)
    expect(weekdayOf(Date.parse('1969-12-31T23:00:00Z'))).toBe(3)
    expect(midnightOf(wall)).toBe(Date.parse('2026-03-29T00:00:00Z'))
    expect(minutesOfDay('23:59')).toBe(1439)
    expect(wallWords(wall)).toBe('Sun 01:45')
  })
})
