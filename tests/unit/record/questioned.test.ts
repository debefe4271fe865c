/** What a questioned entry does and leaves undone; rules of this project, no published source. */
import { describe, expect, it } from 'vitest'
import { assessCase } from '../../../server/utils/holding/for-outage'
import { BACK_CHECKS } from '../../../shared/record/checks'
import { isoTime } from '../../../shared/record/entry'
import { goDarkGate, NO_RESULTS, sealGate } from '../../../shared/record/gates'
import type { EntryKind } from '../../../shared/record/kinds'
import { isServerKind, KINDS, newestVersion, schemaOf } from '../../../shared/record/kinds'
import type { AnyEntry } from '../../../shared/record/entry'
import { applyStored } from '../../../shared/record/fold'
import { firmReadings, pointsInHand } from '../../../shared/record/select'
import { secondTechnician, supervisor, technician, uuidFor } from '../../support/record'
import type { RecordWriter } from '../../support/record'
import { BODIES } from './bodies'
import { BEGAN, DAIRY, inHand, planOf, PHASES_TOLD, pressure, reading, readyForDark, returnAll, signChecks, storyTo, submission } from './store'

const held = (writer: RecordWriter) => pointsInHand(writer.state).map(point => point.tag)
const QUESTIONED = { expect: 'questioned' } as const

describe('a point that a questioned entry says is in hand', () => {
  it('counts as in hand until somebody has looked and signed', () => {
    const writer = storyTo('approved')
    const early = writer.sign(secondTechnician, 'point-in-hand', inHand('DH-1'), QUESTIONED)
    expect([writer.state.points['DH-1']!.status, held(writer)]).toEqual(['auto', ['DH-1']])
    writer.sign(technician, 'called-off', { reason: 'rain' }, QUESTIONED)
    writer.sign(technician, 'questioned-settled', { entry: early.id, words: 'the selector stands in auto' })
    expect([held(writer), writer.state.questioned[0]!.settled?.words]).toEqual([[], 'the selector stands in auto'])
    writer.sign(technician, 'called-off', { reason: 'rain' })
  })

  it('is looked at by being put in hand or back in auto, yet the entry itself waits', () => {
    const writer = storyTo('approved')
    const early = writer.sign(secondTechnician, 'point-in-hand', inHand('DH-1'), QUESTIONED)
    writer.sign(technician, 'in-hand-begun', {})
    readyForDark(writer)
    expect([writer.state.points['DH-1']!.status, writer.state.points['DH-1']!.questionedHand]).toEqual(['hand', null])
    expect(goDarkGate(writer.state, writer.now, NO_RESULTS)).toEqual(['questioned entries not looked at: DH-1'])
    writer.sign(technician, 'questioned-settled', { entry: early.id, words: 'seen' })
    expect(goDarkGate(writer.state, writer.now, NO_RESULTS)).toEqual([])
    expect(held(writer)).toContain('DH-1')
  })

  it('counts while any such entry is left', () => {
    const writer = storyTo('approved')
    const [first, second] = [technician, secondTechnician].map(signer => writer.pass(1).sign(signer, 'point-in-hand', inHand('DH-1'), QUESTIONED))
    writer.sign(technician, 'questioned-settled', { entry: second!.id, words: 'mine' })
    expect(held(writer)).toEqual(['DH-1'])
    writer.sign(technician, 'questioned-settled', { entry: first!.id, words: 'that too' })
    expect(held(writer)).toEqual([])
  })

  it('does not count again by an entry from before it was looked at', () => {
    const writer = storyTo('approved')
    const [first, second] = [technician, secondTechnician].map(signer => writer.pass(1).sign(signer, 'point-in-hand', inHand('DH-1'), QUESTIONED))
    writer.sign(technician, 'in-hand-begun', {})
    writer.sign(technician, 'point-in-hand', inHand('DH-1'))
    writer.sign(technician, 'point-in-auto', { tag: 'DH-1', seen: 'answers' })
    const late = writer.sign(secondTechnician, 'point-in-hand', inHand('DH-1', { hand: 'on', reason: 'ice', seen: 'on' }), QUESTIONED)
    expect(held(writer)).toEqual(['DH-1'])
    for (const entry of [first!, second!]) writer.sign(technician, 'questioned-settled', { entry: entry.id, words: 'old' })
    expect(held(writer)).toEqual(['DH-1'])
    writer.sign(technician, 'questioned-settled', { entry: late.id, words: 'off again' })
    expect(held(writer)).toEqual([])
  })

  it('keeps hand back open though an exception named its proof', () => {
    const writer = storyTo('hand-back')
    signChecks(writer, BACK_CHECKS)
    writer.sign(technician, 'point-in-auto', { tag: 'C-1', seen: 'not-called' })
    writer.sign(supervisor, 'left-in-exception', { points: [{ tag: 'C-1', owner: 'x', by: isoTime(BEGAN), reason: 'not called for' }] })
    returnAll(writer)
    const stale = writer.sign(secondTechnician, 'point-in-hand', inHand('C-1', { hand: { hz: 40 } }), QUESTIONED)
    writer.sign(technician, 'hand-back-closed', {}, QUESTIONED)
    expect(writer.entries.at(-1)!.why).toEqual(['still in hand: C-1'])
    writer.sign(technician, 'questioned-settled', { entry: stale.id, words: 'in auto' })
    writer.sign(technician, 'hand-back-closed', {})
  })

  it('names a point that is not there and does no harm', () => {
    const writer = storyTo('in-hand')
    writer.sign(technician, 'point-in-hand', inHand('X-9'), QUESTIONED)
    expect(held(writer)).toEqual([])
    expect(Object.keys(writer.state.points)).not.toContain('X-9')
  })
})

