/**
 * Local time by the time zones that `Intl` knows. Moments are milliseconds since 1970 UTC;
 * a wall time is written as the moment that it would be in UTC.
 */
export const MINUTE = 60_000
export const DAY = 86_400_000

/** The moment of a wall time lies within this of it: no offset is beyond 15 hours. */
const REACH = 15 * 3_600_000

export interface LocalClock {
  /** Wall time at a moment. */
  wallAt(moment: number): number
  /** The moment of a wall time: the first of two; where the clock skips it, the first after the gap. */
  momentOf(wall: number): number
}

/** A clock of a time zone. Keeps what it has computed, so make one for each piece of work. */
export function localClock(timeZone: string): LocalClock {
  const format = new Intl.DateTimeFormat('en-US-u-ca-gregory-nu-latn', {
    timeZone, hourCycle: 'h23',
    year: 'numeric', month: 'numeric', day: 'numeric', hour: 'numeric', minute: 'numeric', second: 'numeric',
  })
  const offsets = new Map<number, number>()
  const moments = new Map<number, number>()

  const wallOf = (moment: number): number => {
    const parts: Record<string, string> = {}
    for (const { type, value } of format.formatToParts(moment)) parts[type] = value
    const wall = Date.UTC(Number(parts.year), Number(parts.month) - 1, Number(parts.day), Number(parts.hour), Number(parts.minute), Number(parts.second))
    return wall + ((moment % 1000) + 1000) % 1000
  }
  const offsetAt = (moment: number): number => {
    const known = offsets.get(moment)
    if (known !== undefined) return known
    const offset = wallOf(moment) - moment
    offsets.set(moment, offset)
    return offset
  }
  const find = (wall: number): number => {
    // Asked for whole days, so that a day's times share the answers.
    const before = offsetAt(midnightOf(wall) - REACH)
    const after = offsetAt(midnightOf(wall) + DAY + REACH)
    const first = wall - before
    if (before === after || offsetAt(first) === before) return first
    const second = wall - after
    if (offsetAt(second) === after) return second
    return changeBetween(second, first, before)
  }
  /** The first moment after `from`, up to `to`, at which the offset is no longer `before`. */
  const changeBetween = (from: number, to: number, before: number): number => {
    let low = from
    let high = to
    while (high - low > 1) {
      const middle = Math.floor((low + high) / 2)
      if (offsetAt(middle) === before) low = middle
      else high = middle
    }
    return high
  }
  return {
    wallAt: moment => moment + offsetAt(moment),
    momentOf(wall) {
      const known = moments.get(wall)
      if (known !== undefined) return known
      const moment = find(wall)
      moments.set(wall, moment)
      return moment
    },
  }
}

/** Midnight, as wall time, of the day in which the wall time lies. */
export function midnightOf(wall: number): number {
  return Math.floor(wall / DAY) * DAY
}

/** Day of the week of a wall time, 1 = Monday to 7 = Sunday. */
export function weekdayOf(wall: number): number {
  // 1 January 1970 was a Thursday.
  return ((Math.floor(wall / DAY) + 3) % 7 + 7) % 7 + 1
}

/** "HH:mm" in minutes after midnight. */
export function minutesOfDay(time: string): number {
  return Number(time.slice(0, 2)) * 60 + Number(time.slice(3))
}

const WEEKDAYS = ['Mon', 'Tue', 'Wed', 'Thu', 'Fri', 'Sat', 'Sun'] as const

/** "Tue 02:30" */
export function wallWords(wall: number): string {
  const minute = Math.floor((wall - midnightOf(wall)) / MINUTE)
  const two = (value: number) => String(value).padStart(2, '0')
  return `${WEEKDAYS[weekdayOf(wall) - 1]} ${two(Math.floor(minute / 60))}:${two(minute % 60)}`
}
