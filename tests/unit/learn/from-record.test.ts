import { describe, expect, it } from 'vitest'
import { casesTaught, combinedTau, correctedTimes, stepsTaught } from '../../../server/utils/learn/from-record'
import { chilledAt } from '../../../server/utils/hold/chilled'
import { tauOrigin } from '../../../shared/schemas/lessons'
import { inUnit } from '../../../shared/record/select'
import { isoTime } from '../../../shared/record/entry'
import { technician } from '../../support/record'
import { DAIRY, FISH, goOn, inHand, reading, storyTo } from '../record/store'

/** Nothing runs: the only compressor is off by hand; the dairy warms with a time constant of 4 h, where 6 h were assumed. */
function lesson({ reads = 6, act = false, held = false, tauHours = 4 } = {}) {
  const writer = storyTo('dark')
  if (!held) writer.sign(technician, 'point-in-hand', inHand('C-1', { hand: 'off', seen: 'not-running', reason: 'low suction' }))
  const from = writer.now
  for (let index = 1; index <= reads; index++) {
    writer.pass(8).sign(technician, 'reading-taken', reading(DAIRY, Math.round(10 * inUnit(chilledAt(2.78, 24, tauHours, (writer.now - from) / 60_000), 'F')) / 10, { round: index }))
    if (act && index === 2) writer.pass(1).sign(technician, 'act-signed', { caseId: DAIRY, act: 'night-covers', product: '', quantity: null, place: '', words: '', photos: [] })
  }
  writer.sign(technician, 'control-back', { backAt: isoTime(writer.now) })
  const taught = casesTaught(writer.state, writer.entries)
  return { writer, dairy: taught.find(item => item.caseId === DAIRY)!, fish: taught.find(item => item.caseId === FISH)! }
}

describe('what a record teaches of its cases', () => {
  it('offers the fitted time constant with its readings, and what it was', () => {
    const { dairy } = lesson()
    expect(dairy.not).toBeNull()
    expect(dairy.tauHours!).toBeGreaterThan(3.5)
    expect(dairy.tauHours!).toBeLessThan(5)
    expect(dairy).toMatchObject({ name: 'Dairy wall', readings: 6, was: { tauHours: 6, words: 'estimate' } })
    expect(dairy.rmseK).toBeLessThan(0.1)
  })

  it('offers nothing of a case read too seldom or not at all', () => {
    const { dairy, fish } = lesson({ reads: 2 })
    expect(dairy).toMatchObject({ tauHours: null, not: 'only 2 readings without control' })
    expect(fish).toMatchObject({ tauHours: null, not: 'not read without control' })
  })

  it('offers nothing of a case that was held on by hand, though all is back in auto by now', () => {
    const { writer, dairy } = lesson({ held: true, tauHours: 400 })
    expect(dairy.not).toBe('it was held on by hand and did not warm')
    goOn(writer, 'hand-back', 'settle')
    expect(casesTaught(writer.state, writer.entries).find(item => item.caseId === DAIRY)!.not).toBe('it was held on by hand and did not warm')
  })

  it('offers with a caution what warmed though it was held on by hand', () => {
    expect(lesson({ held: true }).dairy).toMatchObject({ not: null, caution: expect.stringContaining('held on by hand') as string })
    expect(lesson().dairy.caution).toBeNull()
  })

  it('learns only until the first act that changes how the case warms', () => {
    expect(lesson({ act: true }).dairy.not).toBe('only 2 readings without control')
  })

  it('several outages: the mean of the logarithms, so that 2 h and 8 h make 4 h', () => {
    expect(combinedTau([2, 8])).toBeCloseTo(4, 12)
    expect(combinedTau([3])).toBeCloseTo(3, 12)
    expect([tauOrigin(false, 0), tauOrigin(true, 0), tauOrigin(true, 1), tauOrigin(true, 3)]).toEqual(['estimate', 'entered by hand', 'from 1 outage', 'from 3 outages'])
  })
})

describe('what a record teaches of the work', () => {
  it('takes the minutes of steps begun and done', () => {
    const writer = storyTo('dark')
    writer.sign(technician, 'step-ticked', { step: 'load', state: 'begun', words: '' })
    writer.pass(14.5).sign(technician, 'step-ticked', { step: 'load', state: 'done', words: '' })
    writer.sign(technician, 'step-ticked', { step: 'restart', state: 'begun', words: '' })
    expect(stepsTaught(writer.state)).toEqual([{ step: 'load', name: 'load', minutes: 14.5 }])
  })

  it('reaches out to what it took, and moves the likely time by its share', () => {
    const was = { shortest: 5, likely: 10, longest: 20 }
    expect(correctedTimes(was, 14, 0)).toEqual({ shortest: 5, likely: 12, longest: 20 })
    expect(correctedTimes(was, 14, 2)).toEqual({ shortest: 5, likely: 11, longest: 20 })
    expect(correctedTimes(was, 26, 0)).toEqual({ shortest: 5, likely: 18, longest: 26 })
    expect(correctedTimes(was, 3, 0)).toEqual({ shortest: 3, likely: 6.5, longest: 20 })
  })
})
