/** When a deadline is near enough for something to be done about it. */
import type { JudgedCase } from './for-outage'

const MINUTE = 60_000
/** The part of the rule's time that is the last of it. The default of this product; no source. */
export const LAST_PART = 1 / 3

/**
 * Whether the time left lies in the last part of the time that the rule gives: for four hours, the last 80 minutes.
 * False where there is no deadline. A deadline that is past is near.
 * @param now Unix ms @param part of the rule's time, 0 to 1
 */
export function isDeadlineNear({ deadline, ruleMinutes }: Pick<JudgedCase, 'deadline' | 'ruleMinutes'>, now: number, part = LAST_PART): boolean {
  if (deadline === null || ruleMinutes === null) return false
  return Date.parse(deadline) - now <= ruleMinutes * MINUTE * part
}
