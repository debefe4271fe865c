/** No case is due again sooner, unless its site's interval is shorter. */
export const SHORTEST_MINUTES = 5
const LONGEST_MINUTES = 30
const LONGEST_SLOW_MINUTES = 60

/** A case as its next round sees it. */
export interface RoundCase {
  /** Minutes of hold left, or null when its limit is never reached. */
  holdLeftMinutes: number | null
  /** No door between product and shop. */
  open: boolean
  /** A closed freezer or a walk-in. */
  slow: boolean
  /** The longest gap between rounds that the site allows for open cases, minutes. */
  intervalMinutes: number
}

/**
 * Minutes until the case is due again: a third of its hold left, between 5 and
 * 30 minutes (closed freezers and walk-ins up to 60), and for an open case
 * never longer than the site's interval. Common practice, no source.
 */
export function roundDueMinutes({ holdLeftMinutes, open, slow, intervalMinutes }: RoundCase): number {
  const longest = slow ? LONGEST_SLOW_MINUTES : LONGEST_MINUTES
  const third = holdLeftMinutes === null ? longest : holdLeftMinutes / 3
  const due = Math.min(longest, Math.max(SHORTEST_MINUTES, third))
  return open ? Math.min(due, intervalMinutes) : due
}
