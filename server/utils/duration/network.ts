/**
 * The network of steps: critical path and slack by the mean durations.
 * Three-time estimate of PERT (Malcolm, Roseboom, Clark, Fazar, Operations Research 7, 1959).
 */
import type { DurationStep } from '~~/shared/schemas/plan-duration'
import { Graph } from '../order/graph'

/** Times closer than this are the same, minutes: sums of fractions of minutes are not exact. */
export const SAME_MINUTES = 1e-9

export interface Network {
  steps: readonly DurationStep[]
  /** Indices of the steps in an order in which each comes after all that it waits for. */
  order: number[]
  /** For each step the indices of those that it waits for. */
  before: number[][]
}

export interface CriticalPath {
  /** Indices of its steps, in order. */
  path: number[]
  /** Minutes. */
  mean: number
  /** Minutes squared. */
  variance: number
}

/** (a + 4m + b)/6, minutes. */
export function meanOf({ shortest, likely, longest }: DurationStep): number {
  return (shortest + 4 * likely + longest) / 6
}

/** ((b − a)/6)², minutes squared. */
export function varianceOf({ shortest, longest }: DurationStep): number {
  return ((longest - shortest) / 6) ** 2
}

/** The network, or the ids of a ring of steps that wait for each other. Expects ids that exist, each once. */
export function networkOf(steps: readonly DurationStep[]): Network | { ring: string[] } {
  const at = new Map(steps.map(({ id }, index) => [id, index]))
  const before = steps.map(({ after }) => [...new Set(after ?? [])].map(id => at.get(id)!))
  const graph = new Graph(steps.length)
  before.forEach((earlier, step) => earlier.forEach(index => graph.add(index, step)))
  const rank = new Array<number>(steps.length)
  steps.map(({ id }, index) => ({ id, index }))
    .sort((one, other) => one.id < other.id ? -1 : 1)
    .forEach(({ index }, place) => { rank[index] = place })
  const sorted = graph.sort(rank)
  if ('cycle' in sorted) return { ring: sorted.cycle.map(index => steps[index]!.id) }
  return { steps, order: sorted.order, before }
}

/** The longest path by mean durations; of several, the one with the largest variance. */
export function criticalPath({ steps, order, before }: Network): CriticalPath {
  const best: CriticalPath[] = new Array(steps.length)
  const none: CriticalPath = { path: [], mean: 0, variance: 0 }
  let whole = none
  for (const index of order) {
    const ahead = before[index]!.map(earlier => best[earlier]!).reduce(worse, none)
    best[index] = {
      path: [...ahead.path, index],
      mean: ahead.mean + meanOf(steps[index]!),
      variance: ahead.variance + varianceOf(steps[index]!),
    }
    whole = worse(whole, best[index])
  }
  return whole
}

/** For each step the minutes by which it may slip, by mean durations, before the whole ends later. */
export function slackOf({ steps, order, before }: Network, whole: number): number[] {
  const earliestEnd = new Array<number>(steps.length).fill(0)
  for (const index of order) {
    const start = Math.max(0, ...before[index]!.map(earlier => earliestEnd[earlier]!))
    earliestEnd[index] = start + meanOf(steps[index]!)
  }
  const latestEnd = new Array<number>(steps.length).fill(whole)
  for (const index of [...order].reverse()) {
    const latestStart = latestEnd[index]! - meanOf(steps[index]!)
    for (const earlier of before[index]!) latestEnd[earlier] = Math.min(latestEnd[earlier]!, latestStart)
  }
  return earliestEnd.map((end, index) => {
    const slack = latestEnd[index]! - end
    return slack < SAME_MINUTES ? 0 : slack
  })
}

/** The path that ends later; of two that end together, the one less certain; then the first. */
function worse(one: CriticalPath, other: CriticalPath): CriticalPath {
  const later = other.mean - one.mean
  if (Math.abs(later) > SAME_MINUTES) return later > 0 ? other : one
  if (one.path.length === 0) return other
  return other.variance > one.variance + SAME_MINUTES ? other : one
}
