import { reopenDecided } from './act-course'
import type { Spoken } from './kinds/hands'
import type { OutageState, VoiceState } from './state'

/** What stood before a decision by voice, so that a denial can put it back. */
export function beforeVoice(state: OutageState, decision: Spoken): VoiceState['before'] {
  const exceptions = decision.kind === 'left-in-exception' ? Object.fromEntries(decision.body.points.map(left => [left.tag, state.points[left.tag]?.exception ?? null])) : {}
  return { marginAccepted: state.marginAccepted, exceptions, decided: decision.kind === 'decided-otherwise' ? state.cases[decision.body.caseId]?.decidedOtherwise ?? null : null }
}

/** The supervisor's word on it: a denial puts the matter back, unless somebody decided it anew meanwhile. */
export function answerVoice(state: OutageState, decision: string, answer: NonNullable<VoiceState['answer']>): void {
  const voice = state.voices.find(item => item.entry === decision)
  if (!voice || voice.answer !== null) return
  voice.answer = answer
  if (answer.what === 'denied') undo(state, voice)
}

function undo(state: OutageState, voice: VoiceState): void {
  const { decision, before, entry } = voice
  if (decision.kind === 'margin-accepted') {
    if (state.marginAccepted?.mark.entry === entry) state.marginAccepted = before.marginAccepted
  } else if (decision.kind === 'left-in-exception') {
    for (const [tag, exception] of Object.entries(before.exceptions)) {
      const point = state.points[tag]
      if (point?.exception?.mark.entry === entry) point.exception = exception
    }
  } else {
    const item = state.cases[decision.body.caseId]
    if (!item || item.decidedOtherwise?.mark.entry !== entry) return
    item.decidedOtherwise = before.decided
    reopenDecided(item, entry)
  }
}
