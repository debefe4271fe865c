/** Will the product outlast the work: the plan's holds, its shortest, the margin, and what would lengthen it. */
import type { MarginFigure } from '~~/shared/record/margin'
import { assumed } from '~~/shared/record/measures'
import type { Plan } from '~~/shared/record/plan'
import { celsius, firmReadings } from '~~/shared/record/select'
import type { Snapshot } from '~~/shared/record/snapshot'
import type { OutageState } from '~~/shared/record/state'
import { MEASURE_KINDS, MEASURES } from '~~/shared/schemas/plan-facts'
import type { MeasureKind } from '~~/shared/schemas/plan-facts'
import type { StepPlan } from '~~/shared/schemas/work'
import { groupCovers } from '../cover/for-plan'
import type { GroupCover } from '../cover/for-plan'
import { icedMinutes } from './icing'
import type { PlanTimes } from './icing'
import { caseHold } from './plan-holds'
import type { CaseHold, HoldFacts } from './plan-holds'

/** Before dark: checks, round 0 and ten steady minutes, and a minute a point. Our own estimates. */
const CHECKS_MINUTES = 30
const MINUTES_A_POINT = 1
const MINUTE = 60_000

export interface PlanMargin extends MarginFigure {
  /** by which the dark steps are over 19 times in 20, minutes */
  workMinutes: number
  /** shortest planned hold first; those left out last */
  cases: CaseHold[]
  shortestCase: CaseHold | null
  /** the shortest with nothing running */
  bareCase: CaseHold | null
  /** the one whose deadline with nothing running comes first */
  deadlineCase: CaseHold | null
  covers: GroupCover[]
  leadMinutes: number
  times: PlanTimes
}

export interface Lengthening { kind: MeasureKind, words: string, factor: number, /** null: it would come to nothing, or be out of it */ minutes: number | null }

/** What is known beyond the plan itself. */
export interface MarginFacts { times?: PlanTimes, read?: Record<string, number>, spared?: Record<string, string> }

/** Minutes from when points begin to go in hand until control is taken away: as assumed, else an estimate. */
export function leadMinutesOf(plan: Pick<Plan, 'points' | 'steps' | 'assumptions'>): number {
  return assumed(plan, 'lead-minutes') ?? CHECKS_MINUTES + MINUTES_A_POINT * plan.points.length + stepsBeforeDark(plan.steps)
}

/** Likely minutes of the steps that come before a dark one, and are not dark themselves. */
function stepsBeforeDark(steps: readonly StepPlan[]): number {
  const before = new Set<string>()
  const visit = (id: string) => {
    for (const earlier of steps.find(step => step.id === id)?.after ?? []) if (!before.has(earlier)) { before.add(earlier); visit(earlier) }
  }
  for (const step of steps) if (step.dark) visit(step.id)
  return steps.filter(step => before.has(step.id) && !step.dark).reduce((sum, step) => sum + step.likely, 0)
}

function timesOf(plan: Plan): PlanTimes {
  const inHandAt = plan.startsAt === null ? null : Date.parse(plan.startsAt)
  return { inHandAt, darkAt: inHandAt === null ? null : inHandAt + leadMinutesOf(plan) * MINUTE }
}

const ascending = (a: number | null, b: number | null) => a === b ? 0 : (a ?? Infinity) - (b ?? Infinity)

function factsOf(snapshot: Snapshot, plan: Plan, { times = timesOf(plan), read = {}, spared = {} }: MarginFacts): HoldFacts {
  return { snapshot, plan, covers: groupCovers(snapshot, plan.points, plan), iced: icedMinutes(snapshot, plan, times), read, spared }
}

/** Whether the product of a plan outlasts its work. Pure; an estimate throughout. */
export function marginOf(snapshot: Snapshot, plan: Plan, known: MarginFacts = {}): PlanMargin {
  const facts = factsOf(snapshot, plan, known)
  const cases = snapshot.cases.map(item => caseHold(facts, item))
    .sort((a, b) => Number(a.leftOut !== null) - Number(b.leftOut !== null) || ascending(a.plannedMinutes, b.plannedMinutes) || a.caseId.localeCompare(b.caseId))
  const counted = cases.filter(item => item.leftOut === null)
  const first = (of: (item: CaseHold) => number | null) => counted.reduce<CaseHold | null>((best, item) => of(item) !== null && (best === null || of(item)! < of(best)!) ? item : best, null)
  const [shortestCase, bareCase, deadlineCase] = [first(item => item.plannedMinutes), first(item => item.bareMinutes), first(item => item.bareDeadline)]
  const workMinutes = plan.duration.dark19in20
  const less = (minutes: number | null | undefined) => minutes === null || minutes === undefined ? null : minutes - workMinutes
  return {
    minutes: less(shortestCase?.plannedMinutes), shortest: shortestCase?.name ?? '', deadlineMinutes: less(deadlineCase?.bareDeadline), deadlineOf: deadlineCase?.name ?? '',
    workMinutes, cases, shortestCase, bareCase, deadlineCase, covers: facts.covers, leadMinutes: leadMinutesOf(plan), times: known.times ?? timesOf(plan),
  }
}

/** What is known at a moment of a real outage: start temperatures read, product gone, when points went in hand. @param at Unix ms */
export function marginFactsOf(state: OutageState, at: number): MarginFacts {
  const read: Record<string, number> = {}
  const spared: Record<string, string> = {}
  for (const item of Object.values(state.cases)) {
    const last = firmReadings(item).filter(reading => reading.at <= at).at(-1)
    if (last) read[item.id] = celsius(last.value, last.unit)
    if (item.empty) spared[item.id] = 'nothing is left in it'
    else if (item.acceptedWarm) spared[item.id] = 'accepted as started warm'
  }
  const begun = state.inHandBegun?.at ?? null
  return begun === null ? { read, spared } : { read, spared, times: { inHandAt: begun, darkAt: Math.max(at, begun) } }
}

/** The margin of an outage as it stands at a moment; null where nothing is planned. @param at Unix ms */
export function marginAt(state: OutageState, at: number): PlanMargin | null {
  if (!state.planned || state.plan.steps.every(step => !step.dark)) return null
  return marginOf(state.snapshot, state.plan, marginFactsOf(state, at))
}

/** How long a case would hold with each measure that suits it and is not yet chosen, most minutes last. */
export function lengthenings(snapshot: Snapshot, plan: Plan, caseId: string, known: MarginFacts = {}): Lengthening[] {
  const item = snapshot.cases.find(other => other.id === caseId)!
  const chosen = plan.measures.filter(measure => measure.caseIds.includes(caseId)).map(measure => measure.kind)
  return MEASURE_KINDS.filter(kind => kind !== 'other' && MEASURES[kind].suits(item.kind) && !chosen.includes(kind)).map((kind) => {
    const { factor, does } = MEASURES[kind]
    const hold = caseHold(factsOf(snapshot, { ...plan, measures: [...plan.measures, { kind, caseIds: [caseId], factor, words: '' }] }, known), item)
    return { kind, words: does, factor, minutes: hold.leftOut === null ? hold.plannedMinutes : null }
  })
}
