/**
 * Which circuits feed a compressor: rule I1 asks for one whose liquid valves are open and whose
 * evaporator fans are on.
 */
import type { PointKind } from '~~/shared/schemas/point-kinds'
import { sharesGroup, type Placed } from './layout'

export interface Circuit {
  /** Null for a liquid valve that names no circuit and so counts as one of its own. */
  name: string | null
  rack: string
  groups: ReadonlySet<string> | null
  valves: Placed[]
  fans: Placed[]
  fansOn: boolean
}

export function isLiquidValve(kind: PointKind): boolean {
  return kind === 'liquid-line-valve' || kind === 'expansion-valve'
}

/** The circuits of all racks, named ones first in the order of their points. */
export function circuitsOf(placed: readonly Placed[]): Circuit[] {
  const named = new Map<string, Circuit>()
  const alone: Circuit[] = []
  for (const place of placed) {
    const { point: { kind, circuit: name }, rack, groups } = place
    if (name !== undefined) {
      const circuit = named.get(name) ?? { name, rack, groups: null, valves: [], fans: [], fansOn: true }
      named.set(name, circuit)
      if (groups !== null) circuit.groups = new Set([...(circuit.groups ?? []), ...groups])
      if (isLiquidValve(kind)) circuit.valves.push(place)
      if (kind === 'evaporator-fan') circuit.fans.push(place)
    } else if (isLiquidValve(kind)) {
      alone.push({ name: null, rack, groups, valves: [place], fans: [], fansOn: true })
    }
  }
  const circuits = [...named.values(), ...alone]
  for (const circuit of circuits) circuit.fansOn = fansRun(circuit, placed)
  return circuits
}

/** A rack none of whose points belongs to a circuit: its cases are on other controllers. */
export function countsAsFed(compressor: Placed, circuits: readonly Circuit[]): boolean {
  return !circuits.some(circuit => circuit.rack === compressor.rack)
}

/** The circuits that feed the compressor, given which valves are in the end held open. */
export function feeding(
  compressor: Placed,
  circuits: readonly Circuit[],
  isOpen: (valve: Placed) => boolean,
): Circuit[] {
  return circuits.filter(circuit => circuit.rack === compressor.rack
    && sharesGroup(circuit.groups, compressor.groups)
    && circuit.fansOn
    && circuit.valves.every(isOpen))
}

/** What is taken for granted about a circuit because the controller has no point for it. */
export function assumptions(circuit: Circuit): string[] {
  if (circuit.name === null) return []
  const said: string[] = []
  if (circuit.fans.length === 0) said.push(`Circuit ${circuit.name} has no evaporator fan point here: its fans count as on.`)
  if (circuit.valves.length === 0) said.push(`Circuit ${circuit.name} has no liquid valve point here: it counts as open.`)
  return said
}

function fansRun(circuit: Circuit, placed: readonly Placed[]): boolean {
  if (circuit.name !== null) return circuit.fans.every(fan => fan.active)
  // A valve without a circuit doesn't say which fans are its own, so any without a circuit will do.
  const fans = placed.filter(({ point, rack, groups }) => point.kind === 'evaporator-fan'
    && point.circuit === undefined && rack === circuit.rack && sharesGroup(groups, circuit.groups))
  return fans.length === 0 || fans.some(fan => fan.active)
}
