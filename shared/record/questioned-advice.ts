import { handWords } from '../schemas/point-kinds'
import type { EntryKind } from './kinds'
import { nameOf } from './select'
import type { OutageState, Questioned } from './state'

/** What a questioned entry counts for, how things stand now, and where the right entry is signed. */
export interface Advice { counts: string, now: string, todo: string, to: { path: string, words: string } | null }

const STATUS_WORDS = { auto: 'in auto', hand: 'in hand', excused: 'excused', returned: 'back in auto, proof due', proven: 'proven' } as const
const POINT_KINDS: readonly string[] = ['point-in-hand', 'point-in-auto', 'point-excused', 'point-proven'] satisfies EntryKind[]
const READING_KINDS: readonly string[] = ['reading-taken', 'pressure-read'] satisfies EntryKind[]
const HANDS_KINDS: readonly string[] = ['hands-offered', 'hands-taken', 'hands-withdrawn', 'hands-refused'] satisfies EntryKind[]
const VOICE_KINDS: readonly string[] = ['voice-decision', 'voice-confirmed', 'voice-denied'] satisfies EntryKind[]

/** Plain words for the page on which questioned entries are dealt with. Paths follow the outage's own. */
export function adviceOn(state: OutageState, item: Questioned): Advice {
  if (POINT_KINDS.includes(item.kind) && item.tag !== null) return pointAdvice(state, item, item.tag)
  if (READING_KINDS.includes(item.kind)) {
    return { counts: 'It is judged all the same, and can only make a verdict worse. It opens no gate.', now: '', todo: 'Read the case or rack again where it is in doubt, or correct the reading.', to: { path: item.kind === 'reading-taken' ? 'round' : 'pressures', words: 'Read again' } }
  }
  if (HANDS_KINDS.includes(item.kind)) {
    return { counts: 'Nothing changed hands by it.', now: state.holder ? `${nameOf(state, state.holder.person)} holds the outage.` : '', todo: 'See who holds it, and sign anew where it should pass on.', to: { path: 'hands', words: 'Who holds it' } }
  }
  if (VOICE_KINDS.includes(item.kind)) {
    return { counts: 'The decision has no effect.', now: '', todo: 'Where it still matters, ask the supervisor again and take it down anew.', to: { path: 'voice', words: 'Decisions by voice' } }
  }
  return { counts: 'It moved no phase, lowered no count and lifted no verdict.', now: '', todo: 'Look at what it says. Where it was right, sign it in its place; then say here what you found.', to: null }
}

function pointAdvice(state: OutageState, item: Questioned, tag: string): Advice {
  const point = state.points[tag]
  if (!point) return { counts: 'This outage has no such point.', now: '', todo: 'Find out which point was meant, and look whether it is in hand.', to: null }
  const claims = point.questionedHand === item.entry
  const held = point.status === 'hand' && point.hand !== null ? `, ${handWords(point.hand)}` : ''
  const by = point.mark ? `, as ${nameOf(state, point.mark.by)} signed in No. ${point.mark.seq}` : ''
  return {
    counts: item.kind !== 'point-in-hand' ? 'The point stands as it stood without it.' : claims ? `${tag} counts as in hand until somebody has looked and signed.` : `${tag} was signed again since, or was in hand already: nothing more hangs on it.`,
    now: `The record has ${tag} ${STATUS_WORDS[point.status]}${held}${by}.`,
    todo: `Go to ${tag} and look. If it is not as the record has it, sign it as you see it; then say here what you found.`,
    to: { path: `points/${encodeURIComponent(tag)}`, words: `Sign ${tag} as it is` },
  }
}
