/** The one next thing to do about a case. */
import { measureOf } from './act-course'
import { limitWords, measureWords, siteClock } from './act-words'
import type { ActCause, Verdict } from './kinds/server'
import type { OutageState } from './state'

export interface Standing {
  /** what the rulebook says now; null before control was lost or before any reading */
  judged: { verdict: Verdict, act: string | null } | null
  /** why an act is open, or would be by the next entry; null where none is */
  cause: ActCause | null
  /** when it is to be read again, Unix ms; null where no round is asked for */
  dueAt: number | null
}

/** What is to be done, in words; `act`: something is to be signed beside readings. */
export interface ToDo { kind: 'nothing' | 'read' | 'act', words: string }

/** @param now Unix ms */
export function nextToDo(state: OutageState, caseId: string, { judged, cause, dueAt }: Standing, now: number): ToDo {
  const item = state.cases[caseId]
  if (!item || item.empty) return { kind: 'nothing', words: 'Nothing is left in it to judge.' }
  if (cause === 'discard') return { kind: 'act', words: 'Discard it, and sign product, quantity and who took it. Only a supervisor may decide otherwise.' }
  if (cause === 'act') return { kind: 'act', words: [judged?.act ?? 'Use, move or discard it now.', 'Then sign what was done.'].join(' ') }
  if (cause !== null) return proofToDo(state, caseId, now) ?? { kind: 'act', words: cause === 'hold-short' ? 'Lay ice, draw night covers, move the product or restore by hand now, and sign it: more rounds alone do not help.' : `${judged?.act ?? 'Cool it before the deadline.'} Sign what is done.` }
  if (judged?.act && judged.verdict !== 'within') return { kind: judged.verdict === 'unknown' ? 'read' : 'act', words: judged.act }
  if (dueAt === null) return { kind: 'nothing', words: 'Nothing for now.' }
  return { kind: 'read', words: dueAt <= now ? 'Read it now.' : `Read it again by ${siteClock(state, dueAt)}.` }
}

/** After a measure a reading is wanted; a promise that is past is said to be so. */
function proofToDo(state: OutageState, caseId: string, now: number): ToDo | null {
  const measure = measureOf(state, state.cases[caseId]!)
  if (!measure) return null
  const limit = limitWords(state, caseId)
  if (measure.coolBy === null) return { kind: 'read', words: `Read it: at or under ${limit} proves what was done (${measureWords(state, measure)}).` }
  if (measure.coolBy < now) return { kind: 'act', words: `It was to be cooled by ${siteClock(state, measure.coolBy)}, which is past: read it now, or sign what else is done.` }
  return { kind: 'read', words: `Read it by ${siteClock(state, measure.coolBy)}: at or under ${limit} proves that it is cooled.` }
}
