/** The form of a site's alert rules, and the rules in sentences; the promises are this project's own. */
import { describe, expect, it } from 'vitest'
import { alertFormOf, readAlertForm } from '../../../app/utils/alert-form'
import { alertRulesLines } from '../../../app/utils/alert-rules-words'
import { PLAIN_ALERT_RULES } from '../../../shared/schemas/alert-rules'

const MAUD = { id: '019b76da-a800-7000-8000-000000000001', name: 'Maud Pennington', role: 'administrator' as const }

describe('the form of alert rules', () => {
  it('reads as what it was made of', () => {
    expect(readAlertForm(alertFormOf(PLAIN_ALERT_RULES))).toEqual({ value: PLAIN_ALERT_RULES, faults: {} })
  })

  it.each([['', 'Enter minutes'], ['soon', 'soon is not a number'], ['0', 'At least 1 minute'], ['121', 'At most 120 minutes'], ['2.5', 'Whole minutes']])('says of “%s” minutes: %s', (text, words) => {
    const form = alertFormOf(PLAIN_ALERT_RULES)
    form.passOnAfter[1] = text
    expect(readAlertForm(form)).toEqual({ value: null, faults: { 'passOnAfter.1': words } })
  })

  it('says that somebody must be told first', () => {
    const form = alertFormOf(PLAIN_ALERT_RULES)
    form.levels[0]!.answerable = false
    expect(readAlertForm(form)).toEqual({ value: null, faults: { 'levels.0': 'Somebody must be told first' } })
  })
})

describe('the rules in sentences', () => {
  it('leave out a level without anybody', () => {
    expect(alertRulesLines(PLAIN_ALERT_RULES, [MAUD])).toEqual(['At once: whoever has the outage or points of it in hand.', 'After 5 min without an answer: every supervisor of the site.'])
  })

  it('name people', () => {
    const [first, second] = PLAIN_ALERT_RULES.levels
    expect(alertRulesLines({ levels: [first!, second!, { answerable: false, supervisors: false, people: [MAUD.id] }], passOnAfter: [5, 15] }, [MAUD])[2]).toBe('After 15 min without an answer: Maud Pennington.')
  })
})
