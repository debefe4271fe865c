import type { PlanWindowInput } from '~~/shared/schemas/plan-window'
import { DAY, localClock, MINUTE, wallWords, type LocalClock } from './local-time'
import { avoidedBetween, defrostsBetween, type Defrost, type Stretch } from './schedule'

/** Defrost and drip are to be over this long before points go in hand, and stay off this long after. */
export const CLEAR_MINUTES = 30
/** As many starts as a person weighs up. */
export const MOST_STARTS = 5

export interface WindowStart {
  /** When points begin to go in hand, ISO 8601 UTC. */
  at: string
  /** No circuit is in defrost or drip from 30 minutes before until the end of dark. */
  clean: boolean
  because: string
}

export interface DefrostConflict {
  circuit: string
  /** Its start, ISO 8601 UTC. */
  at: string
  /** Latest start at which it and its drip end 30 minutes before points go in hand. */
  runBy: string
  /** 30 minutes after the end of its drip. */
  orStartAfter: string
}

export interface PlannedWindow {
  /** Best first. */
  starts: WindowStart[]
  /** Defrosts in the window that begins at `from`. */
  conflicts: DefrostConflict[]
}

interface Candidate {
  at: number
  /** Defrosts in its window. */
  count: number
  avoided: boolean
  /** End of the last defrost before it, cleared: the same for all starts of one clean stretch. */
  since: number
}

/**
 * When the work is best begun: starts at which no circuit is in defrost or drip and which the site
 * does not avoid. Common practice, no published source; the 30 minutes are our own estimate.
 * Minutes and ISO 8601 times; time zones by `Intl`.
 */
export function planWindow(input: PlanWindowInput): PlannedWindow {
  const clock = localClock(input.timeZone)
  const from = Date.parse(input.from)
  const last = from + input.days * DAY
  const reach = (input.leadMin + input.darkMin) * MINUTE
  const defrosts = defrostsBetween(input.circuits, clock, from - CLEAR_MINUTES * MINUTE, last + reach)
  const avoided = avoidedBetween(input.avoid, clock, from, last + reach)
  const weigh = weigher(defrosts, avoided, reach)

  const candidates: Candidate[] = []
  for (let step = 0; ; step += 1) {
    const at = from + step * input.stepMin * MINUTE
    if (at >= last) break
    candidates.push(weigh(at))
  }
  return {
    starts: bestOf(candidates).map(candidate => ({
      at: new Date(candidate.at).toISOString(),
      clean: candidate.count === 0,
      because: whyStart(candidate, defrosts, avoided, reach, clock),
    })),
    conflicts: defrosts.filter(defrost => isInWindow(defrost, from, reach)).map(defrost => conflictOf(defrost, from)),
  }
}

/** Touching is clean: the window and a defrost share a moment only when they overlap. */
function isInWindow({ start, end }: { start: number, end: number }, at: number, reach: number): boolean {
  return start < at + reach && end > at - CLEAR_MINUTES * MINUTE
}

function isAvoided({ start, end }: Stretch, at: number, reach: number): boolean {
  return end > at && (reach === 0 ? start <= at : start < at + reach)
}

function weigher(defrosts: readonly Defrost[], avoided: readonly Stretch[], reach: number): (at: number) => Candidate {
  const starts = Float64Array.from(defrosts, ({ start }) => start).sort()
  const ends = Float64Array.from(defrosts, ({ end }) => end).sort()
  const isAvoidedAt = avoider(avoided, reach)
  return (at) => {
    const over = countWhile(ends, end => end <= at - CLEAR_MINUTES * MINUTE)
    return {
      at,
      count: countWhile(starts, start => start < at + reach) - over,
      avoided: isAvoidedAt(at),
      since: over === 0 ? Number.NEGATIVE_INFINITY : ends[over - 1]!,
    }
  }
}

/** Whether any stretch touches the work begun at a moment: the latest end of those begun by then tells. */
function avoider(avoided: readonly Stretch[], reach: number): (at: number) => boolean {
  const sorted = [...avoided].sort((one, other) => one.start - other.start)
  const starts = Float64Array.from(sorted, ({ start }) => start)
  let latest = Number.NEGATIVE_INFINITY
  const latestEnd = Float64Array.from(sorted, ({ end }) => latest = Math.max(latest, end))
  return (at) => {
    const begun = countWhile(starts, start => reach === 0 ? start <= at : start < at + reach)
    return begun > 0 && latestEnd[begun - 1]! > at
  }
}

/** Clean and not avoided first, then clean, then fewest defrosts, then earliest; one start of each clean stretch. */
function bestOf(candidates: readonly Candidate[]): Candidate[] {
  const ranked = [...candidates].sort((one, other) =>
    one.count - other.count
    || (one.count === 0 ? Number(one.avoided) - Number(other.avoided) : 0)
    || one.at - other.at)
  const stretches = new Set<number>()
  const best: Candidate[] = []
  for (const candidate of ranked) {
    if (best.length === MOST_STARTS) break
    if (candidate.count === 0) {
      if (stretches.has(candidate.since)) continue
      stretches.add(candidate.since)
    }
    best.push(candidate)
  }
  return best
}

function whyStart({ at, count }: Candidate, defrosts: readonly Defrost[], avoided: readonly Stretch[], reach: number, clock: LocalClock): string {
  const words = (moment: number) => wallWords(clock.wallAt(moment))
  const span = `from ${words(at - CLEAR_MINUTES * MINUTE)} to ${words(at + reach)} local time`
  const reasons = [...new Set(avoided.filter(stretch => isAvoided(stretch, at, reach)).map(({ why }) => why))]
  const avoidance = reasons.length > 0 ? ` It lies in avoided hours: ${reasons.join(', ')}.` : ''
  if (count === 0) {
    return `No circuit is in defrost or drip ${span}.${avoidance || ' No avoided hours lie in it.'}`
  }
  const inWindow = defrosts.filter(defrost => isInWindow(defrost, at, reach))
  const named = inWindow.slice(0, 3).map(({ circuit, start }) => `circuit ${circuit} at ${words(start)}`)
  if (inWindow.length > named.length) named.push(`${inWindow.length - named.length} more`)
  return `${count === 1 ? 'One defrost lies' : `${count} defrosts lie`} in it ${span}: ${named.join(', ')}.${avoidance}`
}

function conflictOf({ circuit, start, end }: Defrost, from: number): DefrostConflict {
  const clear = CLEAR_MINUTES * MINUTE
  return {
    circuit,
    at: new Date(start).toISOString(),
    runBy: new Date(from - clear - (end - start)).toISOString(),
    orStartAfter: new Date(end + clear).toISOString(),
  }
}

/** How many of ascending values, from the first on, pass a test that none passes after one has failed. */
function countWhile(ascending: Float64Array, passes: (value: number) => boolean): number {
  let low = 0
  let high = ascending.length
  while (low < high) {
    const middle = (low + high) >>> 1
    if (passes(ascending[middle]!)) low = middle + 1
    else high = middle
  }
  return low
}
