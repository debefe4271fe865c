import type { PlanDurationInput } from '~~/shared/schemas/plan-duration'
import { durationDrawer, uniformStream } from './draw'
import { criticalPath, networkOf, SAME_MINUTES, slackOf, type Network } from './network'
import { normalBelow, Z_19_IN_20 } from './normal'

/** Draws of the whole network: the 19-in-20 time then strays by about 0.015 standard deviations. */
export const DRAWS = 20_000
const SEED = 20_260_101

export interface Chance {
  /** Minutes by which the work is over 19 times in 20. */
  p95: number
  /** Probability that it is over within the minutes asked for; null where none were. */
  pWithin: number | null
}

export interface PlannedDuration {
  /** Minutes, of the critical path. */
  mean: number
  /** Standard deviation, minutes, of the critical path. */
  sd: number
  critical: string[]
  /** By the critical path alone: optimistic where paths merge. */
  normal: Chance
  /** By simulation over the whole network. */
  simulated: Chance
  /** Minutes by step. */
  slack: Record<string, number>
}

/**
 * How long the steps take together, minutes. Mean (a + 4m + b)/6 and variance ((b − a)/6)² of each
 * step, summed along the critical path (PERT: Malcolm and others, Operations Research 7, 1959);
 * beside it a simulation of the whole network with a fixed seed, the same on every machine.
 * @throws RangeError when steps wait for each other in a ring; `parseDurationInput` lets none through.
 */
export function planDuration({ steps, within }: PlanDurationInput): PlannedDuration {
  const network = networkOf(steps)
  if ('ring' in network) throw new RangeError(`Steps wait for each other in a ring: ${network.ring.join(', ')}`)
  const { path, mean, variance } = criticalPath(network)
  const sd = Math.sqrt(variance)
  const slack = slackOf(network, mean)
  return {
    mean,
    sd,
    critical: path.map(index => steps[index]!.id),
    normal: { p95: mean + Z_19_IN_20 * sd, pWithin: within === undefined ? null : normalWithin(within, mean, sd) },
    simulated: simulate(network, within),
    slack: Object.fromEntries(steps.map(({ id }, index) => [id, slack[index]!])),
  }
}

/** Probability of an end at or before `within`; 0 or 1 where nothing varies. Minutes. */
export function normalWithin(within: number, mean: number, sd: number): number {
  if (sd === 0) return within >= mean - SAME_MINUTES ? 1 : 0
  return normalBelow((within - mean) / sd)
}

function simulate(network: Network, within: number | undefined): Chance {
  const ends = drawEnds(network)
  return {
    p95: ends[Math.ceil(0.95 * DRAWS) - 1]!,
    pWithin: within === undefined ? null : countUpTo(ends, within + SAME_MINUTES) / DRAWS,
  }
}

/** When the whole network was over in each draw, minutes, ascending; the same draws each time. */
export function drawEnds({ steps, order, before }: Network): Float64Array {
  const uniform = uniformStream(SEED)
  const draw = steps.map(({ shortest, likely, longest }) => durationDrawer(shortest, likely, longest))
  const end = new Float64Array(steps.length)
  const ends = new Float64Array(DRAWS)
  for (let trial = 0; trial < DRAWS; trial += 1) {
    let last = 0
    for (const index of order) {
      let start = 0
      for (const earlier of before[index]!) if (end[earlier]! > start) start = end[earlier]!
      end[index] = start + draw[index]!(uniform)
      if (end[index]! > last) last = end[index]!
    }
    ends[trial] = last
  }
  return ends.sort()
}

/** How many of the ascending values are at most the given one. */
function countUpTo(ascending: Float64Array, most: number): number {
  let low = 0
  let high = ascending.length
  while (low < high) {
    const middle = (low + high) >>> 1
    if (ascending[middle]! <= most) low = middle + 1
    else high = middle
  }
  return low
}
