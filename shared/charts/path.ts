import type { ChartReading, DrawnPoint } from './types'

/** Rounds to hundredths, so that the same drawing is the same bytes on every machine. */
export function hundredths(value: number): number {
  const rounded = Math.round(value * 100) / 100
  return rounded === 0 ? 0 : rounded
}

/** An SVG path through points; '' for fewer than two. */
export function polyline(points: readonly DrawnPoint[]): string {
  if (points.length < 2) return ''
  return points.map(({ x, y }, index) => `${index === 0 ? 'M' : 'L'}${hundredths(x)},${hundredths(y)}`).join('')
}

/** A closed SVG path of a diamond with the given half width around a point. */
export function diamond({ x, y }: DrawnPoint, half: number): string {
  const [left, right, top, bottom] = [x - half, x + half, y - half, y + half].map(hundredths)
  return `M${hundredths(x)},${top}L${right},${hundredths(y)}L${hundredths(x)},${bottom}L${left},${hundredths(y)}Z`
}

/** Readings in order of time; equal minutes keep their order. */
export function inOrder(readings: readonly ChartReading[]): ChartReading[] {
  return [...readings].sort((a, b) => a.minute - b.minute)
}

/** The reading on the straight line from `a` to `b` at a minute between them. */
export function between(a: ChartReading, b: ChartReading, minute: number): ChartReading {
  const share = b.minute === a.minute ? 1 : (minute - a.minute) / (b.minute - a.minute)
  return { minute, value: a.value + (b.value - a.value) * share }
}

/** The part of a line that lies in a span of minutes, with new ends where the line is cut. */
export function clipMinutes(readings: readonly ChartReading[], from: number, to: number): ChartReading[] {
  const sorted = inOrder(readings)
  const cut: ChartReading[] = []
  sorted.forEach((reading, index) => {
    const before = sorted[index - 1]
    if (before && before.minute < from && reading.minute > from) cut.push(between(before, reading, from))
    if (reading.minute >= from && reading.minute <= to) cut.push(reading)
    if (before && before.minute < to && reading.minute > to) cut.push(between(before, reading, to))
  })
  return cut
}

/** The forecast as it is drawn: joined to the last reading, and without what lies before it. */
export function joinForecast(readings: readonly ChartReading[], forecast: readonly ChartReading[]): ChartReading[] {
  const last = inOrder(readings).at(-1)
  const ahead = inOrder(forecast)
  return last ? [last, ...ahead.filter(reading => reading.minute > last.minute)] : ahead
}

/**
 * The first place where a line rises to a value from below, or null. A line that starts at or above it never meets it:
 * it is already there.
 */
export function firstMeeting(line: readonly ChartReading[], value: number): ChartReading | null {
  for (const [index, reading] of line.entries()) {
    const before = line[index - 1]
    if (!before || before.value >= value || reading.value < value) continue
    const share = (value - before.value) / (reading.value - before.value)
    return { minute: before.minute + (reading.minute - before.minute) * share, value }
  }
  return null
}
