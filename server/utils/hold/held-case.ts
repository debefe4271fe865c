/** Which cases of a real outage are held on by hand, and how long they can be. */
import type { OutageState, PointState } from '~~/shared/record/state'
import type { Snapshot, SnapshotCase } from '~~/shared/record/snapshot'
import { isFrozenKind } from '~~/shared/schemas/case-kinds'
import { isHandActive } from '~~/shared/schemas/point-kinds'
import type { PointKind } from '~~/shared/schemas/point-kinds'
import { isRefrigerantId } from '~~/shared/schemas/refrigerants'
import { kpaOfPsig, saturation } from '../cover'
import { localClock } from '../window/local-time'
import { defrostsBetween } from '../window/schedule'
import { heldOnHold } from './held-on'
import type { HeldOnHold } from './held-on'

const HOUR = 3_600_000
const VALVES: readonly PointKind[] = ['liquid-line-valve', 'expansion-valve']

export interface HeldCase extends HeldOnHold {
  /** usual gap between its defrosts, hours; null where no schedule is known */
  usualGapHours: number | null
}

/** A compressor of its group is on by hand, its valves are open and its fans run. */
export function isHeldOn(state: OutageState, known: SnapshotCase): boolean {
  const circuit = state.snapshot.circuits.find(item => item.id === known.circuitId)
  if (!circuit || isFrozenKind(known.kind)) return false
  const held = (point: PointState | undefined) => point?.status === 'hand' && point.hand !== null && point.tried === null && isHandActive(point.hand)
  const pointsOf = (kinds: readonly PointKind[]) => state.snapshot.points.filter(point => point.circuitId === circuit.id && kinds.includes(point.kind)).map(point => state.points[point.tag])
  const machines = state.snapshot.points.filter(point => point.kind === 'compressor' && (circuit.suctionGroupId === null ? point.rackId === circuit.rackId : point.suctionGroupId === circuit.suctionGroupId))
  const fans = pointsOf(['evaporator-fan'])
  return machines.some(point => held(state.points[point.tag])) && pointsOf(VALVES).every(held) && (fans.length === 0 || fans.some(held))
}

/**
 * Time to the low mark of a case held on by hand, from its last temperature toward the air that the
 * suction gives it, and the time since its last defrost; null where the suction is not known.
 * @param startC °C at `now`, Unix ms
 */
export function heldCase(state: OutageState, known: SnapshotCase, startC: number, now: number): HeldCase | null {
  const suction = suctionOf(state, known, now)
  if (suction === null) return null
  const { circuit, sstC } = suction
  const { lastAt, gapHours } = lastDefrost(state.snapshot, circuit, state.inHandBegun?.at ?? state.darks[0]?.from ?? now)
  const held = heldOnHold({ startC, tauHours: known.tauHours, sstC, lastDefrostAt: lastAt === null ? null : new Date(lastAt).toISOString(), usualGapHours: gapHours ?? 0, now: new Date(now).toISOString() })
  return { ...held, usualGapHours: gapHours }
}

/** The circuit of a case with its saturated suction at a moment; null where that is not known, and then nobody can say how cold it is held. */
export function suctionOf(state: OutageState, known: SnapshotCase, now: number): { circuit: Snapshot['circuits'][number], sstC: number } | null {
  const circuit = state.snapshot.circuits.find(item => item.id === known.circuitId)
  const sstC = circuit ? suctionC(state, circuit, now) : null
  return circuit && sstC !== null ? { circuit, sstC } : null
}

/** Saturated suction of a circuit's group: as last read, else its target. °C, dew; null where neither is known. */
function suctionC({ snapshot, pressures }: OutageState, circuit: Snapshot['circuits'][number], now: number): number | null {
  const group = snapshot.suctionGroups.find(item => item.id === circuit.suctionGroupId)
  const refrigerant = snapshot.racks.find(rack => rack.id === circuit.rackId)?.refrigerant
  if (!group || refrigerant === undefined || !isRefrigerantId(refrigerant)) return null
  const read = pressures.filter(item => item.suctionGroupId === group.id && !item.questioned && item.at <= now).at(-1)
  const psig = read?.suctionPsig ?? group.targetSuctionPsig
  if (psig === null) return null
  const at = saturation(refrigerant, { kpa: kpaOfPsig(psig, snapshot.site.altitudeM) })
  return 'reason' in at ? null : at.dewCelsius
}

/** The end of the last defrost by schedule before points went in hand, Unix ms, and the usual gap. */
function lastDefrost(snapshot: Snapshot, circuit: Snapshot['circuits'][number], until: number): { lastAt: number | null, gapHours: number | null } {
  if (circuit.defrosts === null || circuit.defrostKind === 'none') return { lastAt: null, gapHours: null }
  const times = 'times' in circuit.defrosts ? new Set(circuit.defrosts.times).size : 24 / circuit.defrosts.everyHours
  const found = defrostsBetween([{ id: circuit.id, defrosts: circuit.defrosts, durationMin: circuit.durationMin, dripMin: circuit.dripMin }], localClock(snapshot.site.timeZone), until - 48 * HOUR, until)
  return { lastAt: found.filter(defrost => defrost.end <= until).at(-1)?.end ?? null, gapHours: 24 / times }
}
