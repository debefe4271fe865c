/** What each kind of entry does to the state; rules of this project, no published source. */
import { describe, expect, it } from 'vitest'
import { BACK_CHECKS } from '../../../shared/record/checks'
import { isoTime } from '../../../shared/record/entry'
import { applyStored, filesOf, fold, foldLog } from '../../../shared/record/fold'
import type { BodyOf } from '../../../shared/record/kinds'
import { darkMs, nextRound, pointsInHand, proofsDue, roundsTaken } from '../../../shared/record/select'
import { emptyState } from '../../../shared/record/state'
import { secondTechnician, server, supervisor, technician } from '../../support/record'
import { BODIES } from './bodies'
import { BEGAN, CIRCUIT, DAIRY, DRAWING, FISH, GROUP, inHand, opening, planOf, pressure, putAllInHand, reading, returnAll, signChecks, snapshot, storyTo } from './store'

describe('the opening', () => {
  const { state } = storyTo('plan')

  it('holds equipment, plan and author', () => {
    expect([state.phase, state.planned, state.code, state.authors]).toEqual(['plan', true, 'Q001-0041', [technician.id]])
    expect(Object.keys(state.points)).toEqual(snapshot.points.map(point => point.tag))
    expect(Object.values(state.points).every(point => point.status === 'auto' && point.hand === null)).toBe(true)
    expect(Object.values(state.cases).map(item => item.touched)).toEqual([true, true, true])
  })

  it('names the server and the signer before their first entries', () => {
    const { entries } = storyTo('plan')
    expect(entries.map(stored => stored.entry.kind)).toEqual(['signer-named', 'signer-named', 'outage-opened', 'outage-numbered'])
    expect(state.signers[technician.device]).toEqual({ person: technician.id, name: 'Ada Quill', role: 'technician', deviceName: 'Phone', publicKey: technician.publicKey })
    expect(state.signers[server.device]!.person).toBe('server')
  })
})

describe('the plan', () => {
  it('is sent, returned, changed, sent again and approved', () => {
    const writer = storyTo('plan')
    writer.sign(technician, 'plan-submitted', {})
    expect(writer.state.planSubmitted?.by).toBe(technician.id)
    writer.sign(supervisor, 'plan-returned', { reason: 'Later' })
    expect([writer.state.planSubmitted, writer.state.planReturned?.reason]).toEqual([null, 'Later'])
    writer.sign(secondTechnician, 'plan-changed', { plan: planOf({ note: 'later', cases: [{ id: FISH, touched: false, reason: 'empty' }] }) })
    expect([writer.state.plan.note, writer.state.cases[FISH]!.touched, writer.state.authors]).toEqual(['later', false, [technician.id, secondTechnician.id]])
    writer.sign(technician, 'plan-submitted', {})
    writer.sign(supervisor, 'plan-approved', {})
    expect([writer.state.phase, writer.state.approved?.by, writer.state.planReturned]).toEqual(['approved', supervisor.id, null])
  })

  it('that changes once approved waits for approval again', () => {
    const writer = storyTo('approved')
    writer.sign(technician, 'plan-changed', { plan: planOf() })
    expect([writer.state.phase, writer.state.approved, writer.state.planSubmitted]).toEqual(['plan', null, null])
  })
})

