/** What a verdict says of itself, word for word: a person acts on these sentences. Our own words; rules and sources stand in check-cases. */
import { describe, expect, it } from 'vitest'
import { assess } from '../../../server/utils/holding'
import { allowedWords, figureWords, instantWords, minutesWords, temperatureWords } from '../../../server/utils/holding/words'
import type { LogOptions, Point } from './log'
import { DARK_AT, log } from './log'

function said(row: string, points: Point[], options: LogOptions = {}) {
  const { act, why } = assess(log(row, points, options))
  return { act, why }
}

const WARM = 'The first reading was already above the limit, so the clock starts at 2026-03-01 02:00 UTC; a written time-control plan may not be invoked.'
const PRACTICE = 'outage practice: 4 hours over the limit; outage guidance of Iowa DIAL, El Paso and Washoe County (read in the official text).'
const FOOD_CODE = '3-501.16(A)(2); FDA Food Code 2022 (read in a law that adopts the same text).'
const MICHIGAN = 'outage guidance: temperature and hours; Berrien County Health Department, Michigan (read in a secondary copy).'
const WASHINGTON = 'outage chart for cold food; Washington State Department of Health (read in the official text).'
const SAN_FRANCISCO = 'outage chart for cold food; San Francisco Department of Public Health (read in the official text).'
const READ_AS = 'The chart’s row of 2 to 3 hours is read up to 4 hours, since 3 to 4 hours is not on it.'
const CANADA = ['outage sheet for food service; Canadian outage sheet for food service (read in the official text).', 'Time without a reading, once a round is overdue, is added to the minutes over the limit.'] as const

describe('the limit alone', () => {
  it('says what was last seen, and that nobody looked', () => {
    expect(said('us-food-code-2022/tcs', [[0, 40]])).toEqual({ act: null, why: ['Last seen at 40 °F, the limit being 41 °F.', FOOD_CODE, 'No minutes counted over 41 °F.'] })
    expect(said('us-food-code-2022/tcs', [[0, 40]], { now: 11 })).toEqual({
      act: 'Take a product temperature now: the last one is older than the interval.',
      why: ['Last seen at 40 °F, the limit being 41 °F.', FOOD_CODE, 'No minutes counted over 41 °F.', 'Last seen within the limit at 2026-03-01 02:00 UTC, longer ago than the interval of 10 minutes.'],
    })
    expect(said('us-food-code-2022/tcs', [[0, 39, { method: 'air' }]])).toEqual({
      act: 'Take a product temperature now: there is none to judge by.',
      why: ['No reading of product temperature was given, and no other kind clears or condemns product.'],
    })
    expect(said('us-food-code-2022/shell-eggs', [[0, 39, { method: 'product' }]]).act).toBe('Take an air temperature now: there is none to judge by.')
    expect(said('us-food-code-2022/shell-eggs', [[0, 39]], { now: 20 }).act).toBe('Take an air temperature now: the last one is older than the interval.')
  })

  it('says what is suspected and what may be freezing', () => {
    expect(said('us-food-code-2022/tcs', [[0, 41], [10, 29], [11, 60, { method: 'air' }]]).why.slice(3)).toEqual([
      'A reading was below 30 °F: product may be freezing.',
      'A reading of another kind was above the limit: take a product temperature.',
    ])
    expect(said('us-food-code-2022/shell-eggs', [[0, 44, { method: 'air' }], [5, 60, { method: 'product' }]]).why.at(-1)).toBe('A reading of another kind was above the limit: take an air temperature.')
  })
})

