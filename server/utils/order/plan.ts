import type { PlanOrderInput } from '~~/shared/schemas/plan-order'
import { layOut } from './layout'
import { findRefusals, type Refusal } from './refusals'
import { arrange } from './sequence'
import { reasons } from './words'

export interface OrderStep {
  tag: string
  /** Tags that come before; directly or through others they reach all that the rules demand. */
  after: string[]
  because: string
}

export interface PlannedOrder {
  order: OrderStep[]
  refusals: Refusal[]
}

/**
 * The order in which the points of a controller are put in hand, or handed back, and the points
 * that may not be. At hand back a point that `stays` is in neither list.
 *
 * Rules I1, I2, I3, I7, I9 and I12; the sequence is common practice of the trade, no published source.
 * @throws RangeError when the points wait for each other in a ring; `parseOrderInput` lets none through.
 */
export function planOrder(input: PlanOrderInput): PlannedOrder {
  const placed = layOut(input.points)
  const refusals = findRefusals(input, placed)
  const isRefused = (tag: string) => refusals.has(tag)
  const arranged = arrange(input, placed, isRefused)
  if ('cycle' in arranged) throw new RangeError(ringWords(arranged.cycle))
  const because = reasons(input, placed, isRefused)
  return {
    order: arranged.order().map(({ place, after }) => ({ tag: place.point.tag, after, because: because(place) })),
    refusals: input.points.flatMap(({ tag }) => refusals.get(tag) ?? []),
  }
}

/** The ring of tags that keeps the points from being ordered, or null. */
export function findRing(input: PlanOrderInput): string[] | null {
  const placed = layOut(input.points)
  const refusals = findRefusals(input, placed)
  const arranged = arrange(input, placed, tag => refusals.has(tag))
  return 'cycle' in arranged ? arranged.cycle : null
}

export function ringWords(ring: readonly string[]): string {
  return `wait for each other in a ring: ${[...ring, ring[0]].join(', ')}`
}
