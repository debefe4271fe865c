/**
 * The reasons that go with a verdict, in words: the rule and its clause, the intervals that counted, and
 * whatever else a reader should know before relying on it.
 */
import type { TemperatureUnit } from '~~/shared/schemas/assess'
import type { Case, Outcome } from './rules/finding'
import { carefulMs } from './stretches'
import type { Counting } from './stretches'
import { instantWords, MARK_WORDS, minutesWords, temperatureKind, temperatureWords } from './words'

/** How many periods are listed one by one before the rest is only counted. */
const MOST_PERIODS = 20

interface Period {
  from: number
  to: number
  warmest: number
}

/** Counted stretches that touch, joined. */
function countedPeriods({ stretches }: Case, counting: Counting): Period[] {
  const periods: Period[] = []
  for (const stretch of stretches) {
    if (carefulMs(stretch, counting) === 0) continue
    const open = periods.at(-1)
    const warmest = Math.max(stretch.start, stretch.end)
    if (open && open.to === stretch.from) {
      open.to = stretch.to
      open.warmest = Math.max(open.warmest, warmest)
    } else {
      periods.push({ from: stretch.from, to: stretch.to, warmest })
    }
  }
  return periods
}

function periodWords({ from, to, warmest }: Period, unit: TemperatureUnit): string {
  return `Counted: ${instantWords(from)} to ${instantWords(to)}, ${minutesWords(to - from)}, at up to ${temperatureWords(warmest, unit)}.`
}

function countedWords(of: Case, counting: Counting): string[] {
  const periods = countedPeriods(of, counting)
  if (periods.length === 0) return [`No minutes counted over ${temperatureWords(counting.over, of.unit)}.`]
  const listed = periods.slice(0, MOST_PERIODS).map(period => periodWords(period, of.unit))
  const rest = periods.slice(MOST_PERIODS)
  if (rest.length === 0) return listed
  const restMs = rest.reduce((sum, { from, to }) => sum + to - from, 0)
  return [...listed, `Counted as well: ${rest.length} further periods, ${minutesWords(restMs)} together.`]
}

/** The reasons for an outcome, the decisive one first. */
export function reasonsFor(of: Case, outcome: Outcome, counting: Counting, isUnknown: boolean, remarks: string[]): string[] {
  const { clause, source, mark } = outcome.authority
  const reasons = [
    `${outcome.reason[0]!.toUpperCase()}${outcome.reason.slice(1)}.`,
    `${clause}; ${source}${source === MARK_WORDS[mark] ? '' : ` (${MARK_WORDS[mark]})`}.`,
    ...countedWords(of, counting),
    ...remarks,
  ]
  if (isUnknown)
    reasons.push(`Last seen within the limit at ${instantWords(of.last.at)}, longer ago than the interval of ${minutesWords(of.log.intervalMs)}.`)
  if (of.startedWarm)
    reasons.push(`The first reading was already above the limit, so the clock starts at ${instantWords(Math.min(of.first.at, of.log.darkAt))}; a written time-control plan may not be invoked.`)
  if (of.log.tooCold)
    reasons.push(`A reading was below ${temperatureWords(of.foodClass.lowMark!, of.unit)}: product may be freezing.`)
  if (of.log.suspect)
    reasons.push(`A reading of another kind was above the limit: take ${temperatureKind(of.foodClass)}.`)
  return [...reasons, ...of.foodClass.notes]
}
