import { acceptedWords } from './margin'
import type { AnyEntry } from './entry'
import type { Spoken } from './kinds/hands'
import { SPOKEN_VERSIONS } from './kinds/hands'
import { asNewest } from './newest'
import { caseName, nameOf } from './select'
import type { OutageState, VoiceState } from './state'

/** A supervisor signs what they decided by voice within so long of giving it, ms. */
export const VOICE_MS = 12 * 3_600_000

/** Decisions by voice that their supervisor has neither signed nor denied. */
export function openVoices(state: OutageState): VoiceState[] {
  return state.voices.filter(voice => voice.answer === null)
}

/** Until when a decision is to be signed, Unix ms. */
export function voiceDue(voice: VoiceState): number {
  return voice.givenAt + VOICE_MS
}

/** Decisions that nobody signed in time, and those that were signed late. @param now Unix ms */
export function voicesLate(state: OutageState, now: number): VoiceState[] {
  return state.voices.filter(voice => (voice.answer?.mark.at ?? now) > voiceDue(voice))
}

/** The decision as an entry of the kind that the supervisor would have signed; for rules and effects only. */
export function spokenEntry(entry: AnyEntry & { kind: 'voice-decision' }): AnyEntry {
  const { kind, body } = entry.body.decision
  return asNewest({ ...entry, v: SPOKEN_VERSIONS[kind], kind, body } as AnyEntry)
}

/** What was decided, in words. */
export function spokenWords(state: OutageState, decision: Spoken): string {
  switch (decision.kind) {
    case 'margin-accepted': return `accepts ${acceptedWords(decision.body)}`
    case 'left-in-exception': return `leaves by exception ${decision.body.points.map(left => left.tag).join(', ')}`
    case 'decided-otherwise': return `decides otherwise on ${caseName(state, decision.body.caseId)}`
  }
}

/**
 * What a denial left open: points that no exception covers any more, cases whose verdict waits again.
 * In words, for the gate of the seal.
 */
export function deniedFaults(state: OutageState): string[] {
  const denied = state.voices.filter(voice => voice.answer?.what === 'denied')
  const faults = denied.flatMap(({ decision }) => {
    if (decision.kind === 'left-in-exception') {
      return decision.body.points.map(left => state.points[left.tag]).filter(point => point !== undefined && point.exception === null && (point.status === 'hand' || point.status === 'returned' || point.tried !== null || point.questionedHand !== null)).map(point => `${point!.tag}: the exception was denied, and it is neither proven nor excepted anew`)
    }
    if (decision.kind === 'decided-otherwise' && state.cases[decision.body.caseId]?.openAct !== null) return [`${caseName(state, decision.body.caseId)}: the decision was denied, and no act is signed`]
    return []
  })
  return [...new Set(faults)]
}

/** Every decision by voice, in a line of words for whoever reviews the record. */
export function voiceLine(state: OutageState, voice: VoiceState, now: number): string {
  const answer = voice.answer === null
    ? now > voiceDue(voice) ? 'not signed, and the 12 hours are over' : 'not signed yet'
    : `${voice.answer.what === 'denied' ? `denied: ${voice.answer.words}` : `signed by ${nameOf(state, voice.answer.mark.by)}`}${voice.answer.mark.at > voiceDue(voice) ? ', after the 12 hours' : ''}`
  return `${voice.supervisorName} ${spokenWords(state, voice.decision)}, taken down by ${nameOf(state, voice.takenBy)}; ${answer}`
}
