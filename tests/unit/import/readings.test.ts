/** Readings as people type and paste them. The promises are this project's own; no published source. */
import { describe, expect, it } from 'vitest'
import { readReadingLines, typedNumber, typedTime } from '../../../shared/import/readings'
import { inTrialTimes, NOMINAL_DAY, settleTrial, trialTimeWords } from '../../../shared/import/trial'

const MINUTE = 60_000
const one = (text: string, unit: 'F' | 'C' = 'C') => readReadingLines(text, unit)

describe('lines of readings', () => {
  it.each<[string, string, string]>([
    ['14:05 4.8', '14:05', '4.8'],
    ['14:05\t4.8', '14:05', '4.8'],
    ['14:05,4.8', '14:05', '4.8'],
    ['14:05;4,8', '14:05', '4,8'],
    ['14:05, 4,8', '14:05', '4,8'],
    ['  9:05   −0.5  ', '9:05', '−0.5'],
    ['"14:05","4.8"', '14:05', '4.8'],
    ['2:05 pm 4.8', '2:05 pm', '4.8'],
    ['14:05:30 4.8 °C', '14:05:30', '4.8'],
    ['2026-03-03T14:05:00Z 4.8', '2026-03-03T14:05:00Z', '4.8'],
    ['2026-03-03 14:05,4.8', '2026-03-03 14:05', '4.8'],
    ['2026-03-03T14:05:00.250+01:00\t-18', '2026-03-03T14:05:00.250+01:00', '-18'],
  ])('%s is read', (line, time, value) => {
    expect(one(line)).toEqual({ readings: [{ time, value, method: 'product' }], faults: [] })
  })

  it('may name how they were taken', () => {
    expect(one('14:05 4.8 air\n14:10,5,Infrared\n14:15 5 product').readings.map(({ method }) => method)).toEqual(['air', 'infrared', 'product'])
  })

  it('keep every line that is none, with its number and the reason', () => {
    const { readings, faults } = one('time temperature\n14:05 4.8\n\nhello\n14:10\n14:15 cold\n14:20 41 F\n14:25 5 skin\r\n14:30 5.2')
    expect(readings.map(({ time }) => time)).toEqual(['14:05', '14:30'])
    expect(faults).toEqual([
      { line: 4, text: 'hello', reason: 'begins with no time; write it as 14:05 4.8' },
      { line: 5, text: '14:10', reason: 'has no temperature' },
      { line: 6, text: '14:15 cold', reason: 'has no temperature that can be read after 14:15' },
      { line: 7, text: '14:20 41 F', reason: 'is in °F, not in °C' },
      { line: 8, text: '14:25 5 skin', reason: 'ends in skin, which is none of product, air, infrared' },
    ])
  })

  it('lose nothing: each line with anything in it is a reading or a fault', () => {
    const lines = ['1:00 1', 'x', '2:00 2 air', '3:00', '99:00 5', '4:00 5 6 7']
    const { readings, faults } = one(lines.join('\n'))
    expect(readings.length + faults.length).toBe(lines.length)
  })
})

describe('what is typed', () => {
  it.each<[string, number | null]>([['4.8', 4.8], ['4,8', 4.8], ['−0.5', -0.5], ['+3', 3], ['', null], ['4.', null], ['1e3', null], ['4 8', null]])('%s as a number', (text, value) => {
    expect(typedNumber(text)).toBe(value)
  })

  it.each<[string, ReturnType<typeof typedTime>]>([
    ['14:05', { clock: 845 * MINUTE }],
    ['0:00', { clock: 0 }],
    ['12:10 am', { clock: 10 * MINUTE }],
    ['12:10 PM', { clock: 730 * MINUTE }],
    ['24:00', null],
    ['13:00 pm', null],
    ['14:60', null],
    ['1405', null],
    ['2026-03-03T14:05Z', { instant: Date.UTC(2026, 2, 3, 14, 5) }],
    ['2026-03-03 14:05', { instant: Date.UTC(2026, 2, 3, 14, 5) }],
    ['2026-03-03T14:05+0100', { instant: Date.UTC(2026, 2, 3, 13, 5) }],
    ['2026-02-30T14:05Z', null],
  ])('%s as a time', (text, time) => {
    expect(typedTime(text)).toEqual(time)
  })
})