describe('a questioned reading', () => {
  it('is kept and judged, opens no gate, and is marked', () => {
    const writer = storyTo('plan')
    writer.sign(technician, 'reading-taken', reading(DAIRY, 37), QUESTIONED)
    writer.sign(technician, 'pressure-read', pressure(47), QUESTIONED)
    expect(writer.state.cases[DAIRY]!.readings).toMatchObject([{ value: 37, questioned: true }])
    expect(writer.state.pressures).toMatchObject([{ suctionPsig: 47, questioned: true }])
    expect(firmReadings(writer.state.cases[DAIRY]!)).toEqual([])
    expect(goDarkGate(writer.state, writer.now, NO_RESULTS)).toContain('round 0 lacks Dairy wall, Fish service')
  })

  /** Dark with a case above its limit (41 °F, FDA Food Code 2022, 3-501.16(A)(2)) or within it. */
  function darkWith(value: number, questionedValue: number | null) {
    const writer = storyTo('dark')
    writer.pass(10).sign(technician, 'reading-taken', reading(DAIRY, value))
    writer.pass(1)
    if (questionedValue !== null) {
      writer.sign(technician, 'reading-taken', reading(DAIRY, questionedValue))
      writer.state.cases[DAIRY]!.readings.at(-1)!.questioned = true
    }
    return assessCase(writer.state, DAIRY, writer.now)!
  }

  it('makes a verdict worse, never better', () => {
    expect([darkWith(38, null).verdict, darkWith(38, 50).verdict]).toEqual(['within', 'above'])
    expect([darkWith(50, null).verdict, darkWith(50, 38).verdict]).toEqual(['above', 'above'])
  })

  it('says nothing of a case that nobody else read in time', () => {
    const writer = storyTo('dark')
    writer.pass(60)
    expect(assessCase(writer.state, DAIRY, writer.now)!.verdict).toBe('unknown')
    writer.state.cases[DAIRY]!.readings.push({ ...writer.state.cases[DAIRY]!.readings[0]!, at: writer.now, questioned: true })
    expect(assessCase(writer.state, DAIRY, writer.now)!.verdict).toBe('unknown')
  })
})

describe('every kind, questioned', () => {
  const kinds = (Object.keys(KINDS) as EntryKind[]).filter(kind => !isServerKind(kind))

  it.each(PHASES_TOLD.map(phase => [phase] as const))('moves no phase, lowers no count and lifts no verdict in %s', (phase) => {
    const writer = storyTo(phase)
    const before = structuredClone(writer.state)
    for (const kind of kinds) {
      const state = structuredClone(before)
      const entry = { v: newestVersion(kind), id: uuidFor(kind), outage: writer.id, kind, body: schemaOf(kind, newestVersion(kind))!.parse(BODIES[kind]), at: isoTime(writer.now), skew: 0, by: technician.id, device: technician.device, n: 99, prev: null } as AnyEntry
      applyStored(state, { entry, signature: '', seq: before.size + 1, receivedAt: isoTime(writer.now), standing: 'questioned', why: ['late'] })
      expect(state.phase, kind).toBe(before.phase)
      expect(pointsInHand(state).length, kind).toBeGreaterThanOrEqual(pointsInHand(before).length)
      expect(Object.values(state.points).map(point => point.status), kind).toEqual(Object.values(before.points).map(point => point.status))
      expect(Object.values(state.cases).map(item => [item.verdict, item.openAct, item.empty]), kind).toEqual(Object.values(before.cases).map(item => [item.verdict, item.openAct, item.empty]))
      expect([state.plan, state.checks, state.authors, state.darks], kind).toEqual([before.plan, before.checks, before.authors, before.darks])
      expect(state.questioned.at(-1), kind).toMatchObject({ kind, why: ['late'], settled: null })
      expect(sealGate(state, []).some(words => words.includes('questioned')), kind).toBe(true)
    }
  })

  it('waits before the seal until it is dealt with', () => {
    const writer = storyTo('submitted')
    const late = writer.sign(technician, 'plan-changed', { plan: planOf() }, QUESTIONED)
    expect(sealGate(writer.state, [])).toEqual(['1 questioned entry not dealt with'])
    writer.sign(supervisor, 'questioned-settled', { entry: late.id, words: 'came late' })
    expect(sealGate(writer.state, [])).toEqual([])
    writer.sign(technician, 'questioned-settled', { entry: late.id, words: 'again' }, QUESTIONED)
    writer.sign(technician, 'submitted', submission(), QUESTIONED)
  })
})
