/** Hold time of each case of a plan: with nothing running, and as the plan leaves it. Estimates. */
import { assumed } from '~~/shared/record/measures'
import type { Plan } from '~~/shared/record/plan'
import { celsius } from '~~/shared/record/select'
import type { Snapshot, SnapshotCase, SnapshotPoint } from '~~/shared/record/snapshot'
import { isFrozenKind } from '~~/shared/schemas/case-kinds'
import type { MeasureKind } from '~~/shared/schemas/plan-facts'
import { isHandActive, isHandAtRest } from '~~/shared/schemas/point-kinds'
import type { GroupCover } from '../cover/for-plan'
import { deadlineMinutes } from './deadline'
import { holdInputOf } from './defaults'
import { SHOP_AIR_C } from './for-outage'
import { LOW_MARK_C, SUPPLY_ABOVE_SUCTION_K } from './held-on'
import type { CurvePoint } from './hold-time'
import { holdTime } from './hold-time'

/** Coldest start that the enthalpy of foods is written for, °C. */
const COLDEST_C = -40
/** The curve for the rulebook's clock is followed so far, minutes. */
const LONGEST_MINUTES = 600

export interface CaseHold {
  caseId: string
  name: string
  /** why its hold time does not count, or null when it does */
  leftOut: string | null
  startC: number
  startIs: 'usual' | 'read' | 'changed'
  airC: number
  /** hours; of a chilled case, without what measures add */
  tauHours: number | null
  tauIs: 'own' | 'estimate' | 'changed'
  limitC: number
  /** product of its factors */
  factor: number
  measures: MeasureKind[]
  /** its refrigeration is held on by hand */
  heldOn: boolean
  /** air that the cover gives it, °C; null unless held on and computed */
  supplyC: number | null
  /** minutes with nothing running until the limit; null: never */
  bareMinutes: number | null
  /** minutes with nothing running until the rulebook demands an act; null: not within ten hours */
  bareDeadline: number | null
  /** minutes as the plan leaves it; null: nothing that it comes to */
  plannedMinutes: number | null
  /** what it comes to first */
  ends: 'limit' | 'low-mark' | 'iced' | null
}

export interface HoldFacts {
  snapshot: Snapshot
  plan: Pick<Plan, 'points' | 'cases' | 'measures' | 'assumptions'>
  covers: GroupCover[]
  /** minutes from dark until a coil counts as iced, by circuit */
  iced: ReadonlyMap<string, number>
  /** start temperatures that were read, °C, by case */
  read: Readonly<Record<string, number>>
  /** cases whose product is gone or was accepted as it is, with the reason */
  spared: Readonly<Record<string, string>>
}

/** Whether the plan leaves a point running or open: as asked in hand, else as its output falls when control is lost. */
function staysActive(plan: HoldFacts['plan'], point: SnapshotPoint): boolean {
  const hand = plan.points.find(item => item.tag === point.tag)?.hand ?? 'as-found'
  if (isHandActive(hand)) return true
  return !isHandAtRest(hand) && (point.onLoss === 'on' || point.onLoss === 'holds')
}

/** A case is held on where a compressor of its suction group is, its liquid valves are open and its fans run. */
function isHeldOn({ snapshot, plan, covers }: HoldFacts, known: SnapshotCase): { supplyC: number | null } | null {
  const circuit = snapshot.circuits.find(item => item.id === known.circuitId)
  const cover = covers.find(item => item.groupId === circuit?.suctionGroupId)
  if (!circuit || !cover || !cover.machines.some(machine => machine.on)) return null
  const ofCircuit = snapshot.points.filter(point => point.circuitId === circuit.id)
  const fed = ofCircuit.filter(point => point.kind === 'liquid-line-valve' || point.kind === 'expansion-valve').every(point => staysActive(plan, point))
  const blown = ofCircuit.filter(point => point.kind === 'evaporator-fan' && (point.caseIds.length === 0 || point.caseIds.includes(known.id))).every(point => staysActive(plan, point))
  if (!fed || !blown) return null
  return { supplyC: cover.held?.sstC === null || cover.held === null ? null : cover.held.sstC + SUPPLY_ABOVE_SUCTION_K }
}

/** Why a case does not count, or null. */
function sparedBecause({ plan, spared }: HoldFacts, known: SnapshotCase): string | null {
  if (known.runsAlone) return 'its own controller keeps it going'
  if (!(plan.cases.find(item => item.id === known.id)?.touched ?? false)) return 'not touched'
  if (plan.measures.some(measure => measure.kind === 'product-moved' && measure.caseIds.includes(known.id))) return 'its product is moved out before the start'
  return spared[known.id] ?? null
}

