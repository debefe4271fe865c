/** A margin below nothing: measures first, then a supervisor's acceptance, which holds until it is ten minutes worse. Common practice, no source. */
import { describe, expect, it } from 'vitest'
import { marginAt } from '../../../server/utils/hold/margin'
import { foldLog } from '../../../shared/record/fold'
import type { MarginFigure } from '../../../shared/record/margin'
import { acceptanceWanted, acceptedWords, isAccepted, marginFaults, namedMinutes } from '../../../shared/record/margin'
import { otherMeasure } from '../../../shared/record/measures'
import { asNewest } from '../../../shared/record/newest'
import { planChanges } from '../../../shared/record/plan-changes'
import type { OutageState } from '../../../shared/record/state'
import { secondTechnician, supervisor, technician, testSigner } from '../../support/record'
import { DAIRY, judged, planOf, readyForDark, snapshot, storyTo } from './store'

const figure = (minutes: number | null, deadlineMinutes: number | null = null): MarginFigure => ({ minutes, shortest: 'Fish service', deadlineMinutes, deadlineOf: 'Dairy wall' })
const around = (minutes: number | null, deadlineMinutes: number | null = null) => ({ margin: () => figure(minutes, deadlineMinutes) })
const measured = { plan: planOf({ measures: [otherMeasure('doors shut')] }), note: '' }
/** Over 40 minutes the small store's cases do not outlast the work: 6 h · ln(22/19) = 52.8 min. */
const tooLong = { ...measured, plan: { ...measured.plan, duration: { ...measured.plan.duration, dark19in20: 60 } } }

describe('the numbers', () => {
  it('are told in words, cut so that none is better than it is', () => {
    expect(marginFaults(figure(12, 4))).toEqual([])
    expect(marginFaults(figure(null, null))).toEqual([])
    expect(marginFaults(figure(-3.2, -11.5))).toEqual(['the margin is −4 min: Fish service does not outlast the work', 'with nothing running Dairy wall is past its deadline 12 min before the work is over'])
    expect(namedMinutes(figure(-3.2, 11.5))).toEqual({ minutes: -4, deadlineMinutes: 11 })
    expect(acceptedWords({ minutes: -4, deadlineMinutes: -12 })).toBe('a margin of −4 min and a deadline 12 min before the end of the work')
  })

  it('an acceptance holds until either is ten minutes worse', () => {
    const given = { marginAccepted: { minutes: -4, deadlineMinutes: 20, reason: '', mark: { by: '', at: 0, seq: 1, entry: '' } } } as OutageState
    expect(isAccepted(given, figure(-13.9, 20))).toBe(true)
    expect(isAccepted(given, figure(-14, 20))).toBe(false)
    expect(isAccepted(given, figure(-4, -9))).toBe(true)
    expect(isAccepted(given, figure(-4, -10))).toBe(false)
    expect(acceptanceWanted(given, figure(-20))).toEqual(['the margin is −20 min: Fish service does not outlast the work. A supervisor accepted a margin of −4 min; it is 10 minutes worse or more, and must be accepted anew'])
  })

  it('one that was not below nothing when it was accepted is not accepted far below', () => {
    const given = { marginAccepted: { minutes: null, deadlineMinutes: -3, reason: '', mark: { by: '', at: 0, seq: 1, entry: '' } } } as OutageState
    expect(isAccepted(given, figure(-1, -3))).toBe(false)
  })
})

