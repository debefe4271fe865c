/** How the verdict on one log went over time: what the engine would have said at each moment with the readings it had then. */
import type { AssessInput } from '~~/shared/schemas/assess'
import { assess } from './judge'
import type { Verdict } from './types'

/** A stretch of one verdict, Unix ms; the end is the beginning of the next. */
export interface CourseBand {
  verdict: Verdict
  from: number
  to: number
}

/**
 * The verdicts from the loss of control, or the first reading if that came before it, to `now`. Between two
 * readings a verdict only ever gets worse or unknown, so each change is found by halving, to the millisecond.
 * @param input as `parseAssessInput` leaves it
 * @throws RangeError as `assess`
 */
export function verdictCourse(input: AssessInput): CourseBand[] {
  const taken = input.readings.map(reading => Date.parse(reading.at))
  const now = Date.parse(input.now)
  const start = Math.min(Date.parse(input.darkAt), taken[0] ?? now)
  const instants = [...new Set([start, ...taken, now])].sort((a, b) => a - b)
  const at = (ms: number, until: number): Verdict => assess({
    ...input,
    darkAt: new Date(Math.min(Date.parse(input.darkAt), ms)).toISOString(),
    readings: input.readings.filter((_, index) => taken[index]! <= until),
    now: new Date(ms).toISOString(),
  }).verdict

  const bands: CourseBand[] = []
  const add = (verdict: Verdict, from: number, to: number) => {
    const last = bands.at(-1)
    if (last?.verdict === verdict) last.to = to
    else if (to > from) bands.push({ verdict, from, to })
  }
  for (let index = 0; index + 1 < instants.length; index++) {
    const from = instants[index]!
    const to = instants[index + 1]!
    const seen = (ms: number) => at(ms, from)
    const last = seen(to - 1)
    let begun = from
    let verdict = seen(from)
    while (verdict !== last && begun < to - 1) {
      const change = firstOther(seen, begun, to - 1, verdict)
      add(verdict, begun, change)
      begun = change
      verdict = seen(change)
    }
    add(verdict, begun, to)
  }
  const end = at(now, now)
  if (bands.at(-1)?.verdict !== end) bands.push({ verdict: end, from: now, to: now })
  return bands
}

/** The first millisecond in (from, to] at which the verdict is no longer the one at `from`; it is another at `to`. */
function firstOther(seen: (ms: number) => Verdict, from: number, to: number, verdict: Verdict): number {
  let low = from
  let high = to
  while (high - low > 1) {
    const middle = Math.floor((low + high) / 2)
    if (seen(middle) === verdict) low = middle
    else high = middle
  }
  return high
}
