/**
 * The shapes of a rulebook and of a verdict. Rulebooks are data: every rule that the engine knows is one
 * kind here, and a kind that the engine does not handle is a compile error.
 * Temperatures are in the rulebook's own unit, durations in minutes, instants in ISO 8601 UTC.
 */
import type { TemperatureUnit } from '~~/shared/schemas/assess'

/** Mildest first; `unknown` is no degree of warmth but the want of a reading. */
export type Verdict = 'within' | 'above' | 'act' | 'discard' | 'unknown'

/**
 * How a rule was come by: V read in the law or official text; VA read in a law that adopts the same text;
 * VS read in a secondary copy; M from memory; common practice has no source.
 */
export type SourceMark = 'V' | 'VA' | 'VS' | 'M' | 'common practice'

/** Where a rule is written. */
export interface Authority {
  clause: string
  source: string
  mark: SourceMark
}

/** A temperature, or the row's within figure, which a site may have lowered. */
export type Threshold = number | 'limit'

/** `after`: more than so many minutes. `at`: so many minutes or more. */
export interface ClockStep {
  minutes: number
  reached: 'after' | 'at'
  verdict: 'act' | 'discard'
  /** What to do, without figures that a site may have made stricter. */
  act: string
}

/** A sum of careful minutes over a temperature. While it runs below its first step the verdict is `above`. */
export interface ClockRule<T = Threshold> {
  kind: 'clock'
  over: T
  /** `over`: the temperature itself is allowed. `at-or-over`: the temperature itself counts. */
  counts: 'over' | 'at-or-over'
  /** Time without a reading, after one within, is added to the sum once it is longer than the interval. */
  overdueCounts: boolean
  steps: ClockStep[]
  act: string
  authority: Authority
}

/** A verdict that follows from a temperature alone, with no number of minutes. */
export interface MarkRule<T = Threshold> {
  kind: 'mark'
  over: T
  verdict: 'above' | 'act' | 'discard'
  act: string
  authority: Authority
}

/** A verdict that follows when product rises above the within figure again after a reading within. */
export interface RisesRule {
  kind: 'rises'
  /** The rise at which the verdict falls: 2 is the second. */
  from: number
  verdict: 'act' | 'discard'
  act: string
  authority: Authority
}

/** What a cell of a chart asks: a temperature to be reached, within so many minutes. */
export interface ChartAsk<T = Threshold> {
  to: T
  minutes: number
}

/** One cell of a chart, its `act` to follow what it asks: temperatures up to `to` (itself included or not); null has no upper end. */
export interface ChartCell<T = Threshold> {
  to: number | null
  included: boolean
  verdict: 'above' | 'act' | 'discard'
  ask: ChartAsk<T> | null
  act: string
}

/** One row of a chart: minutes since control was lost, up to and including `until`; null has no end. */
export interface ChartRow<T = Threshold> {
  until: number | null
  cells: ChartCell<T>[]
}

/** A chart of temperature by minutes since control was lost, rows and cells in rising order. */
export interface ChartRule<T = Threshold> {
  kind: 'chart'
  rows: ChartRow<T>[]
  authority: Authority
}

/** A verdict that follows when the first reading is already above the within figure. */
export interface StartedWarmRule {
  kind: 'started-warm'
  verdict: 'act'
  act: string
  authority: Authority
}

export type Rule<T = Threshold> = ClockRule<T> | MarkRule<T> | RisesRule | ChartRule<T> | StartedWarmRule

/** What the law itself leaves to choose, other than being stricter. */
export interface LawfulChoice {
  flag: 'allowsMinus12'
  limit: number
  within: Authority
  rules: Rule[]
}

export interface FoodClass {
  id: string
  name: string
  /** Within is at or below this. */
  limit: number
  within: Authority
  judgedBy: 'product' | 'air'
  /** Any reading below this says that product may be freezing; null where freezing is no harm. */
  lowMark: number | null
  /** From this temperature up product is held hot and no minutes count; null where the rulebook has no such thing. */
  hotFrom: number | null
  /** Of two rules that give the same verdict, the earlier one is named. */
  rules: Rule[]
  choice: LawfulChoice | null
  /** Said with every verdict of this class. */
  notes: string[]
}

/** A duty that comes with a number, told in the plan when the hold times come near it. */
export interface Notice extends Authority {
  words: string
  /** The time without refrigeration at which it comes due; null where the text has no number. */
  afterMinutes: number | null
}

export interface Rulebook {
  id: string
  version: string
  /** What is otherwise than in the version before it, a sentence each; nothing: it is the first. */
  changed: string[]
  name: string
  unit: TemperatureUnit
  classes: FoodClass[]
  notices: Notice[]
}

/** A class as it applies at one site: every figure resolved. */
export interface EffectiveClass extends Omit<FoodClass, 'rules' | 'choice'> {
  rules: Rule<number>[]
}

export interface Limit {
  value: number
  unit: TemperatureUnit
}

export interface Assessment {
  verdict: Verdict
  /** The instant at which, product staying at its last value, the verdict gets worse; for "more than", the last one allowed. */
  deadline: string | null
  limit: Limit
  /** Minutes over the row's within figure, not rounded. */
  minutesAbove: { careful: number, linear: number }
  startedWarm: boolean
  tooCold: boolean
  suspect: boolean
  clause: string
  source: string
  act: string | null
  why: string[]
}