describe('a point', () => {
  it('goes in hand with what was seen', () => {
    const writer = storyTo('in-hand')
    writer.sign(technician, 'point-in-hand', inHand('DH-1', { value: { number: 0, unit: 'A' }, words: 'cold', photos: [DRAWING] }))
    expect(writer.state.points['DH-1']).toMatchObject({ status: 'hand', hand: 'off', seen: 'off', value: { number: 0, unit: 'A' }, until: BEGAN + 12 * 3_600_000, words: 'cold', photos: [DRAWING], tried: null })
    expect(writer.state.files).toEqual([DRAWING])
  })

  it('that is not seen as asked never reads as done, yet counts as in hand', () => {
    const writer = storyTo('in-hand')
    writer.sign(technician, 'point-in-hand', inHand('DH-1', { seen: 'on' }))
    const { status, tried } = writer.state.points['DH-1']!
    expect([status, tried?.seen, pointsInHand(writer.state).map(point => point.tag)]).toEqual(['auto', 'on', ['DH-1']])
    writer.sign(technician, 'point-in-hand', inHand('DH-1'))
    expect([writer.state.points['DH-1']!.status, writer.state.points['DH-1']!.tried]).toEqual(['hand', null])
  })

  it('that was tried and then excused counts as in hand until it is back in auto', () => {
    const writer = storyTo('in-hand')
    writer.sign(technician, 'point-in-hand', inHand('DH-1', { seen: 'on' }))
    writer.sign(technician, 'point-excused', { tag: 'DH-1', reason: 'contact welded', measure: 'breaker locked' })
    expect([writer.state.points['DH-1']!.status, pointsInHand(writer.state).length]).toEqual(['excused', 1])
    writer.sign(technician, 'point-in-auto', { tag: 'DH-1', seen: 'answers' })
    expect(pointsInHand(writer.state)).toEqual([])
  })

  it('excused without a try is not in hand', () => {
    const writer = storyTo('in-hand')
    writer.sign(technician, 'point-excused', { tag: 'EF-1', reason: 'no selector', measure: 'runs on loss' })
    expect(writer.state.points['EF-1']).toMatchObject({ status: 'excused', hand: null, excuse: { reason: 'no selector', measure: 'runs on loss' } })
    expect(pointsInHand(writer.state)).toEqual([])
  })

  it('is back in auto before dark as if nothing had been', () => {
    const writer = storyTo('in-hand')
    writer.sign(technician, 'point-in-hand', inHand('DH-1'))
    writer.sign(technician, 'point-in-auto', { tag: 'DH-1', seen: 'not-called' })
    expect(writer.state.points['DH-1']).toMatchObject({ status: 'auto', hand: null, until: null, value: null })
    expect(proofsDue(writer.state)).toEqual([])
  })

  it('not called for after dark is due its proof, which is then signed', () => {
    const writer = storyTo('hand-back')
    signChecks(writer, BACK_CHECKS)
    writer.sign(technician, 'point-in-auto', { tag: 'C-1', seen: 'not-called' })
    expect([writer.state.points['C-1']!.status, proofsDue(writer.state).map(point => point.tag)]).toEqual(['returned', ['C-1']])
    writer.sign(technician, 'point-proven', { tag: 'C-1', words: 'called for at 02:10' })
    expect(writer.state.points['C-1']).toMatchObject({ status: 'proven', seen: 'answers', proof: { by: technician.id } })
  })

  it('a compressor seen stopped is remembered with its moment', () => {
    const writer = storyTo('in-hand')
    writer.sign(technician, 'point-in-hand', inHand('C-2'), { skew: 90_000 })
    expect(writer.state.points['C-2']!.stoppedAt).toBe(writer.now)
    expect(writer.state.points['EF-1']!.stoppedAt).toBeNull()
  })
})

describe('time without control', () => {
  it('begins at the time that is given, on the server\'s clock', () => {
    const writer = storyTo('in-hand')
    signChecks(writer, [])
    writer.sign(technician, 'control-lost', { lostAt: isoTime(writer.now - 60_000 + 5000), words: 'gone' }, { skew: 5000 })
    expect([writer.state.phase, writer.state.darks[0]!.from, writer.state.darks[0]!.how]).toEqual(['dark', writer.now - 60_000, 'fact'])
    expect(writer.state.largestSkew).toEqual({ ms: 5000, device: technician.device })
  })

  it('ends when control is back', () => {
    const { state, now } = storyTo('hand-back')
    expect([state.phase, state.backAt, state.darks[0]!.to, darkMs(state, now + 1e9)]).toEqual(['hand-back', now, now, now - state.darks[0]!.from])
  })

  it('counts once where signed times overlap', () => {
    const state = emptyState('x')
    const mark = { by: 'x', at: 0, seq: 1, entry: 'x' }
    const dark = (from: number, to: number | null) => ({ from, to, how: 'fact' as const, words: '', breach: [], mark })
    state.darks = [dark(100, 200), dark(150, 300), dark(400, 410), dark(120, 130), dark(600, null)]
    expect(darkMs(state, 650)).toBe(200 + 10 + 50)
    expect(darkMs(state, 500)).toBe(200 + 10)
  })
})

