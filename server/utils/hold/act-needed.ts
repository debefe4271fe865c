/** Whether a case of a real outage needs an act: the one that is open, or the one that the next entry will open. */
import { measureOf, openingOf } from '~~/shared/record/act-course'
import { SHORT_HOLD_MINUTES } from '~~/shared/record/act-words'
import type { ActCause } from '~~/shared/record/kinds/server'
import { openDark, productReadings } from '~~/shared/record/select'
import type { CaseState, OutageState } from '~~/shared/record/state'
import { assessCase } from '../holding/for-outage'
import type { JudgedCase } from '../holding/for-outage'
import { isDeadlineNear } from '../holding/near'
import { holdToLimit } from './for-outage'

const MINUTE = 60_000

export interface NeededAct {
  cause: ActCause
  /** when the verdict gets worse, or the limit is reached by the forecast; Unix ms */
  deadline: number | null
  /** it stands in the log already */
  entered: boolean
}

/**
 * The act that a case needs at a moment, or null. The phone shows by it what the server is yet to enter.
 * @param judged the case's assessment at that moment, where the caller has it
 * @param now Unix ms
 */
export function actNeeded(state: OutageState, caseId: string, now: number, judged = assessCase(state, caseId, now)): NeededAct | null {
  const item = state.cases[caseId]
  if (!item || item.empty) return null
  const opening = openingOf(item)
  const asked = judged ? askedByVerdict(item, judged) : null
  if (asked && (opening === null || (opening.cause !== asked && opening.cause !== 'discard'))) return { cause: asked, deadline: deadlineOf(judged), entered: false }
  if (opening) return { cause: opening.cause, deadline: opening.deadline, entered: true }
  if (judged?.verdict === 'above') return isNear(item, judged, now) ? { cause: 'deadline-near', deadline: deadlineOf(judged), entered: false } : null
  return judged?.verdict === 'act' || judged?.verdict === 'discard' ? null : shortHold(state, item, now)
}

const deadlineOf = (judged: JudgedCase | null) => judged?.deadline ? Date.parse(judged.deadline) : null

/** A verdict that asks for an act and is not in the log yet. */
function askedByVerdict(item: CaseState, { verdict }: JudgedCase): ActCause | null {
  return (verdict === 'act' || verdict === 'discard') && item.verdict?.verdict !== verdict ? verdict : null
}

/** Its deadline is near, and no act was opened under the same verdict before. */
function isNear(item: CaseState, judged: JudgedCase, now: number): boolean {
  const { verdict } = item
  const since = verdict?.verdict === 'above' ? verdict.seq : Infinity
  return isDeadlineNear(judged, now) && !item.openings.some(opening => opening.seq >= since) && !((item.decidedOtherwise?.mark.seq ?? 0) >= since)
}

/** Without control and with little hold left, unless something was done about it in the same time without control. */
function shortHold(state: OutageState, item: CaseState, now: number): NeededAct | null {
  const dark = openDark(state)
  const known = state.snapshot.cases.find(other => other.id === item.id)
  if (!dark || !known || productReadings(item).length === 0 || measureOf(state, item, now)) return null
  if (item.openings.some(opening => opening.seq > dark.mark.seq && opening.closed?.how !== 'hold')) return null
  const holdMinutes = holdToLimit(state, known, now)
  return holdMinutes !== 'held' && holdMinutes !== null && holdMinutes < SHORT_HOLD_MINUTES ? { cause: 'hold-short', deadline: Math.round(now + holdMinutes * MINUTE), entered: false } : null
}

/** A case that was short of hold must hold this long before it is no longer asked for, minutes: else it would come and go. */
export const LONG_AGAIN_MINUTES = 20

/**
 * How long a case holds whose act of a short hold is asked for no more, because a reading since shows it; minutes,
 * `forever` where its limit is never reached. Null while the act stands.
 * @param now Unix ms
 */
export function holdsAgain(state: OutageState, caseId: string, now: number): number | 'forever' | null {
  const item = state.cases[caseId]
  const opening = item && openingOf(item)
  const known = state.snapshot.cases.find(other => other.id === caseId)
  if (!item || !known || opening?.cause !== 'hold-short' || !openDark(state)) return null
  if (!productReadings(item).some(reading => reading.at > opening.at && reading.at <= now && !reading.questioned)) return null
  const holdMinutes = holdToLimit(state, known, now)
  if (holdMinutes === 'held' || holdMinutes === null) return 'forever'
  return holdMinutes >= LONG_AGAIN_MINUTES ? holdMinutes : null
}
