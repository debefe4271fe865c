/** Duties of the shop that a plan comes near. */
import type { Hazard } from '~~/shared/look/palette'
import { minuteWords } from '~~/shared/charts/words'
import type { Snapshot } from '~~/shared/record/snapshot'
import type { PlanMargin } from './margin'

export interface PlanNotice { id: string, hazard: Hazard, words: string }

/** Minutes without refrigeration at which authorities want to be told or a shop may have to shut: two hours and four. */
const TELL_MINUTES = [120, 240] as const
/** Near: within this of such a number. Our own estimate. */
const NEAR_MINUTES = 30

/**
 * Closure and the duty to tell the authority, where the work or the rulebook's clock comes near the usual
 * numbers. FDA Food Code 8-404.11 (ceasing operations); practice of Oklahoma (over 4 h) and of a district in
 * Georgia (2 h or more).
 */
export function planNotices(snapshot: Snapshot, { workMinutes, deadlineCase, deadlineMinutes }: PlanMargin): PlanNotice[] {
  const notices: PlanNotice[] = []
  const near = TELL_MINUTES.filter(minutes => workMinutes >= minutes - NEAR_MINUTES).at(-1)
  if (near !== undefined) notices.push({ id: 'tell', hazard: 'notice', words: `The work may keep control away for ${minuteWords(workMinutes)}. ${snapshot.rulebook.id.startsWith('us-') ? 'An interruption that endangers food may have to be told to the authority, and the shop shut until it agrees (FDA Food Code 8-404.11): some want to be told from 2 hours, some from 4. Ask yours beforehand.' : 'Ask the authority beforehand whether it must be told, and whether the shop may stay open.'}` })
  if (deadlineCase !== null && deadlineMinutes !== null && deadlineMinutes < NEAR_MINUTES) notices.push({ id: 'clock', hazard: 'notice', words: `If the cover failed too, ${deadlineCase.name} would come to the number of ${snapshot.rulebook.name} after ${minuteWords(deadlineCase.bareDeadline!)}, ${deadlineMinutes < 0 ? `${minuteWords(-deadlineMinutes)} before` : `only ${minuteWords(deadlineMinutes)} after`} the work is over. Settle beforehand who moves or discards product, who shuts the case, and who tells the authority.` })
  return notices
}
