/** A supervisor's decision by voice, signed within 12 hours: rules of this project, no published source. */
import { describe, expect, it } from 'vitest'
import { BACK_CHECKS } from '../../../shared/record/checks'
import { isoTime } from '../../../shared/record/entry'
import { goDarkGate, handBackGate, sealGate } from '../../../shared/record/gates'
import type { Spoken } from '../../../shared/record/kinds/hands'
import { marginAt } from '../../../server/utils/hold/margin'
import { acceptanceWanted, namedMinutes } from '../../../shared/record/margin'
import { otherMeasure } from '../../../shared/record/measures'
import { pointLines } from '../../../shared/record/record-lines'
import { nameOf } from '../../../shared/record/select'
import { deniedWords, exceptionWords } from '../../../shared/record/summary-words'
import { deniedFaults, openVoices, VOICE_MS, voiceDue, voiceLine, voicesLate } from '../../../shared/record/voice'
import { told } from '../../../shared/record/words'
import type { RecordWriter } from '../../support/record'
import { secondTechnician, supervisor, technician, testSigner, uuidFor } from '../../support/record'
import { BEGAN, DAIRY, goOn, judged, planOf, returnAll, signChecks, storyTo } from './store'

const other = testSigner('Orla Finch', 'supervisor', 'Desk')
const spoken = (writer: RecordWriter, decision: Spoken, change: object = {}) => ({ supervisor: supervisor.id, supervisorName: supervisor.name, givenAt: isoTime(writer.now), words: 'Go on, I take it upon me', decision, ...change })
const exception = (tag = 'C-1'): Spoken => ({ kind: 'left-in-exception', body: { points: [{ tag, owner: 'Piet Harrow', by: isoTime(BEGAN + 86_400_000), reason: 'not called for tonight' }] } })
const otherwise: Spoken = { kind: 'decided-otherwise', body: { caseId: DAIRY, reason: 'sold at once', clause: '3-501.19', photos: [] } }

/** Hand back with one proof due. */
function proofDue(): RecordWriter {
  const writer = storyTo('hand-back')
  signChecks(writer, BACK_CHECKS)
  writer.sign(technician, 'point-in-auto', { tag: 'C-1', seen: 'not-called' })
  returnAll(writer)
  return writer
}

