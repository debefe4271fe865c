import type { TimelineRound } from '~~/shared/charts/timeline'
import type { WatchOutage } from '~~/shared/schemas/watch'
import { worseAt } from '~/utils/watch-words'

const MINUTE = 60_000
/** A strip shows so much before and after the moment of control lost, minutes; twice as much, and again, where that is too short. */
const BEFORE = 30
const AFTER = 130
/** What lies nearer to the end than this is not well seen, minutes. */
const ROOM = 10

export interface StripOf {
  fromMinute: number
  toMinute: number
  nowMinute: number
  inHandMinute: number | null
  backMinute: number | null
  plannedMinute: number | null
  deadlineMinute: number | null
  rounds: TimelineRound[]
  /** what lies at minute 0 */
  origin: 'control lost' | 'now'
}

/** What the strip of an outage draws; minutes from the last loss of control, or from now while there was none. @param now Unix ms */
export function stripOf(row: WatchOutage, now: number): StripOf {
  const zero = row.dark?.from ?? now
  const minutes = (at: number | null) => at === null ? null : (at - zero) / MINUTE
  const nowMinute = minutes(now)!
  const deadlineMinute = minutes(worseAt(row)?.at ?? null)
  const plannedMinute = minutes(row.plannedEndAt)
  const dues = row.phase === 'dark' ? row.cases.map(item => item.dueAt).filter((at): at is number => at !== null) : []
  const next = dues.length === 0 ? [] : [{ minute: Math.max(nowMinute, minutes(Math.min(...dues))!), taken: false }]
  const scale = scaleFor(Math.max(nowMinute, plannedMinute ?? 0, row.phase === 'dark' ? Math.min(deadlineMinute ?? 0, nowMinute + 8 * 60) : 0))
  return {
    fromMinute: -BEFORE * scale, toMinute: AFTER * scale, nowMinute,
    inHandMinute: minutes(row.inHandAt), backMinute: minutes(row.dark?.to ?? null),
    plannedMinute, deadlineMinute,
    rounds: [...row.rounds.map(at => ({ minute: minutes(at)!, taken: true })), ...next],
    origin: row.dark ? 'control lost' : 'now',
  }
}

/** 1, 2, 4 …: the first that leaves room behind the last thing that is to be seen. */
function scaleFor(last: number): number {
  let scale = 1
  while (last > AFTER * scale - ROOM * scale) scale *= 2
  return scale
}
