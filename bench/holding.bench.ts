// What judging a log costs beside a bare loop that only sums the intervals above a constant, in the same run.
import { assess } from '~~/server/utils/holding'
import type { AssessInput } from '~~/shared/schemas/assess'
import { microseconds } from './measure'

const MINUTE = 60_000
const DARK_AT = Date.UTC(2026, 2, 1, 2)
const CASES = 60
const LIMIT = 41

/** A case that warms from 38 °F past its limit and is cooled again, read every ten minutes. */
function logOf(place: number, readings: number): AssessInput {
  const at = (index: number) => new Date(DARK_AT + index * 10 * MINUTE + place * 1_000).toISOString()
  return {
    rulebook: 'us-food-code-2022', foodClass: 'tcs', unit: 'F', darkAt: new Date(DARK_AT).toISOString(), intervalMinutes: 10, now: at(readings),
    readings: Array.from({ length: readings }, (_, index) => ({ at: at(index), value: 38 + place / 30 + 5 * Math.sin(index / 5), method: 'product' as const })),
  }
}

/** No rule, no reason, no deadline: minutes of the intervals with an end over the limit. */
function sumAbove({ readings }: AssessInput): number {
  let sum = 0
  for (let index = 1; index < readings.length; index += 1) {
    const [before, after] = [readings[index - 1]!, readings[index]!]
    if (Math.max(before.value, after.value) > LIMIT) sum += Date.parse(after.at) - Date.parse(before.at)
  }
  return sum / MINUTE
}

/** Per second, and the ratio to the bare loop over the same logs. */
function measure(logs: AssessInput[], calls: number) {
  const judged = microseconds(() => logs.map(log => assess(log)), calls)
  const bare = microseconds(() => logs.map(sumAbove), calls * 4)
  return {
    assessmentsPerSecond: Math.round(logs.length * 1e6 / judged),
    microseconds: Number(judged.toFixed(1)),
    baselineMicroseconds: Number(bare.toFixed(1)),
    ratio: Number((judged / bare).toFixed(2)),
  }
}

const one = measure([logOf(1, 50)], 400)
// Ten rounds in: what every round of a large shop asks of the engine.
const round = measure(Array.from({ length: CASES }, (_, place) => logOf(place, 10)), 20)

process.stdout.write(`${JSON.stringify({
  name: 'judging logs by a rulebook',
  ratio: one.ratio,
  baseline: 'a bare loop over the same log that sums intervals above a constant',
  logOf50Readings: one,
  roundOf60Cases: round,
})}\n`)
