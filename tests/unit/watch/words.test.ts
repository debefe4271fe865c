// How the watch says what it shows; words and order are this project's own, no published source.
import { describe, expect, it } from 'vitest'
import type { WatchOutage } from '../../../shared/schemas/watch'
import { stripOf } from '~/utils/watch-strip'
import { alsoOpen, headWords, heardWords, besideWords, inOrderOfHold, roundWords, troublesOf, waitingFor, workOf } from '~/utils/watch-words'

const MINUTE = 60_000
const NOW = Date.parse('2026-03-03T08:24:00.000Z') // 02:24 in Chicago

function row(id: string, change: Partial<WatchOutage> = {}): WatchOutage {
  return {
    id, code: `Q-${id}`, seq: 40, phase: 'dark', planned: true, site: { id: `site of ${id}`, name: 'Quarry Street', timeZone: 'America/Chicago' }, controller: 'Rack A', workKind: 'Software update', intervalMinutes: 10,
    startsAt: null, inHandAt: NOW - 37 * MINUTE, dark: { from: NOW - 13 * MINUTE, to: null }, firstDarkAt: NOW - 13 * MINUTE, endedAt: null, plannedEndAt: NOW + 12 * MINUTE,
    rounds: [NOW - 12 * MINUTE, NOW - 6 * MINUTE], cases: [{ id: 'dairy', name: 'Dairy wall', limitAt: NOW + 28 * MINUTE, dueAt: NOW + 140_000, verdict: 'within' }],
    deadline: { at: NOW + 28 * MINUTE, name: 'Dairy wall', byRulebook: false, turnBackAt: NOW + 20 * MINUTE }, turnBack: null,
    pointsInHand: 12, pointsWaiting: 0, proofsDue: 0, firstUntil: NOW + 600 * MINUTE, acts: [], plant: [], alerts: [], questioned: 0, questions: 0, discarded: 0,
    phones: [{ device: 'phone', name: 'Tess Marlow', role: 'technician', deviceName: 'Phone', at: NOW - 30_000, until: null }], voices: [], offers: [],
    planSubmitted: true, margin: null, authors: ['tess'], submitters: [], ...change,
  }
}
const hold = (minutes: number, name = 'Fish service') => ({ deadline: { at: NOW + minutes * MINUTE, name, byRulebook: false, turnBackAt: NOW + (minutes - 8) * MINUTE } })

describe('the order of the strips', () => {
  it('is the shortest hold first among those without control, then the phase, then the id', () => {
    const rows = [row('settle', { phase: 'settle' }), row('b', hold(28)), row('hand', { phase: 'in-hand', dark: null }), row('plan', { phase: 'plan' }), row('none', { deadline: null, cases: [] }), row('a', hold(28)), row('short', hold(5))]
    expect(inOrderOfHold(rows).map(item => item.id)).toEqual(['short', 'a', 'b', 'none', 'hand', 'settle'])
    expect(inOrderOfHold([...rows].reverse()).map(item => item.id)).toEqual(inOrderOfHold(rows).map(item => item.id))
  })

  it.each([
    [[], 'Every site has control'],
    [[row('a')], '1 site without control'],
    [[row('a'), row('b', { site: { id: 'site of a', name: '', timeZone: 'UTC' } }), row('c'), row('d', { phase: 'settle' })], '2 sites without control'],
  ])('%# is headed %s', (rows, words) => expect(headWords(rows)).toBe(words))
})

describe('beside a strip', () => {
  it('stands the hold that is left, of which case, and the next round', () => {
    expect([besideWords(row('a'), NOW), roundWords(row('a'), NOW), workOf(row('a'))]).toEqual([{ large: '28 min', small: 'Dairy wall', short: false }, { words: 'round in 2:20', late: false }, 'Rack A, software update'])
    expect(besideWords(row('a', hold(5)), NOW)).toEqual({ large: '5 min', small: 'Fish service', short: true })
    expect(besideWords(row('a', hold(-1)), NOW).large).toBe('now')
    expect(besideWords(row('a', { deadline: null, cases: [] }), NOW)).toEqual({ large: 'holds', small: 'no case comes to its limit', short: false })
    expect(roundWords(row('a'), NOW + 250_000)).toEqual({ words: 'round late 1:50', late: true })
    expect(workOf(row('a', { planned: false }))).toBe('Rack A, unplanned')
  })

  it('stands the phase where there is control', () => {
    expect(besideWords(row('a', { phase: 'in-hand', pointsInHand: 1, pointsWaiting: 3 }), NOW)).toMatchObject({ large: 'In hand', small: '1 point in hand, 3 to go' })
    expect(besideWords(row('a', { phase: 'settle', pointsInHand: 0, proofsDue: 1 }), NOW)).toMatchObject({ large: 'Settle', small: '1 proof due' })
    expect(roundWords(row('a', { phase: 'settle', cases: [{ id: 'x', name: 'x', limitAt: null, dueAt: null, verdict: null }] }), NOW)).toBeNull()
  })

  it('stands when its phones were last heard, and after two intervals that they are silent, unless somebody signed so', () => {
    const phone = (at: number, until: number | null = null, role: 'technician' | 'supervisor' = 'technician') => ({ device: `${at}`, name: 'Tess Marlow', role, deviceName: 'Phone', at, until })
    const long = NOW - 21 * MINUTE
    expect(heardWords(row('a'), NOW)).toEqual({ words: 'last heard 02:23:30', silent: false })
    expect(heardWords(row('a', { phones: [phone(NOW - 20 * MINUTE)] }), NOW)?.silent).toBe(false)
    expect(heardWords(row('a', { phones: [phone(long)] }), NOW)).toEqual({ words: 'Not heard for 21 min: Tess Marlow\'s phone was last heard 02:03:00', silent: true })
    expect(heardWords(row('a', { phones: [phone(long, NOW + MINUTE)] }), NOW)).toEqual({ words: 'last heard 02:03:00; no signal until 02:25, as Tess Marlow signed', silent: false })
    // A supervisor who signs at the desk does not stand for the phones on the site.
    expect(heardWords(row('a', { phones: [phone(long), phone(NOW, null, 'supervisor')] }), NOW)?.silent).toBe(true)
    expect(heardWords(row('a', { phase: 'settle', phones: [phone(long)] }), NOW)?.silent).toBe(false)
    expect(heardWords(row('a', { phones: [] }), NOW)).toBeNull()
  })
})