describe('a clock', () => {
  it('says its sum, whether it runs, and what counted', () => {
    expect(said('us-food-code-2022/tcs', [[0, 40], [10, 44], [20, 40], [100, 40], [110, 45]], { now: 120 })).toEqual({
      act: 'Cool it to the limit or below before the deadline.',
      why: [
        '40 minutes over 41 °F; the clock runs.', PRACTICE,
        'Counted: 2026-03-01 02:00 UTC to 2026-03-01 02:20 UTC, 20 minutes, at up to 44 °F.',
        'Counted: 2026-03-01 03:40 UTC to 2026-03-01 04:00 UTC, 20 minutes, at up to 45 °F.',
      ],
    })
    expect(said('us-food-code-2022/tcs', [[0, 44], [241, 40]])).toEqual({
      act: 'Discard it: over the limit for longer than is allowed.',
      why: ['241 minutes over 41 °F; more than 240 means discard.', PRACTICE, 'Counted: 2026-03-01 02:00 UTC to 2026-03-01 06:01 UTC, 241 minutes, at up to 44 °F.', WARM],
    })
  })

  it('at a temperature itself says so, and is told of while the verdict is mild', () => {
    expect(said('us-mi-county/tcs', [[0, 46]], { now: 240 })).toEqual({
      act: 'Discard it: too long at 46 °F or over.',
      why: ['240 minutes at or over 46 °F; 240 or more means discard.', MICHIGAN, 'Counted: 2026-03-01 02:00 UTC to 2026-03-01 06:00 UTC, 240 minutes, at up to 46 °F.', WARM],
    })
    expect(said('us-mi-county/tcs', [[0, 41]], { now: 100 }).why).toEqual([
      'Last seen at 41 °F, the limit being 41 °F.', MICHIGAN, 'No minutes counted over 41 °F.', 'The clock at or over 41 °F runs: 100 minutes so far.',
      'Last seen within the limit at 2026-03-01 02:00 UTC, longer ago than the interval of 10 minutes.',
    ])
    expect(said('us-mi-county/tcs', [[0, 41]]).why.join(' ')).not.toContain('so far')
    expect(said('us-mi-county/tcs', [[0, 42], [10, 40.5]]).why.join(' ')).not.toContain('so far')
  })

  it('with overdue time in it says how much', () => {
    expect(said('ca-4c/tcs', [[0, 4]], { now: 121 })).toEqual({
      act: 'Discard it: too long over the limit or without a reading.',
      why: ['121 minutes over 4 °C, 121 minutes of it overdue without a reading; more than 120 means discard.', CANADA[0], 'No minutes counted over 4 °C.', CANADA[1]],
    })
    expect(said('ca-4c/tcs', [[0, 4], [100, 4], [110, 5]]).why[0]).toBe('110 minutes over 4 °C, 100 minutes of it overdue without a reading; the clock runs.')
    expect(said('ca-4c/tcs', [[0, 4], [10, 4], [20, 5]]).why[0]).toBe('10 minutes over 4 °C; the clock runs.')
  })

  it('of two steps names the worst that is reached', () => {
    expect(said('au-3-2-2/tcs', [[0, 6]], { now: 120 })).toMatchObject({ act: 'Use or sell it now: it may not go back to cold holding.', why: ['120 minutes over 5 °C; 120 or more means act.', '2-hour/4-hour rule; FSANZ; NSW Food Authority (read in the official text).', expect.any(String), WARM, 'The 2-hour/4-hour rule is for ready-to-eat food.'] })
    expect(said('au-3-2-2/tcs', [[0, 6]], { now: 300 })).toMatchObject({ act: 'Discard it: too long between cold and hot holding.', why: expect.arrayContaining(['300 minutes over 5 °C; 240 or more means discard.']) })
  })
})

describe('a mark, a rise and a warm start', () => {
  it('say the reading that decided', () => {
    expect(said('us-food-code-2022/frozen', [[0, 5], [10, 20]])).toEqual({
      act: 'Bring it back to the keep mark; it may be refrozen.',
      why: ['20 °F at 2026-03-01 02:10 UTC; over 10 °F means above.', 'outage practice: thawed frozen food; outage guidance of Iowa DIAL (read in the official text).', 'Counted: 2026-03-01 02:00 UTC to 2026-03-01 02:10 UTC, 10 minutes, at up to 20 °F.'],
    })
    expect(said('uk-england-2013/ice-cream', [[0, -5]]).why).toEqual(['−5 °C at 2026-03-01 02:00 UTC; over −5.6 °C means discard.', 'freezing point of ice cream, −5.6 °C; from memory.', 'No minutes counted over −12 °C.', WARM])
    expect(said('uk-england-2013/chilled', [[0, 12], [10, 8], [20, 9]])).toMatchObject({
      act: 'Discard it: only one period above the limit is allowed. A signed decision may argue paragraph 5(2), breakdown.',
      why: ['Period 2 over 8 °C began at 2026-03-01 02:20 UTC, which means discard.', 'Schedule 4 paragraph 5(1); SI 2013/2996 (read in a law that adopts the same text).', expect.any(String), WARM],
    })
    expect(said('us-wa-doh/tcs', [[-10, 43], [10, 40]])).toEqual({
      act: 'The chart is for food that was within the limit at the start: have a supervisor decide on this product now.',
      why: [
        'The first reading, 43 °F, was not at or below 41 °F, which means at least act.', WASHINGTON,
        'Counted: 2026-03-01 01:50 UTC to 2026-03-01 02:10 UTC, 20 minutes, at up to 43 °F.', WARM.replace('02:00', '01:50'),
      ],
    })
  })
})