describe('a decision by voice', () => {
  it('has its effect at once, in the name of the supervisor', () => {
    const writer = proofDue()
    expect(handBackGate(writer.state)).toEqual(['not yet proven: C-1'])
    writer.sign(technician, 'voice-decision', spoken(writer, exception()))
    expect(handBackGate(writer.state)).toEqual([])
    expect(writer.state.points['C-1']!.exception).toMatchObject({ owner: 'Piet Harrow', mark: { by: supervisor.id } })
    expect(openVoices(writer.state)).toMatchObject([{ supervisor: supervisor.id, takenBy: technician.id }])
    writer.sign(technician, 'hand-back-closed', {})
  })

  it('names the supervisor before they have signed anything', () => {
    const writer = storyTo('dark')
    writer.sign(technician, 'voice-decision', spoken(writer, otherwise, { supervisor: other.id, supervisorName: other.name }))
    expect(nameOf(writer.state, other.id)).toBe('Orla Finch')
    expect(writer.state.cases[DAIRY]!.decidedOtherwise?.mark.by).toBe(other.id)
  })

  it('fits where the supervisor\'s own entry would have, and only there', () => {
    const writer = proofDue()
    expect(judged(writer, technician, 'voice-decision', spoken(writer, exception('EF-1'))).why).toEqual(['EF-1 is neither in hand nor waiting for its proof'])
    expect(judged(writer, technician, 'voice-decision', spoken(writer, { kind: 'margin-accepted', body: { minutes: -3, deadlineMinutes: null, reason: 'x' } })).why).toContain('does not belong in the phase "hand back"')
    expect(judged(writer, technician, 'voice-decision', spoken(writer, exception(), { supervisor: secondTechnician.id })).standing).toBe('accepted')
    writer.sign(secondTechnician, 'note-added', { words: 'here' })
    expect(judged(writer, technician, 'voice-decision', spoken(writer, exception(), { supervisor: secondTechnician.id })).why).toEqual(['Ines Calloway is not a supervisor'])
    expect(judged(writer, technician, 'voice-decision', spoken(writer, exception(), { givenAt: isoTime(writer.now + 120_000) })).why).toEqual(['the time lies in the future'])
  })

  it('is not taken down by the one who gave it', () => {
    const writer = proofDue()
    expect(judged(writer, supervisor, 'voice-decision', spoken(writer, exception())).standing).toBe('refused')
  })

  it('accepts a margin, but not that of somebody\'s own plan (I10)', () => {
    const writer = storyTo('plan')
    const plan = planOf({ duration: { ...planOf().duration, dark19in20: 70 }, measures: [otherMeasure('doors shut')] })
    writer.sign(technician, 'plan-changed', { plan })
    const figure = marginAt(writer.state, writer.now)!
    const decision: Spoken = { kind: 'margin-accepted', body: { ...namedMinutes(figure), reason: 'the store is shut' } }
    expect(acceptanceWanted(writer.state, figure)).not.toEqual([])
    expect(judged(writer, secondTechnician, 'voice-decision', spoken(writer, decision, { supervisor: technician.id })).why).toContain('nobody accepts the margin of what they planned themselves (I10)')
    const voice = writer.sign(technician, 'voice-decision', spoken(writer, decision))
    expect(acceptanceWanted(writer.state, figure)).toEqual([])
    writer.sign(supervisor, 'voice-denied', { decision: voice.id, reason: 'I said no' })
    expect(acceptanceWanted(writer.state, figure)).not.toEqual([])
    expect(goDarkGate(writer.state, writer.now, { planRefusals: [], margin: figure }).some(words => words.includes('A supervisor must accept it'))).toBe(true)
  })
})

describe('the signature afterwards', () => {
  it('is that of the supervisor who was named', () => {
    const writer = proofDue()
    const decision = writer.sign(technician, 'voice-decision', spoken(writer, exception())).id
    expect(judged(writer, other, 'voice-confirmed', { decision })).toEqual({ standing: 'refused', why: ['this decision was given by Ines Calloway, who signs it'] })
    expect(judged(writer, technician, 'voice-confirmed', { decision }).standing).toBe('refused')
    writer.sign(supervisor, 'voice-confirmed', { decision })
    expect(openVoices(writer.state)).toEqual([])
    expect(judged(writer, supervisor, 'voice-denied', { decision, reason: 'late doubt' }).why).toEqual(['no such decision waits for a signature'])
    expect(judged(writer, supervisor, 'voice-confirmed', { decision: uuidFor('none') }).standing).toBe('questioned')
  })

  it('is waited for by the seal', () => {
    const writer = proofDue()
    const decision = writer.sign(technician, 'voice-decision', spoken(writer, exception())).id
    writer.sign(technician, 'hand-back-closed', {})
    goOn(writer, 'settle', 'submitted')
    writer.sign(supervisor, 'review-begun', {})
    expect(sealGate(writer.state, [])).toEqual(['1 decision by voice not signed by Ines Calloway'])
    writer.sign(supervisor, 'voice-confirmed', { decision })
    expect(sealGate(writer.state, [])).toEqual([])
  })

  it('is due twelve hours after the words, and late past it', () => {
    const writer = proofDue()
    const decision = writer.sign(technician, 'voice-decision', spoken(writer, exception())).id
    const [voice] = openVoices(writer.state)
    expect(voiceDue(voice!) - writer.now).toBe(12 * 3_600_000)
    expect(voicesLate(writer.state, writer.now + VOICE_MS)).toEqual([])
    expect(voicesLate(writer.state, writer.now + VOICE_MS + 1)).toHaveLength(1)
    expect(voiceLine(writer.state, voice!, writer.now + VOICE_MS + 1)).toContain('not signed, and the 12 hours are over')
    writer.pass(13 * 60).sign(supervisor, 'voice-confirmed', { decision })
    expect(voicesLate(writer.state, writer.now)).toHaveLength(1)
    expect(voiceLine(writer.state, writer.state.voices[0]!, writer.now)).toContain('signed by Ines Calloway, after the 12 hours')
  })
})

