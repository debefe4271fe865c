import type { StepPlan } from '~~/shared/schemas/work'
import { networkOf } from './network'
import { drawEnds, DRAWS } from './plan'

const COLUMNS = 36

/** How often of all draws the steps were over about a minute, as a curve from nothing to nothing; empty where nothing varies. */
export function durationShape(steps: readonly StepPlan[]): { minute: number, density: number }[] {
  const ids = new Set(steps.map(step => step.id))
  const network = networkOf(steps.map(step => ({ ...step, after: step.after.filter(id => ids.has(id)) })))
  if (steps.length === 0 || 'ring' in network) return []
  const ends = drawEnds(network)
  const [first, last] = [ends[0]!, ends[DRAWS - 1]!]
  if (last - first < 0.01) return []
  const width = (last - first) / COLUMNS
  const counts = new Array<number>(COLUMNS).fill(0)
  for (const end of ends) counts[Math.min(COLUMNS - 1, Math.floor((end - first) / width))]! += 1
  const middle = counts.map((count, index) => ({ minute: first + (index + 0.5) * width, density: count / DRAWS / width }))
  return [{ minute: first, density: 0 }, ...middle, { minute: last, density: 0 }]
}
