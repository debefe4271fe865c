import { z } from 'zod'
import type { StepTimes } from './lessons'
import { dayOrder, isOrdered, recordFilterFields } from './record-filter'

/** One step of the work: the minutes that it took, and what its plan said. */
export interface StepFact { step: string, name: string, back: boolean, minutes: number, planned: StepTimes }

/** How long a case held from the loss of control to its limit, by its readings. */
export interface HoldFact {
  caseId: string
  name: string
  /** minutes, the likely ones; null: its readings never lead to its limit */
  minutes: number | null
  /** what the plan's time constant made of the same start, minutes; null: never */
  reckoned: number | null
  readings: number
}

export interface PointFact { tag: string, name: string, reason: string }

export interface DiscardFact {
  caseId: string
  name: string
  product: string
  quantity: number | null
  unit: string
  /** why an act was open, in words; with the rule's clause where a verdict asked for it */
  cause: string
  /** Unix ms */
  at: number
  seq: number
}

/** What one finished outage adds to the insights. Minutes unless said otherwise. */
export interface OutageFacts {
  work: { kindId: string | null, name: string, planned: boolean, likely: number | null, within: number | null, took: number }
  steps: StepFact[]
  holds: HoldFact[]
  /** tags of all points of the plan and of those touched beside it */
  touched: string[]
  excused: PointFact[]
  notProven: PointFact[]
  /** rounds without control; late: one with a reading that came late; worst: the latest by, minutes */
  rounds: { taken: number, late: number, worst: number }
  discards: DiscardFact[]
}

/** An outage as a number of the insights leads to it. */
export interface OutageMark { id: string, code: string }

/** A finished outage whose facts are counted. */
export interface CountedOutage extends OutageMark {
  site: { id: string, name: string }
  controller: { id: string, name: string }
  sealed: boolean
  facts: OutageFacts
}

/** A figure and the outage that gave it. */
export interface Peak extends OutageMark { minutes: number }

/** A step of a kind of work over several outages; minutes. */
export interface StepInsight {
  step: string
  name: string
  back: boolean
  /** each outage in which it was begun and done */
  took: Peak[]
  median: number
  /** times that it took longer than the longest, or less than the shortest, that its own plan said */
  over: number
  under: number
  /** as the newest of these plans had it */
  planned: StepTimes
}

export interface WorkInsight {
  /** in the list of kinds; null: none of these plans was made of one */
  kindId: string | null
  name: string
  outages: number
  /** planned ones among them: only they have times to compare with */
  planned: number
  /** time without control: the median of what it took, and of what the plans called likely and 19 times in 20 */
  took: number
  likely: number | null
  within: number | null
  /** planned outages that were without control for longer than 19 times in 20 */
  over: number
  /** the one that went furthest over that time, by so many minutes; null: none did */
  worst: Peak | null
  steps: StepInsight[]
}

export interface HoldInsight {
  caseId: string
  name: string
  site: { id: string, name: string }
  outages: number
  /** null where no outage led to its limit */
  shortest: Peak | null
  longest: Peak | null
  /** outages whose readings never led to its limit */
  never: number
  /** what the plan reckoned in the outage that gave the shortest; minutes, null: never */
  reckoned: number | null
}

export interface PointInsight {
  tag: string
  name: string
  site: { id: string, name: string }
  controller: { id: string, name: string }
  /** outages whose plan had it, or that touched it */
  outages: number
  excused: number
  notProven: number
  /** why, the newest first, each once */
  reasons: string[]
}

export interface LateInsight {
  site: { id: string, name: string }
  outages: number
  rounds: number
  late: number
  /** rounds late in a hundred; null where none was taken */
  share: number | null
  worst: Peak | null
}

export interface DiscardInsight extends DiscardFact { outage: OutageMark, site: { id: string, name: string } }

export interface Insights {
  outages: number
  work: WorkInsight[]
  holds: HoldInsight[]
  points: PointInsight[]
  late: LateInsight[]
  discards: DiscardInsight[]
}

/** The tables of the insights, each of which can be taken away as CSV. */
export const INSIGHT_TABLES = ['work', 'steps', 'holds', 'points', 'rounds', 'discards'] as const
export type InsightTable = (typeof INSIGHT_TABLES)[number]

/** What the outages of a choice would make of a step's times; nothing changes until somebody accepts it. */
export interface StepOffer { step: string, name: string, was: StepTimes, proposed: StepTimes, outages: OutageMark[] }

/** Which outages count: of a site, opened on or after a day of the site and no later than another; fields of a search for records. */
export const insightQuerySchema = z.object({ site: recordFilterFields.site, from: recordFilterFields.from, to: recordFilterFields.to }).refine(isOrdered, dayOrder)
export type InsightQuery = z.output<typeof insightQuerySchema>

/** So many outages are counted at once, the newest; a longer choice says so. */
export const INSIGHT_OUTAGES_MAX = 1000

/** Insights of a choice as the page gets them. */
export interface InsightAnswer extends Insights {
  /** there are older outages in the choice that are not counted */
  more: boolean
  /** outages of the choice whose facts are still being made */
  uncounted: number
  /** corrections that the sealed outages of the choice offer, by kind of work */
  offers: Record<string, StepOffer[]>
}

const minutes = z.number().min(0).max(1_000_000)
const timesSchema = z.object({ shortest: minutes, likely: minutes, longest: minutes }).strict()

/** Corrections that somebody accepts: what was shown of each step, and the outages that it came from. */
export const timesAcceptedSchema = z.object({
  workKindId: z.string().uuid(),
  steps: z.array(z.object({ step: z.string().min(1).max(40), proposed: timesSchema, outages: z.array(z.string().uuid()).min(1).max(INSIGHT_OUTAGES_MAX) }).strict()).min(1, 'Choose at least one step').max(80),
}).strict()
export type TimesAccepted = z.output<typeof timesAcceptedSchema>
