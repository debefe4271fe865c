import { describe, expect, it } from 'vitest'
import {
  clockWords, countWords, dateWords, dayClockWords, durationWords, listWords, minuteWords, numberWords, offsetWords, temperatureWords,
} from '../../../shared/charts/words'

// The wording is the product's own; the instants are checked against the tz database's published rules.
describe('durationWords', () => {
  it.each([
    [0, '0 s'],
    [40, '40 s'],
    [60, '1 min'],
    [760, '12 min 40 s'],
    [1020, '17 min'],
    [3599, '59 min 59 s'],
    [3600, '1 h 00'],
    [4320, '1 h 12'],
    [11_100, '3 h 05'],
    [97_200, '27 h 00'],
    [-110, '−1 min 50 s'],
    [-0.4, '0 s'],
  ])('says %d s as %s', (seconds, words) => {
    expect(durationWords(seconds)).toBe(words)
  })

  it('cuts fractions, so that time left is never overstated', () => {
    expect(durationWords(119.99)).toBe('1 min 59 s')
  })

  it('says so when there is no number', () => {
    expect(durationWords(Number.NaN)).toBe('unknown')
    expect(minuteWords(Number.POSITIVE_INFINITY)).toBe('unknown')
  })

  it('never reads as a time of day', () => {
    for (let seconds = 0; seconds < 90_000; seconds += 379) expect(durationWords(seconds)).not.toContain(':')
  })
})

describe('minuteWords', () => {
  it.each([[0.9, '0 min'], [47.9, '47 min'], [72, '1 h 12'], [-5.2, '−5 min'], [-0.5, '0 min']])('says %d min as %s', (minutes, words) => {
    expect(minuteWords(minutes)).toBe(words)
  })
})

describe('times at a site', () => {
  it('gives the time of day and the date where the site is', () => {
    expect(clockWords('2026-03-03T08:24:10Z', 'America/Chicago')).toBe('02:24')
    expect(clockWords('2026-03-03T08:24:10Z', 'America/Chicago', true)).toBe('02:24:10')
    expect(dateWords('2026-03-03T05:30:00Z', 'America/Chicago')).toBe('Mon 2 Mar 2026')
    expect(dayClockWords('2026-03-04T09:00:00Z', 'America/Chicago')).toBe('Wed 03:00')
  })

  it('writes midnight as 00:00', () => {
    expect(clockWords('2026-03-03T06:00:00Z', 'America/Chicago')).toBe('00:00')
  })

  it('names the offset in force, on both sides of a change of clocks', () => {
    // 8 March 2026, 02:00 CST is the start of daylight time in the United States (15 U.S.C. 260a).
    expect(offsetWords('2026-03-08T07:59:00Z', 'America/Chicago')).toBe('UTC−6')
    expect(offsetWords('2026-03-08T08:00:00Z', 'America/Chicago')).toBe('UTC−5')
    expect(clockWords('2026-03-08T08:00:00Z', 'America/Chicago')).toBe('03:00')
  })

  it('writes half hours, zero and east', () => {
    expect(offsetWords('2026-01-01T00:00:00Z', 'Asia/Kolkata')).toBe('UTC+5:30')
    expect(offsetWords('2026-01-01T00:00:00Z', 'America/St_Johns')).toBe('UTC−3:30')
    expect(offsetWords('2026-01-01T00:00:00Z', 'UTC')).toBe('UTC')
  })

  it('refuses what is no time', () => {
    expect(() => clockWords('yesterday', 'UTC')).toThrow(RangeError)
  })
})

describe('numbers and lists', () => {
  it('writes temperatures with a true minus and one decimal', () => {
    expect(temperatureWords(39.94, 'F')).toBe('39.9 °F')
    expect(temperatureWords(-18, 'C')).toBe('−18.0 °C')
    expect(numberWords(-0.04)).toBe('0.0')
    expect(numberWords(-12, 0)).toBe('−12')
  })

  it('joins and counts', () => {
    expect(listWords([])).toBe('')
    expect(listWords(['C-2'])).toBe('C-2')
    expect(listWords(['C-1', 'C-2', 'C-4'])).toBe('C-1, C-2 and C-4')
    expect(countWords(1, 'case')).toBe('1 case')
    expect(countWords(2, 'entry', 'entries')).toBe('2 entries')
  })
})