describe('a trial', () => {
  const row = (time: string, value = '4') => ({ time, value, method: 'product' as const })
  const minutes = (ms: number | null) => ms === null ? null : (ms - NOMINAL_DAY) / MINUTE

  it('goes on past midnight', () => {
    const settled = settleTrial([row('23:50'), row('00:10'), row('00:05')], '', '')
    expect(settled.readings.map(({ at }) => minutes(at))).toEqual([1430, 1450, 2885])
    expect(settled).toMatchObject({ clockOnly: true, faults: [] })
  })

  it('takes the loss of control nearest to the first reading, and now after the last', () => {
    expect(minutes(settleTrial([row('00:05')], '23:50', '').darkAt)).toBe(-10)
    expect(minutes(settleTrial([row('23:50')], '00:05', '').darkAt)).toBe(1445)
    expect(minutes(settleTrial([row('14:00')], '', '').darkAt)).toBe(840)
    expect(minutes(settleTrial([row('14:00'), row('14:10')], '', '').now)).toBe(850)
    expect(minutes(settleTrial([row('14:00'), row('14:10')], '', '14:05').now)).toBe(845 + 1440)
    expect(minutes(settleTrial([row('14:00')], '14:30', '').now)).toBe(870)
  })

  it('takes dates as they are', () => {
    const settled = settleTrial([row('2026-03-03T14:05Z'), row('2026-03-03T15:15+01:00')], '2026-03-03T14:00Z', '2026-03-03T14:20Z')
    expect(settled).toMatchObject({ clockOnly: false, faults: [], darkAt: Date.UTC(2026, 2, 3, 14), now: Date.UTC(2026, 2, 3, 14, 20) })
    expect(settled.readings.map(({ at }) => at)).toEqual([Date.UTC(2026, 2, 3, 14, 5), Date.UTC(2026, 2, 3, 14, 15)])
  })

  it.each<[string, Parameters<typeof settleTrial>, object]>([
    ['no time', [[row('')], '', ''], { row: 0, field: 'time', reason: 'Enter a time' }],
    ['what is no time', [[row('noon')], '', ''], { row: 0, field: 'time', reason: 'noon is not a time; write it as 14:05 or 2026-03-03T14:05Z' }],
    ['no temperature', [[row('14:00', '')], '', ''], { row: 0, field: 'value', reason: 'Enter a temperature' }],
    ['what is no temperature', [[row('14:00', 'cold')], '', ''], { row: 0, field: 'value', reason: 'cold is not a number' }],
    ['a time twice', [[row('14:00'), row('14:00')], '', ''], { row: 1, field: 'time', reason: 'Two readings have this time' }],
    ['a date that goes back', [[row('2026-03-03T14:05Z'), row('2026-03-03T14:00Z')], '', ''], { row: 1, field: 'time', reason: 'This is earlier than the reading before it' }],
    ['times of two kinds', [[row('2026-03-03T14:05Z'), row('14:10')], '', ''], { row: 1, field: 'time', reason: 'Write every time with its date, or none' }],
    ['a loss that is no time', [[row('14:00')], 'early', ''], { row: 'dark', field: 'time' }],
    ['a now before the last reading', [[row('2026-03-03T14:05Z')], '', '2026-03-03T14:00Z'], { row: 'now', field: 'time', reason: 'This is before the last reading' }],
  ])('names %s', (_name, args, fault) => {
    expect(settleTrial(...args).faults).toMatchObject([fault])
  })

  it('says times as they were typed', () => {
    expect([0, 1440, 2880, -10].map(minute => trialTimeWords(NOMINAL_DAY + minute * MINUTE, true))).toEqual(['00:00', '00:00 next day', '00:00 on day 3', '23:50 the day before'])
    expect([1, 30_000, -1].map(ms => trialTimeWords(NOMINAL_DAY + 60 * MINUTE + ms, true))).toEqual(['01:00', '01:00:30', '01:00'])
    expect(trialTimeWords(Date.UTC(2026, 2, 3, 14, 5), false)).toBe('2026-03-03 14:05 UTC')
    expect(inTrialTimes('Counted: 2026-01-05 14:05 UTC to 2026-01-06 00:10:30 UTC, 10 minutes.', true)).toBe('Counted: 14:05 to 00:10:30 next day, 10 minutes.')
    expect(inTrialTimes('at 2026-03-03 14:05 UTC', false)).toBe('at 2026-03-03 14:05 UTC')
  })
})
