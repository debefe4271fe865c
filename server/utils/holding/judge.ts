/**
 * The holding engine: one log judged by one row of a rulebook. Pure; the moment of judging is passed in.
 */
import type { AssessInput } from '~~/shared/schemas/assess'
import { MINUTE, readLog } from './log'
import type { HoldingLog } from './log'
import { effectiveClass } from './resolve'
import { classById, rulebookById } from './rulebooks'
import { findByChart } from './rules/chart'
import { findByClock } from './rules/clock'
import type { Case, Finding, GradedVerdict, Outcome } from './rules/finding'
import { isWorse } from './rules/finding'
import { findByMark } from './rules/mark'
import { findByRises } from './rules/rises'
import { findByStart } from './rules/started-warm'
import { carefulMs, linearMs, stretchesOf, sumOver } from './stretches'
import type { Counting } from './stretches'
import type { Assessment, EffectiveClass, Rule, Rulebook } from './types'
import { isOver } from './units'
import { temperatureKind, temperatureWords } from './words'
import { reasonsFor } from './reasons'

const actOnUnknown = (foodClass: EffectiveClass) => `Take ${temperatureKind(foodClass)} now: the last one is older than the interval.`
const actWithoutReading = (foodClass: EffectiveClass) => `Take ${temperatureKind(foodClass)} now: there is none to judge by.`

function findBy(rule: Rule<number>, of: Case): Finding {
  switch (rule.kind) {
    case 'clock': return findByClock(rule, of)
    case 'mark': return findByMark(rule, of)
    case 'rises': return findByRises(rule, of)
    case 'chart': return findByChart(rule, of)
    case 'started-warm': return findByStart(rule, of)
  }
}

/** What the within figure itself says of the last reading. */
function findByLimit({ foodClass, unit, last, lastAbove }: Case): Outcome {
  const limit = temperatureWords(foodClass.limit, unit)
  return {
    verdict: lastAbove ? 'above' : 'within',
    act: lastAbove ? `Bring it to ${limit} or below.` : null,
    reason: `last seen at ${temperatureWords(last.value, unit)}, the limit being ${limit}`,
    authority: foodClass.within,
  }
}

/** The worst outcome; of equals the earliest, and any rule before the bare limit. */
function worstOf(outcomes: Outcome[], otherwise: Outcome): Outcome {
  const worst = outcomes.reduce<Outcome | null>((so, outcome) => so && !isWorse(outcome.verdict, so.verdict) ? so : outcome, null)
  return worst && !isWorse(otherwise.verdict, worst.verdict) ? worst : otherwise
}

/** The first instant at which something worse than the verdict is to come; null when the last reading is within. */
function comingWorse(findings: Finding[], verdict: GradedVerdict, lastAbove: boolean): Finding['next'][number] | null {
  if (!lastAbove) return null
  const coming = findings.flatMap(({ next }) => next).filter(each => isWorse(each.verdict, verdict))
  return coming.reduce<Finding['next'][number] | null>((first, each) => first && first.at <= each.at ? first : each, null)
}

/** The case that a log makes under a class; null when no reading is of the kind that the class is judged by. */
function caseOf(log: HoldingLog, foodClass: EffectiveClass, rulebook: Rulebook): Case | null {
  const first = log.readings[0]
  const last = log.readings.at(-1)
  if (!first || !last) return null
  return {
    log,
    stretches: stretchesOf(log),
    foodClass,
    unit: rulebook.unit,
    first,
    last,
    lastAbove: isOver(last.value, foodClass.limit),
    startedWarm: isOver(first.value, foodClass.limit),
  }
}

/** The clock that `minutesAbove` reports: over the within figure. */
function limitCounting(foodClass: EffectiveClass): Counting {
  return { over: foodClass.limit, counts: 'over', hotFrom: foodClass.hotFrom }
}

/** A log with no judged reading: nothing is known of the product. */
function assessNothing(log: HoldingLog, foodClass: EffectiveClass, rulebook: Rulebook): Assessment {
  return {
    verdict: 'unknown',
    deadline: null,
    limit: { value: foodClass.limit, unit: rulebook.unit },
    minutesAbove: { careful: 0, linear: 0 },
    startedWarm: false,
    tooCold: log.tooCold,
    suspect: log.suspect,
    clause: foodClass.within.clause,
    source: foodClass.within.source,
    act: actWithoutReading(foodClass),
    why: [`No reading of ${foodClass.judgedBy} temperature was given, and no other kind clears or condemns product.`],
  }
}

/** An assessment, with the whole time of the rule that sets its deadline, minutes; null where there is no deadline. */
export interface TimedAssessment {
  assessment: Assessment
  ruleMinutes: number | null
}

/**
 * Judges a log. The input is taken as `parseAssessInput` leaves it; temperatures in its own unit, times in ISO 8601.
 * @throws RangeError when the rulebook, its version or its class does not exist
 */
export function assess(input: AssessInput): Assessment {
  return assessTimed(input).assessment
}

/** The same, with the time that the deadline is counted against. */
export function assessTimed(input: AssessInput): TimedAssessment {
  const rulebook = rulebookById(input.rulebook, input.version)
  const plainClass = rulebook && classById(rulebook, input.foodClass)
  if (!rulebook || !plainClass) throw new RangeError(`No rulebook ${input.rulebook} with a class ${input.foodClass}`)
  const foodClass = effectiveClass(plainClass, input.site)
  const log = readLog(input, foodClass, rulebook.unit)
  const of = caseOf(log, foodClass, rulebook)
  if (!of) return { assessment: assessNothing(log, foodClass, rulebook), ruleMinutes: null }

  const findings = foodClass.rules.map(rule => findBy(rule, of))
  const stays = findings.flatMap(finding => finding.stays ?? [])
  const holding = of.lastAbove ? findings.flatMap(finding => finding.now ?? []) : []
  const outcome = worstOf([...stays, ...holding], findByLimit(of))
  const isStale = !of.lastAbove && log.now - of.last.at > log.intervalMs
  const isUnknown = outcome.verdict === 'within' && isStale
  const counting = limitCounting(foodClass)
  const coming = comingWorse(findings, outcome.verdict, of.lastAbove)

  const assessment: Assessment = {
    verdict: isUnknown ? 'unknown' : outcome.verdict,
    deadline: coming && new Date(coming.at).toISOString(),
    limit: { value: foodClass.limit, unit: rulebook.unit },
    minutesAbove: {
      careful: sumOver(of.stretches, stretch => carefulMs(stretch, counting)) / MINUTE,
      linear: sumOver(of.stretches, stretch => linearMs(stretch, counting)) / MINUTE,
    },
    startedWarm: of.startedWarm,
    tooCold: log.tooCold,
    suspect: log.suspect,
    clause: outcome.authority.clause,
    source: outcome.authority.source,
    act: isUnknown ? actOnUnknown(foodClass) : outcome.act,
    why: reasonsFor(of, outcome, counting, isUnknown, findings.flatMap(({ remarks }) => remarks)),
  }
  return { assessment, ruleMinutes: coming?.minutes ?? null }
}
