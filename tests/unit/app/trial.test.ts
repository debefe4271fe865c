/** The trial of a rulebook and the form of a site's limits. The promises are this project's own; sources stand beside checks that have one. */
import { describe, expect, it } from 'vitest'
import { limitChangeLines } from '../../../app/utils/change-words'
import { limitsFormOf, readLimitsForm } from '../../../app/utils/limits-form'
import { ruleRows, settingLines } from '../../../app/utils/rulebook-words'
import type { TrialForm } from '../../../app/utils/trial'
import { judgeTrial } from '../../../app/utils/trial'
import { rulebookById, rulebooks } from '../../../server/utils/holding'
import { NOMINAL_DAY } from '../../../shared/import/trial'
import { PLAIN_HOLDING } from '../../../shared/schemas/equipment'
import type { SiteLimits } from '../../../shared/schemas/equipment'

const us = rulebookById('us-food-code-2022')!
const MINUTE = 60_000
const row = (time: string, value: string) => ({ time, value, method: 'product' as const })
const form = (change: Partial<TrialForm> = {}): TrialForm => ({
  foodClass: 'tcs', unit: 'F', rows: [row('14:00', '40'), row('', ''), row('14:10', '44')], dark: '14:00', now: '15:00', interval: '10', as: null,
  own: { limit: '', minutes: '', addAccuracy: false, allowsMinus12: false }, ...change,
})

describe('a trial', () => {
  it('says what a run would: above, to 4 hours after the interval that counts (outage practice of Iowa DIAL)', () => {
    const outcome = judgeTrial(us, form())
    expect(outcome).toMatchObject({ kind: 'judged', assessment: { verdict: 'above', minutesAbove: { careful: 60 } } })
    if (outcome.kind !== 'judged') return
    expect((Date.parse(outcome.assessment.deadline!) - NOMINAL_DAY) / MINUTE).toBe(14 * 60 + 240)
    expect(outcome.bands.map(({ verdict }) => verdict)).toEqual(['within', 'above'])
  })

  it('takes a site\'s settings, and settings typed', () => {
    const holding = { ...PLAIN_HOLDING, classes: [{ foodClass: 'tcs', limit: 39, minutes: 60 }] }
    expect(judgeTrial(us, form({ as: holding, now: '15:01' }))).toMatchObject({ assessment: { verdict: 'discard', limit: { value: 39 } } })
    expect(judgeTrial(us, form({ as: 'own', own: { limit: '39', minutes: '60', addAccuracy: false, allowsMinus12: false }, now: '15:01' }))).toMatchObject({ assessment: { verdict: 'discard' } })
  })

  it('is empty without a reading, and names each fault at its own row', () => {
    expect(judgeTrial(us, form({ rows: [row(' ', '')] })).kind).toBe('empty')
    expect(judgeTrial(us, form({ rows: [row('14:00', '40'), row('', ''), row('noon', 'x')], interval: '0' }))).toMatchObject({
      kind: 'faulty', faults: { 'rows[2].time': 'noon is not a time; write it as 14:05 or 2026-03-03T14:05Z', 'rows[2].value': 'x is not a number', 'interval': 'Enter minutes, above 0' },
    })
    expect(judgeTrial(us, form({ rows: [row('', ''), row('14:00', '900')] }))).toMatchObject({ kind: 'faulty', faults: { 'rows[1].value': 'Must be from −60 to 80 °C (−76 to 176 °F)' } })
    expect(judgeTrial(us, form({ as: 'own', own: { limit: '45', minutes: '0', addAccuracy: false, allowsMinus12: false } }))).toMatchObject({ kind: 'faulty', faults: { limit: expect.stringContaining('Below 41 °F'), minutes: expect.stringContaining('above 0') } })
  })

  it('reads a class that is judged by air as air (3-501.16(B), shell eggs)', () => {
    expect(judgeTrial(us, form({ foodClass: 'shell-eggs', rows: [row('14:00', '44'), row('14:10', '47')] }))).toMatchObject({ assessment: { suspect: false, limit: { value: 45 }, verdict: expect.not.stringMatching('within') } })
  })
})

describe('the form of limits', () => {
  const limits: SiteLimits = { holding: { addAccuracy: true, allowsMinus12: false, classes: [{ foodClass: 'tcs', limit: 39.5, minutes: null }, { foodClass: 'frozen', limit: null, minutes: 120 }] }, instrumentCheckDays: 60 }

  it('comes back as it was, for every rulebook', () => {
    expect(readLimitsForm(us, limitsFormOf(us, limits))).toEqual({ value: limits, faults: {} })
    for (const book of rulebooks) {
      const own: SiteLimits = { holding: { ...PLAIN_HOLDING, classes: book.classes.map(({ id, limit }) => ({ foodClass: id, limit: limit - 1, minutes: null })) }, instrumentCheckDays: 90 }
      expect(readLimitsForm(book, limitsFormOf(book, own)), book.id).toEqual({ value: own, faults: {} })
    }
  })

  it('says what is wrong where it was typed', () => {
    const typed = limitsFormOf(us, limits)
    typed.classes.find(item => item.foodClass === 'tcs')!.limit = 'cold'
    typed.classes.find(item => item.foodClass === 'frozen')!.minutes = '500'
    typed.instrumentCheckDays = ''
    expect(readLimitsForm(us, typed)).toEqual({ value: null, faults: {
      'tcs.limit': 'cold is not a number', 'frozen.minutes': 'Shorter than 4 hours, the rulebook\'s own time: a site may only be stricter', 'instrumentCheckDays': 'Enter days',
    } })
  })

  it('reads as sentences, for a page and for its history', () => {
    expect(settingLines(us, limits).map(line => line.words)).toEqual([
      'Food that needs time and temperature control for safety: within 39.5 °F', expect.stringContaining('no time longer than 2 h 00'),
      'The accuracy of the thermometer is added to each reading', 'A thermometer\'s check is overdue after 60 days',
    ])
    expect(limitChangeLines({ fields: [{ field: 'class:tcs', before: { limit: 40, minutes: null }, after: null }, { field: 'instrumentCheckDays', before: 90, after: 60 }] }, us)).toEqual([
      'Food that needs time and temperature control for safety: as the rulebook, before within 40.0 °F', 'Checks of thermometers overdue after 60 days, before after 90',
    ])
  })
})

it('every class of every rulebook has rows that begin with its limit and name where each is written', () => {
  for (const book of rulebooks) {
    for (const food of book.classes) {
      const rows = ruleRows(food, book.unit)
      expect(rows[0]!.verdict, food.id).toBe('within')
      expect(rows.length, food.id).toBeGreaterThan(1)
      for (const line of rows) expect(line.authority.clause && line.authority.source && line.when, `${book.id} ${food.id}`).toBeTruthy()
      expect(new Set(rows.map(({ key }) => key)).size).toBe(rows.length)
    }
  }
})
