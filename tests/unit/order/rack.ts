import { parseOrderInput, planOrder, type PlannedOrder } from '../../../server/utils/order'
import type { OrderPoint, PlanOrderInput } from '../../../shared/schemas/plan-order'

/** A medium-temperature rack of our own: two circuits, a drive, two fixed-speed compressors. */
export function quarryStreetRack(): OrderPoint[] {
  const rack = 'A'
  const suctionGroup = 'MT'
  return [
    { tag: 'C1', kind: 'compressor', hand: 'on', rack, suctionGroup, place: 'Machine room', guardInSeries: true },
    { tag: 'C2', kind: 'compressor', hand: 'on', rack, suctionGroup, place: 'Machine room', running: true },
    { tag: 'C3', kind: 'compressor', hand: 'on', rack, suctionGroup, place: 'Machine room' },
    { tag: 'VS3', kind: 'drive', hand: { hz: 42 }, drives: 'C3', place: 'Machine room' },
    { tag: 'F1', kind: 'condenser-fan', hand: 'on', rack, place: 'Roof' },
    { tag: 'F2', kind: 'condenser-fan', hand: 'off', rack, place: 'Roof' },
    { tag: 'E1', kind: 'evaporator-fan', hand: 'on', circuit: '1', place: 'Aisle 2' },
    { tag: 'L1', kind: 'liquid-line-valve', hand: 'open', rack, suctionGroup, circuit: '1', place: 'Aisle 2' },
    { tag: 'H1', kind: 'defrost-heater', hand: 'off', rack, suctionGroup, circuit: '1', place: 'Aisle 2' },
    { tag: 'E2', kind: 'evaporator-fan', hand: 'on', circuit: '2', place: 'Aisle 10' },
    { tag: 'L2', kind: 'liquid-line-valve', hand: 'open', rack, suctionGroup, circuit: '2', place: 'Aisle 10' },
    { tag: 'G2', kind: 'hot-gas-valve', hand: 'closed', rack, suctionGroup, circuit: '2', place: 'Aisle 10' },
    { tag: 'W1', kind: 'anti-sweat-heater', hand: 'on', rack, place: 'Aisle 10' },
    { tag: 'A1', kind: 'leak-alarm', hand: 'as-found', rack, place: 'Machine room' },
  ]
}

export function plan(points: OrderPoint[], more: Partial<PlanOrderInput> = {}): PlannedOrder {
  const parsed = parseOrderInput({ direction: 'in-hand', points, ...more })
  if (!parsed.ok) throw new Error(parsed.reason)
  return planOrder(parsed.input)
}

export function tags(planned: PlannedOrder): string[] {
  return planned.order.map(({ tag }) => tag)
}

export function refused(planned: PlannedOrder): Record<string, string> {
  return Object.fromEntries(planned.refusals.map(({ tag, rule }) => [tag, rule]))
}

/** The same points with some fields changed by tag. */
export function change(points: OrderPoint[], changes: Record<string, Partial<OrderPoint>>): OrderPoint[] {
  return points.map(point => ({ ...point, ...changes[point.tag] }))
}

export function without(points: OrderPoint[], ...gone: string[]): OrderPoint[] {
  return points.filter(({ tag }) => !gone.includes(tag))
}
