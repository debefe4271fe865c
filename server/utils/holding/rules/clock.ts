import type { ClockRule, ClockStep } from '../types'
import { MINUTE } from '../log'
import { carefulMs, countsWhole, overdueMs, sumOver } from '../stretches'
import { minutesWords, temperatureWords } from '../words'
import type { Case, Finding, Outcome } from './finding'
import { isWorse } from './finding'

function isReached(step: ClockStep, ms: number): boolean {
  return step.reached === 'after' ? ms > step.minutes * MINUTE : ms >= step.minutes * MINUTE
}

function worstStep(steps: ClockStep[], ms: number): ClockStep | null {
  return steps
    .filter(step => isReached(step, ms))
    .reduce<ClockStep | null>((worst, step) => worst && !isWorse(step.verdict, worst.verdict) ? worst : step, null)
}

/** Judges a log by a sum of careful minutes over all its periods, the running one included. */
export function findByClock(rule: ClockRule<number>, of: Case): Finding {
  const { stretches, log, last, unit, foodClass } = of
  const counting = { over: rule.over, counts: rule.counts, hotFrom: foodClass.hotFrom }
  const overdue = rule.overdueCounts ? sumOver(stretches, stretch => overdueMs(stretch, counting, log.intervalMs)) : 0
  const sum = sumOver(stretches, stretch => carefulMs(stretch, counting)) + overdue
  const where = `${rule.counts === 'over' ? 'over' : 'at or over'} ${temperatureWords(rule.over, unit)}`
  const soFar = `${minutesWords(sum)} ${where}${overdue > 0 ? `, ${minutesWords(overdue)} of it overdue without a reading` : ''}`
  const step = worstStep(rule.steps, sum)
  const stays: Outcome | null = step && {
    verdict: step.verdict,
    act: step.act,
    reason: `${soFar}; ${step.reached === 'after' ? `more than ${step.minutes}` : `${step.minutes} or more`} means ${step.verdict}`,
    authority: rule.authority,
  }
  const running = countsWhole({ place: 'after', from: last.at, to: log.now, start: last.value, end: last.value }, counting)
  const next = running
    ? rule.steps
        .filter(later => !isReached(later, sum))
        .map(later => ({ verdict: later.verdict, at: log.now + later.minutes * MINUTE - sum, minutes: later.minutes }))
    : []
  const now: Outcome | null = running
    ? { verdict: 'above', act: rule.act, reason: `${soFar}; the clock runs`, authority: rule.authority }
    : null
  const remarks = running && !of.lastAbove && sum > 0 ? [`The clock ${where} runs: ${minutesWords(sum)} so far.`] : []
  return { stays, now, next, remarks }
}
