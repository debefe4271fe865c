/** Makes a log to be judged out of what somebody typed: times of day or whole dates, in the order in which they stand. */
import type { TypedReading } from './readings'
import { typedNumber, typedTime } from './readings'

const DAY = 24 * 3_600_000
/** The day that times of day are laid on; it is never shown. */
export const NOMINAL_DAY = Date.UTC(2026, 0, 5)

export interface SettledReading { at: number, value: number, method: TypedReading['method'] }
export interface TrialFault { row: number | 'dark' | 'now', field: 'time' | 'value', reason: string }
export interface SettledTrial {
  readings: SettledReading[]
  darkAt: number | null
  now: number | null
  /** true: only times of day were typed, so no date is to be shown */
  clockOnly: boolean
  faults: TrialFault[]
}

/**
 * Times as instants, Unix ms. Times of day go forward: one earlier than the line before lies on the next day.
 * @param dark when control was lost; empty: at the first reading. Of a time of day, the one nearest to the first reading
 * @param now when it is judged; empty: at the last reading. Of a time of day, the first at or after the last reading
 */
export function settleTrial(rows: readonly TypedReading[], dark: string, now: string): SettledTrial {
  const faults: TrialFault[] = []
  const clockOnly = rows.every(row => !/^\s*\d{4}-/.test(row.time)) && !/^\s*\d{4}-/.test(dark) && !/^\s*\d{4}-/.test(now)
  const readings: SettledReading[] = []
  let last: number | null = null
  rows.forEach((row, index) => {
    const value = typedNumber(row.value)
    if (value === null) faults.push({ row: index, field: 'value', reason: row.value.trim() === '' ? 'Enter a temperature' : `${row.value.trim()} is not a number` })
    const at = settle(row.time, clockOnly, clock => last === null ? NOMINAL_DAY + clock : onOrAfter(clock, last), reason => faults.push({ row: index, field: 'time', reason }))
    if (at === null) return
    if (last !== null && at === last) faults.push({ row: index, field: 'time', reason: 'Two readings have this time' })
    else if (last !== null && at < last) faults.push({ row: index, field: 'time', reason: 'This is earlier than the reading before it' })
    else if (value !== null) readings.push({ at, value, method: row.method })
    last = at
  })
  const first = readings[0]?.at ?? null
  const end = readings.at(-1)?.at ?? null
  const darkAt = dark.trim() === '' ? first : settle(dark, clockOnly, clock => nearest(clock, first ?? NOMINAL_DAY), reason => faults.push({ row: 'dark', field: 'time', reason }))
  const latest = Math.max(end ?? -Infinity, darkAt ?? -Infinity)
  const judgedAt = now.trim() === ''
    ? Number.isFinite(latest) ? latest : null
    : settle(now, clockOnly, clock => onOrAfter(clock, Number.isFinite(latest) ? latest : NOMINAL_DAY), reason => faults.push({ row: 'now', field: 'time', reason }))
  if (judgedAt !== null && judgedAt < latest) faults.push({ row: 'now', field: 'time', reason: end !== null && judgedAt < end ? 'This is before the last reading' : 'This is before control was lost' })
  return { readings, darkAt, now: judgedAt, clockOnly, faults }
}

function settle(text: string, clockOnly: boolean, place: (clock: number) => number, fault: (reason: string) => void): number | null {
  const time = typedTime(text)
  if (time === null) {
    fault(text.trim() === '' ? 'Enter a time' : `${text.trim()} is not a time; write it as 14:05 or 2026-03-03T14:05Z`)
    return null
  }
  if ('instant' in time) return time.instant
  if (clockOnly) return place(time.clock)
  fault('Write every time with its date, or none')
  return null
}

/** The first moment with this time of day that is not before another. */
function onOrAfter(clock: number, other: number): number {
  const sameDay = Math.floor(other / DAY) * DAY + clock
  return sameDay >= other ? sameDay : sameDay + DAY
}

/** The moment with this time of day that lies nearest to another. */
function nearest(clock: number, other: number): number {
  const sameDay = Math.floor(other / DAY) * DAY + clock
  return [sameDay - DAY, sameDay, sameDay + DAY].reduce((best, at) => Math.abs(at - other) < Math.abs(best - other) ? at : best)
}

/** A moment of a trial in words: '14:05', '00:10 next day', '00:10 on day 3'; with dates '2026-03-03 14:05 UTC'. */
export function trialTimeWords(ms: number, clockOnly: boolean): string {
  const second = Math.round(ms / 1000) * 1000 // a change of verdict comes a millisecond after the time that is meant
  const iso = new Date(second).toISOString()
  const clock = iso.slice(11, second % 60_000 === 0 ? 16 : 19)
  if (!clockOnly) return `${iso.slice(0, 10)} ${clock} UTC`
  const day = Math.floor((second - NOMINAL_DAY) / DAY)
  if (day === 0) return clock
  if (day === -1) return `${clock} the day before`
  return day === 1 ? `${clock} next day` : `${clock} on day ${day + 1}`
}

/** The engine's reasons with their instants as the trial writes times. */
export function inTrialTimes(words: string, clockOnly: boolean): string {
  if (!clockOnly) return words
  return words.replace(/(\d{4}-\d{2}-\d{2}) (\d{2}:\d{2}(?::\d{2})?) UTC/g, (_, date: string, clock: string) => trialTimeWords(Date.parse(`${date}T${clock.padEnd(8, ':00')}Z`), true))
}
