/**
 * What a rule is given and what it answers. A rule never reads a clock: `now` is in the log.
 */
import type { TemperatureUnit } from '~~/shared/schemas/assess'
import type { HoldingLog, LogReading } from '../log'
import type { Stretch } from '../stretches'
import type { Authority, EffectiveClass, Verdict } from '../types'

export type GradedVerdict = Exclude<Verdict, 'unknown'>

/** Mildest first. */
const RANK: Record<GradedVerdict, number> = { within: 0, above: 1, act: 2, discard: 3 }

/** True when one verdict is worse than another. */
export function isWorse(verdict: GradedVerdict, than: GradedVerdict): boolean {
  return RANK[verdict] > RANK[than]
}

export interface Case {
  log: HoldingLog
  stretches: Stretch[]
  foodClass: EffectiveClass
  unit: TemperatureUnit
  first: LogReading
  last: LogReading
  lastAbove: boolean
  startedWarm: boolean
}

/** One verdict with what to do about it and why, in words. */
export interface Outcome {
  verdict: GradedVerdict
  act: string | null
  reason: string
  authority: Authority
}

export interface Finding {
  /** What the log as a whole gave and a later reading does not lift. */
  stays: Outcome | null
  /** What holds at this moment; it counts only while the last reading is above the limit. */
  now: Outcome | null
  /** What is to come, product staying at its last value; `minutes` is the whole time that the rule gives. */
  next: { verdict: GradedVerdict, at: number, minutes: number }[]
  /** Anything else that belongs among the reasons. */
  remarks: string[]
}

export const NOTHING_FOUND: Finding = { stays: null, now: null, next: [], remarks: [] }
