// What one record adds to the insights, told on the small store; promises of this project's own, no published source.
import { describe, expect, it } from 'vitest'
import { factsOf } from '../../../server/utils/insights/facts'
import { BACK_CHECKS } from '../../../shared/record/checks'
import { isoTime } from '../../../shared/record/entry'
import type { BodyInput } from '../../../shared/record/kinds'
import type { RecordWriter } from '../../support/record'
import { supervisor, technician } from '../../support/record'
import { DAIRY, FISH, goOn, inHand, reading, signChecks, storyTo } from '../record/store'

const facts = (writer: RecordWriter) => factsOf(writer.state, writer.entries, writer.now)
const act = (change: Partial<BodyInput<'act-signed'>> = {}): BodyInput<'act-signed'> => ({ caseId: DAIRY, act: 'discarded', product: 'Milk', quantity: 12, unit: 'crates', place: 'Bin', takenBy: 'Store', left: false, coolBy: null, words: '', photos: [], ...change })

describe('the facts of a finished outage', () => {
  it('hold its work beside the plan: 20.2 min without control, 20 likely, 26 by 19 times in 20', () => {
    const { work, rounds, discards, excused, notProven, steps } = facts(storyTo('sealed'))
    expect(work).toEqual({ kindId: null, name: 'software update', planned: true, likely: 20, within: 26, took: 20.2 }) // the story waits 8, reads twice in 0.2 and waits 12 min
    expect(rounds.taken).toBe(1)
    expect([discards, excused, notProven, steps]).toEqual([[], [], [], []])
  })

  it('hold the minutes of each step beside its own three times', () => {
    const writer = storyTo('dark')
    writer.sign(technician, 'step-ticked', { step: 'load', state: 'begun', words: '' })
    writer.pass(23).sign(technician, 'step-ticked', { step: 'load', state: 'done', words: '' })
    goOn(writer, 'dark', 'submitted')
    expect(facts(writer).steps).toEqual([{ step: 'load', name: 'load', back: false, minutes: 23, planned: { shortest: 5, likely: 10, longest: 20 } }])
  })

  it('count a round as late once, however many of its readings were', () => {
    const writer = storyTo('dark')
    writer.pass(25).sign(technician, 'reading-taken', reading(DAIRY, 38, { round: 1 }))
    writer.sign(technician, 'reading-taken', reading(FISH, 38, { round: 1 }))
    writer.pass(4).sign(technician, 'reading-taken', reading(DAIRY, 38, { round: 2 }))
    writer.sign(technician, 'reading-taken', reading(FISH, 38, { round: 2 }))
    writer.pass(1).sign(technician, 'control-back', { backAt: isoTime(writer.now) })
    // Open cases are due every ten minutes at the latest: the first round came 25 min after the loss of control.
    const { rounds } = facts(writer)
    expect(rounds).toMatchObject({ taken: 2, late: 1 })
    expect(rounds.worst).toBeGreaterThanOrEqual(15)
    expect(rounds.worst).toBeLessThan(20)
  })

  it('tell how long a case held by its readings, and what was reckoned of the same start', () => {
    const writer = storyTo('dark')
    writer.sign(technician, 'point-in-hand', inHand('C-1', { hand: 'off', seen: 'not-running', reason: 'low suction' }))
    // From 37.0 °F (2.8 °C) by 1 °F every 8 min: some 32 min to 41 °F.
    for (let round = 1; round <= 3; round++) writer.pass(8).sign(technician, 'reading-taken', reading(DAIRY, 37 + round, { round }))
    writer.pass(1).sign(technician, 'control-back', { backAt: isoTime(writer.now) })
    const [hold, ...others] = facts(writer).holds
    expect(others).toEqual([])
    expect(hold).toMatchObject({ caseId: DAIRY, name: 'Dairy wall', readings: 3 })
    expect(hold!.minutes!).toBeGreaterThan(28)
    expect(hold!.minutes!).toBeLessThan(37)
    // With the plan's time constant of 6 h in air of 24 °C, by hand: 6 · 60 · ln((24 − 2.78) / (24 − 5)) = 39.8 min.
    expect(hold!.reckoned!).toBeCloseTo(39.8, 0)
  })

  it('tell nothing of the hold of a case that was held on by hand and did not warm', () => {
    const writer = storyTo('dark')
    for (let round = 1; round <= 3; round++) writer.pass(8).sign(technician, 'reading-taken', reading(DAIRY, 37, { round }))
    writer.pass(1).sign(technician, 'control-back', { backAt: isoTime(writer.now) })
    expect(facts(writer).holds).toEqual([])
  })

  it('name points that were excused, and those left unproven in an exception', () => {
    const writer = storyTo('in-hand')
    writer.pass(1).sign(technician, 'point-excused', { tag: 'CF-1', reason: 'the switch is broken', measure: 'the other fans run', photos: [] })
    expect(facts(writer).excused).toEqual([{ tag: 'CF-1', name: 'condenser-fan CF-1', reason: 'the switch is broken' }])
    expect(facts(writer).touched).toContain('EF-1')

    const left = storyTo('hand-back')
    signChecks(left, BACK_CHECKS)
    left.pass(1).sign(technician, 'point-in-auto', { tag: 'C-1', seen: 'not-called' })
    left.pass(1).sign(supervisor, 'left-in-exception', { points: [{ tag: 'C-1', owner: 'Bram Oster', by: isoTime(left.now + 86_400_000), reason: 'not called for at night' }] })
    expect(facts(left).notProven).toEqual([{ tag: 'C-1', name: 'compressor C-1', reason: 'not called for at night' }])
    left.pass(1).sign(technician, 'point-proven', { tag: 'C-1', words: 'It ran' })
    expect(facts(left).notProven).toEqual([])
  })

  it('tell why product was discarded: the rule that asked for it, or none', () => {
    const writer = storyTo('dark')
    writer.pass(2).sign(technician, 'act-signed', act())
    expect(facts(writer).discards).toEqual([{ caseId: DAIRY, name: 'Dairy wall', product: 'Milk', quantity: 12, unit: 'crates', cause: 'no rule asked for it', at: writer.now, seq: expect.any(Number) as number }])

    const warm = storyTo('dark')
    for (let round = 1; round <= 12; round++) warm.pass(25).sign(technician, 'reading-taken', reading(FISH, 60, { round }))
    const { verdict } = warm.state.cases[FISH]!
    expect(verdict!.verdict).toBe('discard')
    warm.pass(1).sign(technician, 'act-signed', act({ caseId: FISH, product: 'Cod' }))
    expect(facts(warm).discards[0]).toMatchObject({ product: 'Cod', cause: `it must be discarded, ${verdict!.clause}` })
  })
})