describe('a chart', () => {
  it('says what it was looked up by, what it asks and until when', () => {
    expect(said('us-wa-doh/tcs', [[0, 40], [60, 46]])).toMatchObject({ act: 'It may be sold: cool it to the limit or below at once, before the deadline.', why: ['46 °F at 60 minutes without control reads above.', WASHINGTON, expect.any(String)] })
    expect(said('us-sf-dph/tcs', [[0, 40], [130, 47]], { now: 150 })).toMatchObject({
      act: 'Bring it to 45 °F or below within 1 hour. Discard it if that fails.',
      why: ['47 °F at 150 minutes without control reads act, to be brought to 45 °F or below within 1 hour.', SAN_FRANCISCO, expect.any(String), READ_AS],
    })
    expect(said('us-sf-dph/tcs', [[0, 40], [130, 47]], { now: 191 })).toMatchObject({
      act: 'Discard it: it was not cooled in the time that the chart gives.',
      why: ['47 °F at 191 minutes without control, to be brought to 45 °F or below within 1 hour, by 2026-03-01 05:10 UTC; it was not, which means discard.', SAN_FRANCISCO, expect.any(String), READ_AS],
    })
    expect(said('us-sf-dph/tcs', [[0, 40], [1, 50]])).toMatchObject({ act: 'Discard it: 50 °F or over.', why: ['50 °F at 1 minute without control reads discard.', SAN_FRANCISCO, 'Counted: 2026-03-01 02:00 UTC to 2026-03-01 02:01 UTC, 1 minute, at up to 50 °F.', READ_AS] })
    expect(said('us-sf-dph/tcs', [[0, 40], [1, 44]])).toMatchObject({ act: 'Cool it to the limit or below.', why: ['44 °F at 1 minute without control reads above.', SAN_FRANCISCO, expect.any(String), READ_AS] })
  })
})

describe('periods', () => {
  it('that touch are one, at their warmest; the rest of many is only summed', () => {
    expect(said('us-food-code-2022/tcs', [[0, 44], [10, 47], [20, 45], [30, 40]]).why[2]).toBe('Counted: 2026-03-01 02:00 UTC to 2026-03-01 02:30 UTC, 30 minutes, at up to 47 °F.')
    const points = Array.from({ length: 89 }, (_, index): Point => [index, index % 4 === 0 ? 44 : 40])
    const { why } = said('us-food-code-2022/tcs', points)
    expect(why.filter(line => line.startsWith('Counted: '))).toHaveLength(20)
    expect(why).toContain('Counted as well: 3 further periods, 5 minutes together.')
    expect(said('us-food-code-2022/tcs', points.slice(0, 79)).why.join(' ')).not.toContain('as well')
  })
})

describe('figures', () => {
  it('have two decimals at most, a true minus, and no minus before nothing', () => {
    expect([1.005, -0.001, -12, 5.6789, 100].map(figureWords)).toEqual(['1', '0', '−12', '5.68', '100'])
    expect(temperatureWords(-5.6, 'C')).toBe('−5.6 °C')
  })

  it('of time are minutes or whole hours, and instants to the second where they need it', () => {
    expect([60_000, 90_000, 0].map(minutesWords)).toEqual(['1 minute', '1.5 minutes', '0 minutes'])
    expect([60, 120, 50, 90, 1].map(allowedWords)).toEqual(['1 hour', '2 hours', '50 minutes', '90 minutes', '1 minute'])
    expect([DARK_AT, DARK_AT + 1_000].map(instantWords)).toEqual(['2026-03-01 02:00 UTC', '2026-03-01 02:00:01 UTC'])
  })
})
