// The watch says of an outage what its fold and the engines say; rules of this project, no published source.
import { describe, expect, it } from 'vitest'
import { isoTime } from '../../../shared/record/entry'
import { pointsInHand, roundsTaken } from '../../../shared/record/select'
import { forecastCases } from '../../../server/utils/hold/for-outage'
import { latestTurnBack } from '../../../server/utils/hold/turn-back'
import { watchSummary } from '../../../server/utils/watch/summary'
import { supervisor, technician } from '../../support/record'
import { DAIRY, readAll, storyTo } from '../record/store'

const MINUTE = 60_000

describe('an outage without control', () => {
  const writer = storyTo('dark')
  writer.pass(6)
  readAll(writer, 39)
  const summary = watchSummary(writer.state, writer.now)

  it('gives moments that hold until the next entry', () => {
    const forecasts = forecastCases(writer.state, writer.now)
    const back = latestTurnBack(writer.state, forecasts, writer.now)
    expect(summary).toMatchObject({
      id: writer.id, seq: writer.state.size, phase: 'dark', dark: { from: writer.state.darks[0]!.from, to: null },
      plannedEndAt: writer.state.darks[0]!.from + writer.state.plan.duration.dark19in20 * MINUTE,
      pointsInHand: pointsInHand(writer.state).length, rounds: roundsTaken(writer.state).map(round => round.to), turnBack: null, questioned: 0, margin: null,
    })
    expect(summary.cases.map(item => item.id)).toEqual(forecasts.map(item => item.caseId))
    for (const [place, item] of summary.cases.entries()) {
      const forecast = forecasts[place]!
      expect(item.dueAt).toBe(Math.round(forecast.dueAt))
      expect(item.limitAt).toBe(forecast.toward === 'limit' && forecast.holdMinutes !== null ? Math.round(writer.now + forecast.holdMinutes * MINUTE) : null)
    }
    expect(summary.deadline?.turnBackAt ?? null).toBe(back && Math.round(back.at))
    const later = watchSummary(writer.state, writer.now + 4 * MINUTE)
    // The careful end drifts with the time alone, so screens ask for it anew each minute.
    for (const [place, item] of later.cases.entries()) expect(Math.abs((item.limitAt ?? 0) - (summary.cases[place]!.limitAt ?? 0))).toBeLessThan(2 * MINUTE)
  })

  it('names the phones that signed, and no server', () => {
    expect(summary.phones.map(phone => phone.name)).not.toContain('Holdover')
    expect(summary.phones.find(phone => phone.device === technician.device)).toMatchObject({ name: technician.name, at: writer.now, until: null })
    expect(summary.phones.map(phone => phone.at)).toEqual(summary.phones.map(phone => phone.at).sort((a, b) => a - b))
  })

  it('says that turning back is ordered, then that it is begun', () => {
    const other = storyTo('dark')
    other.sign(supervisor, 'turn-back-ordered', { reason: 'fish first' })
    expect(watchSummary(other.state, other.now).turnBack).toBe('ordered')
    other.sign(technician, 'turned-back', { reason: 'as ordered' })
    expect(watchSummary(other.state, other.now).turnBack).toBe('begun')
  })

  it('counts what is questioned until it is settled, and shows an act while it is open', () => {
    const other = storyTo('dark')
    other.sign(technician, 'went-dark', { lostAt: isoTime(other.now) }, { expect: 'questioned' })
    const entry = other.entries.at(-1)!.entry.id
    expect(watchSummary(other.state, other.now).questioned).toBe(1)
    other.sign(technician, 'questioned-settled', { entry, words: 'looked' })
    expect(watchSummary(other.state, other.now).questioned).toBe(0)
    other.serverEntry('act-opened', { caseId: DAIRY, cause: 'deadline-near', deadline: isoTime(other.now + 5 * MINUTE), openedAt: isoTime(other.now) })
    expect(watchSummary(other.state, other.now).acts).toEqual([{ caseId: DAIRY, name: 'Dairy wall', words: 'its deadline is near', deadline: other.now + 5 * MINUTE }])
    other.sign(supervisor, 'decided-otherwise', { caseId: DAIRY, reason: 'hard cheese', clause: '3-501.19' })
    expect(watchSummary(other.state, other.now).acts).toEqual([])
  })
})

it('tells the margin of a plan once it is sent for approval, and no round', () => {
  const writer = storyTo('plan')
  const before = watchSummary(writer.state, writer.now)
  expect([before.planSubmitted, before.margin, before.cases, before.deadline]).toEqual([false, null, [], null])
  const after = storyTo('approved')
  const summary = watchSummary(after.state, after.now)
  expect(summary.planSubmitted).toBe(true)
  expect(summary.margin).toMatchObject({ accepted: true, faults: [] })
})