describe('the gates', () => {
  it('without measures the plan is not sent; with them it is', () => {
    const writer = storyTo('plan')
    expect(judged(writer, technician, 'plan-submitted', {}, around(-4))).toEqual({ standing: 'questioned', why: ['the margin is −4 min: Fish service does not outlast the work. Choose measures'] })
    expect(judged(writer, technician, 'plan-submitted', {}, around(8, -1)).standing).toBe('questioned')
    writer.sign(technician, 'plan-changed', measured)
    expect(judged(writer, technician, 'plan-submitted', {}, around(-4)).standing).toBe('accepted')
  })

  it('it is approved once a supervisor has accepted the number', () => {
    const writer = storyTo('plan')
    writer.sign(technician, 'plan-changed', tooLong)
    writer.pass(1).sign(technician, 'plan-submitted', {})
    const [refused] = judged(writer, supervisor, 'plan-approved', {}).why
    expect(refused).toContain('A supervisor must accept it')
    const numbers = namedMinutes(marginAt(writer.state, writer.now)!)
    expect(numbers.minutes).toBe(-8)
    writer.pass(1).sign(supervisor, 'margin-accepted', { ...numbers, reason: 'product is moved by hand' })
    expect(writer.state.marginAccepted).toMatchObject({ minutes: -8, reason: 'product is moved by hand' })
    writer.pass(1).sign(supervisor, 'plan-approved', {})
    expect(writer.state.phase).toBe('approved')
    expect(foldLog(writer.id, writer.entries)).toEqual(writer.state)
  })

  it('control is not taken away with a number that got ten minutes worse', () => {
    const writer = storyTo('in-hand')
    readyForDark(writer)
    const lostAt = new Date(writer.now).toISOString()
    expect(judged(writer, technician, 'went-dark', { lostAt }, around(5)).standing).toBe('accepted')
    expect(judged(writer, technician, 'went-dark', { lostAt }, around(-5)).why).toEqual(['the margin is −5 min: Fish service does not outlast the work. A supervisor must accept it'])
  })

  it('the real start temperatures count: read at 40 °F, the small store\'s cases hold 360·ln(19.56/19) = 10.4 min', () => {
    const writer = storyTo('in-hand')
    readyForDark(writer)
    for (const id of [DAIRY]) writer.pass(0.1).sign(technician, 'reading-taken', { round: 1, caseId: id, value: 40, unit: 'F', method: 'product', instrumentId: null })
    expect(judged(writer, technician, 'went-dark', { lostAt: new Date(writer.now).toISOString() }).why[0]).toContain('the margin is −16 min: Dairy wall does not outlast the work')
  })
})

describe('the acceptance', () => {
  const writer = storyTo('plan')
  writer.sign(technician, 'plan-changed', measured)
  const accept = (minutes: number | null, now: number | null, signer = supervisor) => judged(writer, signer, 'margin-accepted', { minutes, deadlineMinutes: null, reason: 'moved by hand' }, around(now))

  it('is a supervisor\'s, and not the author\'s', () => {
    expect(accept(-4, -4).standing).toBe('accepted')
    expect(accept(-4, -4, secondTechnician).standing).toBe('refused')
    const author = testSigner('Ada Quill', 'supervisor')
    expect(accept(-4, -4, { ...author, id: technician.id })).toEqual({ standing: 'refused', why: ['nobody accepts the margin of what they planned themselves (I10)'] })
  })

  it('names the number as it stands', () => {
    expect(accept(-4, -5).standing).toBe('accepted')
    expect(accept(-4, -9).why).toEqual(['the numbers are others by now: read them again'])
    expect(accept(null, -4).standing).toBe('questioned')
    expect(accept(4, 4).why).toEqual(['the margin is not negative: there is nothing to accept'])
  })

  it('comes after the measures', () => {
    expect(judged(storyTo('plan'), supervisor, 'margin-accepted', { minutes: -4, deadlineMinutes: null, reason: 'x' }, around(-4)).why).toEqual(['choose measures first: what remains after them is accepted'])
  })
})

describe('a plan of version 1', () => {
  it('reads in version 2 with its measures as words', () => {
    const { assumptions: _, ...plan } = planOf()
    const old = { v: 1, kind: 'plan-changed', body: { plan: { ...plan, measures: ['Night covers'] }, note: '' } } as unknown as Parameters<typeof asNewest>[0]
    expect(asNewest(old)).toMatchObject({ v: 2, body: { plan: { measures: [{ kind: 'other', caseIds: [], factor: 1, words: 'Night covers' }], assumptions: [] } } })
  })
})

describe('what changed between two plans', () => {
  it('is nothing between equals', () => {
    expect(planChanges(planOf(), planOf(), snapshot)).toEqual([])
  })

  it('is said in words', () => {
    const before = planOf()
    const after = planOf({
      startsAt: '2026-03-03T09:00:00.000Z',
      points: before.points.filter(point => point.tag !== 'EF-1').map(point => point.tag === 'C-2' ? { ...point, hand: 'on' as const, reason: 'load is higher' } : point),
      cases: before.cases.map(item => item.id === DAIRY ? { ...item, touched: false } : item),
      measures: [{ kind: 'night-covers', caseIds: [DAIRY], factor: 1.5, words: '' }],
      assumptions: [{ about: 'air-c', id: null, value: 20, reason: 'cool night' }],
    })
    expect(planChanges(before, after, snapshot)).toEqual([
      'Start: Tue 3 Mar 2026, 03:00 (was Mon 2 Mar 2026, 20:00)', 'C-2: on (was off), load is higher', 'No longer touched: EF-1', 'Dairy wall: not touched',
      'New measure: Night covers drawn: Dairy wall', 'Assumed: air of the shop 68.0 °F (cool night)',
    ])
  })
})
