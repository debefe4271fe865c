/**
 * Where each point belongs: its rack, its suction groups, its circuit and the machine it drives.
 *
 * A point's rack is the one it names, else the one its circuit belongs to, else the one its
 * suction group belongs to where only one rack has a group of that name; points of which none of
 * these is known share one unnamed rack. A point without a suction group takes those of its
 * circuit; without either it belongs to the whole rack.
 */
import { isHandActive, isHandAtRest } from '~~/shared/schemas/point-kinds'
import type { OrderPoint } from '~~/shared/schemas/plan-order'

/** The rack of points that name none. */
export const UNNAMED_RACK = ''

export interface Placed {
  point: OrderPoint
  /** The machine at the end of the chain of `drives`; the point itself when it drives nothing. */
  machine: OrderPoint
  /** How many links of `drives` lie between the point and its machine. */
  depth: number
  rack: string
  /** Whether a drive of the same controller drives it. */
  driven: boolean
  /** Suction groups of that rack; null for the whole rack. */
  groups: ReadonlySet<string> | null
  /** Asked (at hand back: held) on, open or at a speed. */
  active: boolean
  /** Asked (at hand back: held) off, closed or at zero. */
  atRest: boolean
}

/** The first circuit that two racks claim, or null. */
export function circuitOnTwoRacks(points: readonly OrderPoint[]): { circuit: string, racks: [string, string], index: number } | null {
  const claimed = new Map<string, string>()
  for (const [index, { circuit, rack }] of points.entries()) {
    if (circuit === undefined || rack === undefined) continue
    const earlier = claimed.get(circuit)
    if (earlier !== undefined && earlier !== rack) return { circuit, racks: [earlier, rack], index }
    claimed.set(circuit, rack)
  }
  return null
}

/** Places every point, in the order given. Expects unique tags and `drives` that name points. */
export function layOut(points: readonly OrderPoint[]): Placed[] {
  const byTag = new Map(points.map(point => [point.tag, point]))
  const circuitRack = new Map<string, string>()
  const circuitGroups = new Map<string, Set<string>>()
  for (const { circuit, rack, suctionGroup } of points) {
    if (circuit === undefined) continue
    if (rack !== undefined) circuitRack.set(circuit, rack)
    if (suctionGroup !== undefined) {
      circuitGroups.set(circuit, (circuitGroups.get(circuit) ?? new Set()).add(suctionGroup))
    }
  }
  const named = (point: OrderPoint) => point.rack ?? (point.circuit === undefined ? undefined : circuitRack.get(point.circuit))
  const groupRacks = new Map<string, Set<string>>()
  for (const point of points) {
    const rack = named(point)
    if (rack === undefined) continue
    for (const group of groupsOf(point, circuitGroups) ?? []) {
      groupRacks.set(group, (groupRacks.get(group) ?? new Set()).add(rack))
    }
  }
  const rackOf = (point: OrderPoint): string => {
    const rack = named(point)
    if (rack !== undefined) return rack
    for (const group of groupsOf(point, circuitGroups) ?? []) {
      const racks = groupRacks.get(group)
      if (racks?.size === 1) return [...racks][0]!
    }
    return UNNAMED_RACK
  }

  const driven = new Set(points.flatMap(point => point.drives ?? []))
  return points.map((point) => {
    const { machine, depth } = machineOf(point, byTag)
    return {
      point,
      machine,
      depth,
      driven: driven.has(point.tag),
      rack: rackOf(machine),
      groups: groupsOf(machine, circuitGroups),
      active: isHandActive(point.hand),
      atRest: isHandAtRest(point.hand),
    }
  })
}

/** Whether the sequence binds the two: the same circuit, or the same suction group or rack. */
export function sharesScope(one: Placed, other: Placed): boolean {
  if (one.machine.circuit !== undefined && one.machine.circuit === other.machine.circuit) return true
  return one.rack === other.rack && sharesGroup(one.groups, other.groups)
}

export function sharesGroup(one: ReadonlySet<string> | null, other: ReadonlySet<string> | null): boolean {
  if (one === null || other === null) return true
  for (const group of one) if (other.has(group)) return true
  return false
}

function groupsOf(point: OrderPoint, circuitGroups: ReadonlyMap<string, ReadonlySet<string>>): ReadonlySet<string> | null {
  if (point.suctionGroup !== undefined) return new Set([point.suctionGroup])
  return (point.circuit === undefined ? undefined : circuitGroups.get(point.circuit)) ?? null
}

function machineOf(point: OrderPoint, byTag: ReadonlyMap<string, OrderPoint>): { machine: OrderPoint, depth: number } {
  let machine = point
  let depth = 0
  // The count ends a ring of drives, which the parser refuses before anything is ordered.
  while (machine.drives !== undefined && depth < byTag.size) {
    const next = byTag.get(machine.drives)
    if (!next) break
    machine = next
    depth += 1
  }
  return { machine, depth }
}
