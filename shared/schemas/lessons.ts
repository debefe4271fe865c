import { z } from 'zod'

/** A time constant is taken from at least this many readings. Our own estimate. */
export const LESSON_READINGS_MIN = 3

/** What the readings of a sealed outage say of one case. */
export interface CaseLesson {
  caseId: string
  name: string
  /** fitted, hours; null where there is nothing to offer */
  tauHours: number | null
  readings: number
  /** model less reading, K */
  rmseK: number
  /** what the plan reckoned with, hours, and where that came from */
  was: { tauHours: number, words: string }
  /** why it is not offered; null: it is */
  not: string | null
  /** what speaks against it, for who decides; null: nothing */
  caution: string | null
  accepted: { by: string, at: string } | null
}

export interface StepTimes { shortest: number, likely: number, longest: number }

/** How long a step of the work took, beside what its kind of work says. Minutes. */
export interface StepLesson {
  step: string
  name: string
  minutes: number
  was: StepTimes
  proposed: StepTimes
  not: string | null
  accepted: { by: string, at: string } | null
}

export interface Lessons {
  workKind: { id: string | null, name: string }
  cases: CaseLesson[]
  steps: StepLesson[]
}

/** Which lessons are accepted: ids of cases, ids of steps. */
export const lessonsAcceptedSchema = z.object({
  cases: z.array(z.string().uuid()).max(400),
  steps: z.array(z.string().min(1).max(40)).max(40),
}).refine(({ cases, steps }) => cases.length + steps.length > 0, { path: ['cases'], message: 'Choose at least one' })
export type LessonsAccepted = z.output<typeof lessonsAcceptedSchema>

/** Where a case's time constant comes from, in words. @param outages whose readings it is the mean of; 0: entered by hand */
export function tauOrigin(isOwn: boolean, outages: number): string {
  if (!isOwn) return 'estimate'
  return outages === 0 ? 'entered by hand' : `from ${outages === 1 ? '1 outage' : `${outages} outages`}`
}
