/**
 * The stretches of time that a log is made of, and how many minutes of each count.
 * Careful: between two readings both within, nothing counts; otherwise the whole interval counts, at the warmer
 * of its two ends. Linear: the same with the crossing interpolated.
 */
import type { HoldingLog } from './log'
import { isAtOrOver, isOver } from './units'

/** A stretch between two instants (ms) with the value at each end, degrees of the rulebook's unit. */
export interface Stretch {
  /** `before` a warm first reading, `between` two readings, `after` the last one. */
  place: 'before' | 'between' | 'after'
  from: number
  to: number
  start: number
  end: number
}

/** What counts: temperatures over a mark (or at it too), below the temperature of hot holding where there is one. */
export interface Counting {
  over: number
  counts: 'over' | 'at-or-over'
  hotFrom: number | null
}

/**
 * All stretches of a log in order. The one before the first reading runs from the earlier of it and the loss of
 * control, at the first value; the one after the last runs to now, at the last value.
 */
export function stretchesOf(log: HoldingLog): Stretch[] {
  const { readings, darkAt, now } = log
  const first = readings[0]
  const last = readings.at(-1)
  if (!first || !last) return []
  const stretches: Stretch[] = []
  if (darkAt < first.at)
    stretches.push({ place: 'before', from: darkAt, to: first.at, start: first.value, end: first.value })
  for (let index = 1; index < readings.length; index++) {
    const earlier = readings[index - 1]!
    const later = readings[index]!
    stretches.push({ place: 'between', from: earlier.at, to: later.at, start: earlier.value, end: later.value })
  }
  if (now > last.at)
    stretches.push({ place: 'after', from: last.at, to: now, start: last.value, end: last.value })
  return stretches
}

/** True when a temperature is one that the clock counts, hot holding left aside. */
export function isCounted(value: number, counting: Counting): boolean {
  return counting.counts === 'over' ? isOver(value, counting.over) : isAtOrOver(value, counting.over)
}

/** True when product is held hot. */
export function isHot(value: number, hotFrom: number | null): boolean {
  return hotFrom !== null && isAtOrOver(value, hotFrom)
}

/** True when the whole stretch counts by the careful clock; only both ends hot exempts it. */
export function countsWhole(stretch: Stretch, counting: Counting): boolean {
  if (!isCounted(stretch.start, counting) && !isCounted(stretch.end, counting)) return false
  return !(isHot(stretch.start, counting.hotFrom) && isHot(stretch.end, counting.hotFrom))
}

/** The careful duration of a stretch, ms. */
export function carefulMs(stretch: Stretch, counting: Counting): number {
  return countsWhole(stretch, counting) ? stretch.to - stretch.from : 0
}

/** The linear duration of a stretch, ms: the part of the straight line between its ends that lies where it counts. */
export function linearMs(stretch: Stretch, counting: Counting): number {
  const whole = carefulMs(stretch, counting)
  const low = Math.min(stretch.start, stretch.end)
  const high = Math.max(stretch.start, stretch.end)
  if (whole === 0 || low === high) return whole
  const floor = isCounted(low, counting) ? low : counting.over
  const ceiling = isHot(high, counting.hotFrom) ? counting.hotFrom! : high
  const part = (ceiling - floor) / (high - low)
  return whole * Math.min(1, Math.max(0, part))
}

/** Time without a reading after one within, ms: nothing until it is longer than the interval, then all of it. */
export function overdueMs(stretch: Stretch, counting: Counting, intervalMs: number): number {
  if (stretch.place === 'before') return 0
  if (isCounted(stretch.start, counting) || isCounted(stretch.end, counting)) return 0
  const length = stretch.to - stretch.from
  return length > intervalMs ? length : 0
}

/** The sum of a measure over stretches, ms. */
export function sumOver(stretches: Stretch[], measure: (stretch: Stretch) => number): number {
  return stretches.reduce((sum, stretch) => sum + measure(stretch), 0)
}