describe('a denial', () => {
  it('puts an exception back, which the seal waits for', () => {
    const writer = proofDue()
    const decision = writer.sign(technician, 'voice-decision', spoken(writer, exception())).id
    writer.sign(technician, 'hand-back-closed', {})
    goOn(writer, 'settle', 'submitted')
    writer.sign(other, 'voice-denied', { decision, reason: 'Ines left the company' })
    expect(writer.state.points['C-1']!.exception).toBeNull()
    expect(sealGate(writer.state, [])).toEqual(['C-1: the exception was denied, and it is neither proven nor excepted anew'])
    writer.sign(supervisor, 'returned', { reason: 'prove C-1' })
    writer.sign(technician, 'point-proven', { tag: 'C-1' })
    expect(deniedFaults(writer.state)).toEqual([])
  })

  it('strikes the exception in the lines of the points, with who denied it and why', () => {
    const writer = proofDue()
    const decision = writer.sign(technician, 'voice-decision', spoken(writer, exception())).id
    const line = () => pointLines(writer.state, writer.entries).find(item => item.tag === 'C-1')!.exception!
    expect(line()).toMatchObject({ owner: 'Piet Harrow', reason: 'not called for tonight', voice: 'Ines Calloway', by: technician.name, denied: null })
    expect([exceptionWords(line(), 'UTC'), deniedWords(line())]).toEqual([expect.stringMatching(/^left by exception \(by voice, Ines Calloway\): not called for tonight; Piet Harrow until /), ''])
    writer.sign(other, 'voice-denied', { decision, reason: 'Ines was asleep' })
    expect(line().denied).toMatchObject({ by: 'Orla Finch', reason: 'Ines was asleep' })
    expect(deniedWords(line())).toBe('denied by Orla Finch: Ines was asleep. Ines Calloway did not leave it; it never stood')
    const entry = writer.entries.find(stored => stored.entry.id === decision)!.entry
    expect(told(writer.state, entry).seen).toContain('struck: denied by Orla Finch')
  })

  it('leaves alone what a supervisor signed meanwhile', () => {
    const writer = proofDue()
    const decision = writer.sign(technician, 'voice-decision', spoken(writer, exception())).id
    writer.sign(supervisor, 'left-in-exception', { points: [{ tag: 'C-1', owner: 'Mara Dunn', by: isoTime(BEGAN + 86_400_000), reason: 'parts' }] })
    writer.sign(supervisor, 'voice-denied', { decision, reason: 'another owner' })
    expect(writer.state.points['C-1']!.exception?.owner).toBe('Mara Dunn')
  })

  it('asks for the act again, unless the case was emptied since', () => {
    const told = (acted: boolean) => {
      const writer = storyTo('dark')
      Object.assign(writer.state.cases[DAIRY]!, { openAct: 7, openings: [{ seq: 7, at: writer.now, cause: 'act', deadline: null, closed: null }] })
      const decision = writer.sign(technician, 'voice-decision', spoken(writer, otherwise)).id
      expect(writer.state.cases[DAIRY]!.openAct).toBeNull()
      if (acted) writer.sign(technician, 'act-signed', { caseId: DAIRY, act: 'emptied', quantity: null, coolBy: null, left: false })
      writer.sign(supervisor, 'voice-denied', { decision, reason: 'never said' })
      expect(writer.state.cases[DAIRY]!.decidedOtherwise).toBeNull()
      return [writer.state.cases[DAIRY]!.openAct, deniedFaults(writer.state)]
    }
    expect(told(false)).toEqual([7, ['Dairy wall: the decision was denied, and no act is signed']])
    expect(told(true)).toEqual([null, []])
  })
})
