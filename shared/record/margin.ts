import { minuteWords } from '../charts/words'
import type { Plan } from './plan'
import type { OutageState } from './state'

/** An acceptance holds until the number is so many minutes worse. */
export const WORSE_MINUTES = 10

/** The two numbers on which a plan's product stands, worked out by the engines. Minutes. */
export interface MarginFigure {
  /** shortest planned hold less the 19-in-20 time of the dark steps; null: no case comes to its limit */
  minutes: number | null
  /** name of the case that is the shortest */
  shortest: string
  /** earliest deadline with nothing running less the same time; null: none comes */
  deadlineMinutes: number | null
  /** name of the case whose deadline that is */
  deadlineOf: string
}

/** The numbers as an acceptance names them: whole minutes, cut so that they are never better than they are. */
export function namedMinutes(figure: MarginFigure): { minutes: number | null, deadlineMinutes: number | null } {
  const whole = (minutes: number | null) => minutes === null ? null : Math.floor(minutes)
  return { minutes: whole(figure.minutes), deadlineMinutes: whole(figure.deadlineMinutes) }
}

/** What is wrong with the numbers, in words; empty when nothing is. */
export function marginFaults({ minutes, shortest, deadlineMinutes, deadlineOf }: MarginFigure): string[] {
  const faults: string[] = []
  if (minutes !== null && minutes < 0) faults.push(`the margin is ${minuteWords(Math.floor(minutes))}: ${shortest} does not outlast the work`)
  if (deadlineMinutes !== null && deadlineMinutes < 0) faults.push(`with nothing running ${deadlineOf} is past its deadline ${minuteWords(Math.ceil(-deadlineMinutes))} before the work is over`)
  return faults
}

/** What stands in the way of asking for approval: numbers below nothing want measures first. */
export function measuresWanted(plan: Plan, figure: MarginFigure): string[] {
  return plan.measures.length > 0 ? [] : marginFaults(figure).map(fault => `${fault}. Choose measures`)
}

/** A supervisor's acceptance that still holds: neither number is ten minutes worse than the one that was accepted. */
export function isAccepted(state: OutageState, figure: MarginFigure): boolean {
  const given = state.marginAccepted
  if (given === null) return false
  const holds = (now: number | null, then: number | null) => now === null || now >= 0 || (then !== null && now > Math.min(then, 0) - WORSE_MINUTES)
  return holds(figure.minutes, given.minutes) && holds(figure.deadlineMinutes, given.deadlineMinutes)
}

/** What stands in the way of approving the plan, and of going dark: numbers below nothing that no acceptance covers. */
export function acceptanceWanted(state: OutageState, figure: MarginFigure): string[] {
  const faults = marginFaults(figure)
  if (faults.length === 0 || isAccepted(state, figure)) return []
  const given = state.marginAccepted
  const why = given === null
    ? 'A supervisor must accept it'
    : `A supervisor accepted ${acceptedWords(given)}; it is ${WORSE_MINUTES} minutes worse or more, and must be accepted anew`
  return faults.map(fault => `${fault}. ${why}`)
}

/** "a margin of −4 min", "a margin of −4 min and a deadline 12 min before the end of the work". */
export function acceptedWords({ minutes, deadlineMinutes }: { minutes: number | null, deadlineMinutes: number | null }): string {
  const margin = minutes === null ? '' : `a margin of ${minuteWords(minutes)}`
  const deadline = deadlineMinutes === null || deadlineMinutes >= 0 ? '' : `a deadline ${minuteWords(-deadlineMinutes)} before the end of the work`
  return [margin, deadline].filter(Boolean).join(' and ') || 'the plan as it stood'
}