describe('rounds', () => {
  it('hold readings with their corrected time, and number themselves on', () => {
    const writer = storyTo('in-hand')
    expect(nextRound(writer.state)).toBe(0)
    writer.sign(technician, 'reading-taken', reading(DAIRY, 37.5), { skew: -120_000 })
    writer.pass(1).sign(technician, 'pressure-read', pressure(47))
    expect(writer.state.cases[DAIRY]!.readings[0]).toMatchObject({ value: 37.5, unit: 'F', at: writer.now - 60_000, questioned: false, struck: false, correctedBy: null })
    expect(writer.state.pressures[0]).toMatchObject({ suctionGroupId: GROUP, suctionPsig: 47, at: writer.now })
    expect([nextRound(writer.state), roundsTaken(writer.state)]).toEqual([1, [{ round: 0, from: writer.now - 60_000, to: writer.now, cases: 1, racks: 1 }]])
  })
})

describe('verdicts and acts', () => {
  const verdict: BodyOf<'verdict-changed'> = { caseId: DAIRY, verdict: 'act', deadline: isoTime(BEGAN), minutesAbove: 3, clause: '3-501.16', source: 'FDA', act: 'Cool it', why: [], judgedAt: isoTime(BEGAN) }

  it('a verdict that demands an act stays open until one is signed', () => {
    const writer = storyTo('dark')
    writer.serverEntry('verdict-changed', verdict)
    const seq = writer.entries.length
    expect([writer.state.cases[DAIRY]!.verdict?.verdict, writer.state.cases[DAIRY]!.openAct]).toEqual(['act', seq])
    writer.serverEntry('verdict-changed', { ...verdict, verdict: 'unknown', deadline: null, act: null })
    expect(writer.state.cases[DAIRY]!.openAct).toBe(seq)
    writer.sign(technician, 'act-signed', { caseId: DAIRY, act: 'used', product: 'milk', quantity: null, place: '' })
    expect([writer.state.cases[DAIRY]!.openAct, writer.state.cases[DAIRY]!.empty, writer.state.cases[DAIRY]!.acts.length]).toEqual([null, true, 1])
  })

  it('a discard is met by nothing less', () => {
    const writer = storyTo('dark')
    writer.serverEntry('verdict-changed', { ...verdict, verdict: 'discard' })
    writer.sign(technician, 'act-signed', { caseId: DAIRY, act: 'moved', product: '', quantity: null, place: 'cooler' })
    expect([writer.state.cases[DAIRY]!.empty, writer.state.cases[DAIRY]!.openAct]).not.toContain(null)
    writer.sign(technician, 'act-signed', { caseId: DAIRY, act: 'discarded', product: 'milk', quantity: 3, unit: 'l', place: 'bin', takenBy: 'Piet Harrow' })
    expect(writer.state.cases[DAIRY]!.openAct).toBeNull()
  })

  it('a supervisor decides otherwise', () => {
    const writer = storyTo('dark')
    writer.serverEntry('verdict-changed', { ...verdict, verdict: 'discard' })
    writer.sign(supervisor, 'decided-otherwise', { caseId: DAIRY, reason: 'hard cheese', clause: '3-501.19' })
    expect(writer.state.cases[DAIRY]).toMatchObject({ openAct: null, decidedOtherwise: { reason: 'hard cheese', clause: '3-501.19' } })
  })

  it('a case accepted as started warm is no act done', () => {
    const writer = storyTo('in-hand')
    writer.sign(technician, 'act-signed', { caseId: FISH, act: 'accepted-warm', product: '', quantity: null, place: '' })
    expect(writer.state.cases[FISH]).toMatchObject({ acceptedWarm: true, empty: false })
  })
})