/** The hold of one case. Formulas: see holdTime; what is held on by hand: see heldOnHold. */
export function caseHold(facts: HoldFacts, known: SnapshotCase): CaseHold {
  const { snapshot, plan } = facts
  const [changedStart, changedTau] = [assumed(plan, 'start-c', known.id), assumed(plan, 'tau-hours', known.id)]
  const readStart = facts.read[known.id]
  const frozen = isFrozenKind(known.kind)
  const startC = readStart ?? changedStart ?? known.usualC
  const airC = assumed(plan, 'air-c') ?? SHOP_AIR_C
  const tauHours = frozen ? null : changedTau ?? known.tauHours
  const measures = plan.measures.filter(measure => measure.caseIds.includes(known.id))
  const factor = measures.reduce((product, measure) => product * measure.factor, 1)
  const limitC = celsius(known.limit.value, known.limit.unit)
  const towards = (ambientC: number) => holdTime(inputOf(known, { startC, ambientC, limitC, tauHours, factor }))
  const bare = towards(airC)
  const held = isHeldOn(facts, known)
  const iced = facts.iced.get(known.circuitId ?? '')
  const leftOut = sparedBecause(facts, known)
  const base = {
    caseId: known.id, name: known.name, leftOut, startC, startIs: readStart !== undefined ? 'read' : changedStart !== null ? 'changed' : 'usual', airC,
    tauHours, tauIs: changedTau !== null ? 'changed' : known.tauIsOwn ? 'own' : 'estimate', limitC, factor, measures: measures.map(measure => measure.kind),
    bareMinutes: bare.minutes, bareDeadline: leftOut === null && bare.minutes !== null ? deadlineAfter(bare.minutes, deadlineMinutes(snapshot, known, longCurve(known, { startC, ambientC: airC, limitC, tauHours, factor }))) : null,
  } as const
  const supplyC = held?.supplyC ?? null
  if (supplyC === null) return { ...base, measures: [...base.measures], heldOn: false, supplyC, plannedMinutes: bare.minutes, ends: bare.minutes === null ? null : 'limit' }
  const cooling = frozen || startC <= LOW_MARK_C ? null : holdTime({ kind: 'chilled', startC, ambientC: supplyC, tauHours: tauHours!, limitC: LOW_MARK_C, limitSide: 'lower' }).minutes
  const ways = [
    { ends: 'limit' as const, minutes: startC > limitC ? 0 : towards(supplyC).minutes },
    { ends: 'low-mark' as const, minutes: cooling },
    // Once its coil is iced the case counts as one with nothing running, from where it began.
    { ends: 'iced' as const, minutes: iced === undefined || bare.minutes === null ? null : iced + bare.minutes },
  ]
  const first = ways.reduce((best, way) => way.minutes !== null && way.minutes < (best.minutes ?? Infinity) ? way : best)
  return { ...base, measures: [...base.measures], heldOn: true, supplyC, plannedMinutes: first.minutes, ends: first.minutes === null ? null : first.ends }
}

/** The clock is followed in steps, but nothing is demanded of product within its limit. */
function deadlineAfter(bareMinutes: number, deadline: number | null): number | null {
  return deadline === null ? null : Math.max(deadline, bareMinutes)
}

interface Drift { startC: number, ambientC: number, limitC: number, tauHours: number | null, factor: number }

/** Every time of a drift is as many times as long as its time constant, or its mass by its conductance, is. */
function inputOf(known: SnapshotCase, { startC, ambientC, limitC, tauHours, factor }: Drift) {
  const input = holdInputOf(known.kind, { startC: tauHours === null ? Math.max(startC, COLDEST_C) : startC, ambientC, limitC, ...tauHours === null ? {} : { tauHours: tauHours * factor } })
  return input.kind === 'frozen' ? { ...input, uaWPerK: input.uaWPerK / factor } : input
}

/** The course with nothing running over ten hours, past the limit where it is reached before. */
function longCurve(known: SnapshotCase, drift: Drift): CurvePoint[] {
  // Against a limit that lies at the surroundings themselves the curve runs its full length.
  const { curve } = holdTime(inputOf(known, { ...drift, limitC: drift.ambientC }))
  return curve.filter(point => point.minute <= LONGEST_MINUTES)
}
