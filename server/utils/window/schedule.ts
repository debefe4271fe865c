/** What lies in the way of a window: defrosts of the circuits, and stretches that the site avoids. */
import type { Avoid, WindowCircuit } from '~~/shared/schemas/plan-window'
import { DAY, midnightOf, MINUTE, minutesOfDay, weekdayOf, type LocalClock } from './local-time'

export interface Defrost {
  circuit: string
  /** Milliseconds since 1970 UTC. */
  start: number
  /** End of its drip, milliseconds since 1970 UTC. */
  end: number
}

export interface Stretch {
  start: number
  end: number
  why: string
}

/** Times of day of a circuit's defrosts, minutes after midnight, ascending. */
function timesOf({ defrosts }: WindowCircuit): number[] {
  const times = 'times' in defrosts
    ? defrosts.times.map(minutesOfDay)
    : Array.from({ length: 24 / defrosts.everyHours }, (_, index) =>
        (minutesOfDay(defrosts.offset) + index * defrosts.everyHours * 60) % 1440)
  return [...new Set(times)].sort((one, other) => one - other)
}

/**
 * Every defrost that lies, with its drip, at least partly between two moments, by start and then
 * circuit. Two that a change of the clocks brings to the same moment are one.
 */
export function defrostsBetween(circuits: readonly WindowCircuit[], clock: LocalClock, from: number, to: number): Defrost[] {
  const found = circuits.flatMap((circuit) => {
    const lasts = (circuit.durationMin + circuit.dripMin) * MINUTE
    const times = timesOf(circuit)
    const starts = new Set(localDays(clock, from - lasts, to).flatMap(day => times.map(time => clock.momentOf(day + time * MINUTE))))
    return [...starts]
      .filter(start => start < to && start + lasts > from)
      .map(start => ({ circuit: circuit.id, start, end: start + lasts }))
  })
  return found.sort((one, other) => one.start - other.start || (one.circuit < other.circuit ? -1 : one.circuit > other.circuit ? 1 : 0))
}

/** Every avoided stretch that may touch the time between two moments. One that ends at or before its start ends the next day. */
export function avoidedBetween(avoid: readonly Avoid[], clock: LocalClock, from: number, to: number): Stretch[] {
  return avoid.flatMap(({ days, start, end, why }) => {
    const begins = minutesOfDay(start)
    const ends = minutesOfDay(end) <= begins ? minutesOfDay(end) + 1440 : minutesOfDay(end)
    return localDays(clock, from - DAY, to)
      .filter(day => days.includes(weekdayOf(day)))
      .map(day => ({ start: clock.momentOf(day + begins * MINUTE), end: clock.momentOf(day + ends * MINUTE), why }))
  })
}

/** Midnights, as wall times, of all local days that touch the time between two moments, and one more on either side. */
function localDays(clock: LocalClock, from: number, to: number): number[] {
  const first = midnightOf(clock.wallAt(from)) - DAY
  const last = midnightOf(clock.wallAt(to)) + DAY
  return Array.from({ length: Math.round((last - first) / DAY) + 1 }, (_, index) => first + index * DAY)
}