describe('the rest of the record', () => {
  it('keeps checks, steps, notes, defrosts and questions', () => {
    const writer = storyTo('dark')
    writer.sign(technician, 'step-ticked', { step: 'load', state: 'begun' })
    writer.pass(5).sign(technician, 'step-ticked', { step: 'load', state: 'done' })
    writer.sign(technician, 'note-added', { words: 'Rain' })
    const asked = writer.sign(supervisor, 'question-asked', { about: null, words: 'Why so late?' })
    writer.sign(technician, 'question-answered', { question: asked.id, words: 'A flat tyre' })
    writer.sign(technician, 'control-back', { backAt: isoTime(writer.now) })
    writer.sign(technician, 'defrost-watched', { circuitId: CIRCUIT, words: 'all melted' })
    const { state } = writer
    expect(state.checks['store-told']).toMatchObject({ outcome: 'done', mark: { by: technician.id } })
    expect([state.steps.load!.begun!.at, state.steps.load!.done!.at]).toEqual([writer.now - 300_000, writer.now])
    expect([state.notes[0]!.words, state.questions[0]!.answer?.words, state.defrostsWatched[0]!.circuitId]).toEqual(['Rain', 'A flat tyre', CIRCUIT])
  })

  it('keeps when each device was last heard, and until when it has no signal', () => {
    const writer = storyTo('dark')
    const until = writer.now + 30 * 60_000
    writer.sign(technician, 'silence-announced', { until: isoTime(until) })
    const announced = writer.now
    expect(writer.state.heard[technician.device]).toEqual({ at: announced, until })
    writer.pass(40).sign(technician, 'note-added', { words: 'back' })
    expect(writer.state.heard[technician.device]).toEqual({ at: announced + 40 * 60_000, until })
    const late = writer.sign(technician, 'silence-announced', { until: isoTime(until) }, { expect: 'questioned' })
    expect(writer.state.questioned.at(-1)).toMatchObject({ entry: late.id, why: ['the time lies in the past'] })
  })

  it('keeps a step that has the name of what every object has', () => {
    const writer = storyTo('in-hand')
    const step = { ...planOf().steps[0]!, id: 'constructor' }
    writer.sign(technician, 'plan-changed', { plan: planOf({ steps: [step] }) })
    writer.sign(technician, 'step-ticked', { step: 'constructor', state: 'begun' })
    expect(Object.hasOwn(writer.state.steps, 'constructor')).toBe(true)
    expect('begun' in Object).toBe(false)
  })

  it('takes the place of a refused entry in its device\'s chain', () => {
    const writer = storyTo('in-hand')
    const { n } = writer.state.chain[technician.device]!
    writer.serverEntry('entry-refused', { ...BODIES['entry-refused'], device: technician.device, n: n + 1, hash: 'f'.repeat(64) })
    expect(writer.state.chain[technician.device]).toEqual({ n: n + 1, hash: 'f'.repeat(64) })
    expect(writer.state.refusals).toHaveLength(1)
    writer.sign(technician, 'note-added', { words: 'on it goes' })
    expect(writer.state.chain[technician.device]!.n).toBe(n + 2)
  })

  it('lists photos and drawings', () => {
    const { entries } = storyTo('sealed')
    expect(entries.flatMap(stored => filesOf(stored.entry))).toEqual([DRAWING, DRAWING])
    expect(storyTo('sealed').state.files).toEqual([DRAWING])
  })

  it('ends submitted and sealed', () => {
    const { state } = storyTo('sealed')
    expect([state.phase, state.submitted?.mark.by, state.submitters, state.sealed?.mark.by]).toEqual(['sealed', technician.id, [technician.id], supervisor.id])
    expect(state.sealed!.size).toBe(state.size - 1)
  })
})

describe('folding', () => {
  const { entries, id } = storyTo('sealed')

  it('leaves what it starts from as it was', () => {
    const from = foldLog(id, entries.slice(0, 20))
    const before = structuredClone(from)
    fold(entries.slice(20), from)
    expect(from).toEqual(before)
  })

  it('does not change the entries', () => {
    const before = structuredClone(entries)
    foldLog(id, entries)
    expect(entries).toEqual(before)
  })

  it('applies an entry once', () => {
    const state = foldLog(id, entries)
    const before = structuredClone(state)
    for (const stored of entries) applyStored(state, stored)
    expect(state).toEqual(before)
  })

  it('survives its own JSON, as the cached fold does', () => {
    const half = foldLog(id, entries.slice(0, 30))
    expect(fold(entries.slice(30), JSON.parse(JSON.stringify(half)))).toEqual(foldLog(id, entries))
  })

  it('returns to auto what hand back returned', () => {
    const writer = storyTo('hand-back')
    signChecks(writer, BACK_CHECKS)
    returnAll(writer)
    expect(pointsInHand(writer.state)).toEqual([])
    const again = storyTo('in-hand')
    putAllInHand(again)
    expect(pointsInHand(again.state).map(point => point.tag).sort()).toEqual(planOf().points.map(point => point.tag).sort())
    expect(opening().plan.points).toHaveLength(6)
  })
})
