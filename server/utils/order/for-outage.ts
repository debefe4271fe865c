/** The order engine asked about a real outage: its snapshot, plan and present positions. */
import type { Plan } from '~~/shared/record/plan'
import type { OutageState } from '~~/shared/record/state'
import type { Snapshot, SnapshotPoint } from '~~/shared/record/snapshot'
import type { OrderPoint, PlanOrderInput } from '~~/shared/schemas/plan-order'
import type { HandPosition } from '~~/shared/schemas/point-kinds'
import type { OrderStep, PlannedOrder } from './plan'
import { coverPicks, coverRefusals } from '../cover'
import { planOrder } from './plan'
import { proposeHand } from './propose'

const PLACE_MAX = 200

/** The engine's reasons are read by people and signed, so it is given names; a rack's is its own within a controller. */
function rackName(snapshot: Snapshot, id: string): string {
  return snapshot.racks.find(rack => rack.id === id)?.name ?? id
}

/** Name of a circuit or suction group, with its rack's where two racks have one of that name. */
function nameWithin(snapshot: Snapshot, all: readonly { id: string, rackId: string, name: string }[], id: string): string {
  const known = all.find(item => item.id === id)
  if (!known) return id
  return all.some(item => item.id !== id && item.name === known.name) ? `${rackName(snapshot, known.rackId)} ${known.name}` : known.name
}

/** A point of the equipment as the order engine takes it. */
export function orderPoint(snapshot: Snapshot, point: SnapshotPoint, hand: HandPosition): OrderPoint {
  const group = snapshot.suctionGroups.find(item => item.id === point.suctionGroupId)
  // I12 is about stages that feed each other: a low-temperature rack of one stage has its own condenser.
  const staged = group && snapshot.suctionGroups.some(item => item.rackId === group.rackId && item.stage === 'medium')
  return {
    tag: point.tag,
    kind: point.kind,
    hand,
    ...(point.rackId ? { rack: rackName(snapshot, point.rackId) } : {}),
    ...(point.suctionGroupId ? { suctionGroup: nameWithin(snapshot, snapshot.suctionGroups, point.suctionGroupId) } : {}),
    ...(staged ? { stage: group.stage } : {}),
    ...(point.circuitId ? { circuit: nameWithin(snapshot, snapshot.circuits, point.circuitId) } : {}),
    ...(point.place ? { place: point.place.slice(0, PLACE_MAX) } : {}),
    ...(point.drives ? { drives: point.drives } : {}),
    // Without a guard named that works in hand, a compressor may not be held on (I9).
    ...(point.kind === 'compressor' ? { guardInSeries: point.guards.length > 0 } : {}),
  }
}

/** `drives` may name a point that this outage leaves alone; it then says nothing here. */
function withinList(points: OrderPoint[]): OrderPoint[] {
  const tags = new Set(points.map(point => point.tag))
  return points.map(({ drives, ...point }) => drives && tags.has(drives) ? { ...point, drives } : point)
}

/** The order, or, where a snapshot's points wait for each other in a ring, none and the reason. */
function orderOrRing(input: PlanOrderInput): PlannedOrder {
  try {
    return planOrder(input)
  } catch (error) {
    if (!(error instanceof RangeError)) throw error
    return { order: [], refusals: [{ tag: input.points[0]!.tag, rule: 'ring', because: error.message }] }
  }
}

/** Order in which the points of a plan go in hand, and those that may not. */
export function inHandOrder(snapshot: Snapshot, points: Plan['points']): PlannedOrder {
  const known = points.flatMap((planned) => {
    const point = snapshot.points.find(item => item.tag === planned.tag)
    return point ? [orderPoint(snapshot, point, planned.hand)] : []
  })
  return orderOrRing({ direction: 'in-hand', points: withinList(known) })
}

/** What the rules say against a plan, in words; also where its order is not the one that the rules give. */
export function planRefusals(state: OutageState): string[] {
  const { order, refusals } = inHandOrder(state.snapshot, state.plan.points)
  const said = refusals.map(refusal => `${refusal.tag}: ${refusal.because} (${refusal.rule})`)
  const planned = new Map(state.plan.order.map(line => [line.tag, new Set(line.after)]))
  const skipped = order.filter(step => step.after.some(tag => planned.get(step.tag)?.has(tag) === false)).map(step => step.tag)
  const load = coverRefusals(state.snapshot, state.plan)
  return skipped.length > 0 ? [...said, ...load, `the order leaves out what must come before ${skipped.join(', ')}`] : [...said, ...load]
}

/** Order in which the points in hand go back to auto, from where they stand now. */
export function handBackOrder(state: OutageState): OrderStep[] {
  const held = state.snapshot.points.flatMap((point) => {
    const now = state.points[point.tag]
    if (now?.status !== 'hand' || now.hand === null) return []
    return [{ ...orderPoint(state.snapshot, point, now.hand), ...(now.exception ? { stays: true } : {}) }]
  })
  return orderOrRing({ direction: 'hand-back', points: withinList(held) }).order
}

/** Tags that go back to auto before this one. */
export function handBackAfter(state: OutageState, tag: string): string[] {
  return handBackOrder(state).find(step => step.tag === tag)?.after ?? []
}

/** A point's usual hand position, where the cover does not say what its compressor does (I4). */
function usualHand(snapshot: Snapshot, picks: ReadonlyMap<string, ReadonlySet<string>>, point: SnapshotPoint): HandPosition | null {
  const machine = point.kind === 'drive' ? snapshot.points.find(item => item.tag === point.drives) : point
  const picked = machine?.kind === 'compressor' && machine.suctionGroupId !== null ? picks.get(machine.suctionGroupId) : undefined
  if (!machine || picked === undefined) return point.hand
  const isOn = picked.has(machine.tag)
  return point.kind === 'drive' ? (isOn ? point.hand : 'off') : (isOn ? 'on' : 'off')
}

/**
 * Hand positions that the product proposes for all points of a controller. The compressors on are the
 * cover's, where its facts are known, else those whose usual position is on.
 */
export function proposePoints(snapshot: Snapshot, plan: Pick<Plan, 'assumptions'> = { assumptions: [] }): Plan['points'] {
  const picks = coverPicks(snapshot, plan)
  const hands = new Map(snapshot.points.map(point => [point.tag, usualHand(snapshot, picks, point)]))
  const groupsOn = new Set(snapshot.points
    .filter(point => point.kind === 'compressor' && hands.get(point.tag) === 'on')
    .map(point => point.suctionGroupId))
  return snapshot.points.map((point) => {
    const group = point.suctionGroupId ?? snapshot.circuits.find(circuit => circuit.id === point.circuitId)?.suctionGroupId ?? null
    const expansionValveInCircuit = point.circuitId !== null && snapshot.points.some(other => other.kind === 'expansion-valve' && other.circuitId === point.circuitId)
    return { tag: point.tag, hand: proposeHand({ kind: point.kind, hand: hands.get(point.tag) ?? null }, { compressorOn: group !== null && groupsOn.has(group), expansionValveInCircuit }), reason: '' }
  })
}