describe('what needs an eye', () => {
  it('is nothing while all goes well', () => expect(troublesOf(row('a'), NOW)).toEqual([]))

  it('comes in the order of its weight', () => {
    const bad = row('a', {
      turnBack: 'ordered', acts: [{ caseId: 'fish', name: 'Fish service', words: 'its deadline is near', deadline: NOW + 5 * MINUTE }], plannedEndAt: NOW - MINUTE, questioned: 2, questions: 1, pointsWaiting: 1, firstUntil: NOW - MINUTE,
      cases: [{ id: 'dairy', name: 'Dairy wall', limitAt: NOW, dueAt: NOW - 3 * MINUTE, verdict: 'above' }], plant: ['discharge 380 psig'],
    })
    expect(troublesOf(bad, NOW)).toEqual([
      'Turning back is ordered and not begun', 'Fish service: its deadline is near, by 02:29', 'Over the time within which the work is done 19 times in 20, since 02:23', 'Not read in time: Dairy wall',
      'Discharge 380 psig', 'Past the time by which an override must be off: 02:23', '1 point not in hand', '2 questioned entries', '1 question without an answer',
    ])
    const alert = (title: string, acknowledged: { name: string, at: number } | null = null) => ({ outage: 'a', key: title, alert: 'round-late' as const, title, words: '', level: 1, raisedAt: NOW, to: [], acknowledged })
    expect(troublesOf(row('a', { alerts: [alert('Round late'), alert('Limit near'), alert('Unheard', { name: 'Sam', at: NOW })] }), NOW)).toEqual(['2 alerts that nobody has acknowledged: round late and limit near'])
    expect(troublesOf(row('a', { alerts: [alert('Round late')] }), NOW)).toEqual(['An alert that nobody has acknowledged: round late'])
    expect(troublesOf(row('a', hold(5)), NOW)).toEqual(['Latest turn-back was 02:21'])
    expect(troublesOf(row('a', { phase: 'in-hand', margin: { minutes: -4, faults: ['the margin is −4 min'], accepted: false }, deadline: null, cases: [], dark: null, plannedEndAt: null }), NOW)).toEqual(['The margin is −4 min, and nobody has accepted it'])
  })
})

describe('what waits', () => {
  const plan = row('plan', { phase: 'plan', dark: null, startsAt: NOW + 25 * 60 * MINUTE, margin: { minutes: 16, faults: [], accepted: true } })
  const submitted = row('done', { phase: 'submitted', seq: 64, discarded: 1, endedAt: NOW - 20 * 60 * MINUTE, submitters: ['tess'] })
  const rows = [row('dark', { voices: [{ supervisor: 'sam', dueAt: NOW + 60 * MINUTE }] }), plan, submitted]

  it('is told to the supervisor whom it waits for', () => {
    expect(waitingFor(rows, 'sam', NOW).map(({ to, what, aside }) => [to, what, aside])).toEqual([
      ['/outages/dark/voice', '1 decision by voice in your name: sign or deny', 'by Tue 03:24'],
      ['/outages/done/review', 'Record submitted: 64 entries, 1 case discarded', 'ended Mon 06:24'],
      ['/outages/plan', 'Plan asks for approval: margin 16 min', 'starts Wed 03:24'],
    ])
  })

  it('says where the 12 hours for a decision by voice are over', () => {
    expect(waitingFor(rows, 'sam', NOW + 61 * MINUTE)[0]!.aside).toBe('the 12 hours are over')
  })

  it('never asks anybody about what they planned or submitted themselves', () => {
    expect(waitingFor(rows, 'tess', NOW)).toEqual([])
    expect(alsoOpen(rows, []).map(line => line.what)).toEqual(['Record submitted, waits for another supervisor', 'Plan asks another supervisor for approval: margin 16 min'])
    expect(alsoOpen(rows, waitingFor(rows, 'sam', NOW))).toEqual([])
  })
})

describe('a strip', () => {
  it('counts from the moment control was lost', () => {
    expect(stripOf(row('a'), NOW)).toMatchObject({ fromMinute: -30, toMinute: 130, nowMinute: 13, inHandMinute: -24, backMinute: null, plannedMinute: 25, deadlineMinute: 41, origin: 'control lost' })
    expect(stripOf(row('a'), NOW).rounds).toEqual([{ minute: 1, taken: true }, { minute: 7, taken: true }, { minute: 13 + 140 / 60, taken: false }])
  })

  it('shows twice as much, and again, where that is too short', () => {
    expect(stripOf(row('a', hold(110)), NOW)).toMatchObject({ fromMinute: -60, toMinute: 260 })
    expect(stripOf(row('a', { dark: { from: NOW - 500 * MINUTE, to: null }, plannedEndAt: null }), NOW)).toMatchObject({ fromMinute: -240, toMinute: 1040 })
  })

  it('counts from now while there is control', () => {
    expect(stripOf(row('a', { phase: 'in-hand', dark: null, plannedEndAt: null, deadline: null }), NOW)).toMatchObject({ nowMinute: 0, inHandMinute: -37, deadlineMinute: null, origin: 'now' })
  })
})
