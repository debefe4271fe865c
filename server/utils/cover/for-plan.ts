/** Cover of each suction group of a real plan: what is held on, against which load, and what suction does. */
import { assumed } from '~~/shared/record/measures'
import type { Plan } from '~~/shared/record/plan'
import { groupName } from '~~/shared/record/select'
import type { Snapshot, SnapshotPoint } from '~~/shared/record/snapshot'
import type { Compressor, CoverInput } from '~~/shared/schemas/cover'
import { MOST_COMPRESSORS } from '~~/shared/schemas/cover'
import { isHandActive } from '~~/shared/schemas/point-kinds'
import type { HandPosition } from '~~/shared/schemas/point-kinds'
import { isRefrigerantId } from '~~/shared/schemas/refrigerants'
import { planCover } from './plan-cover'
import type { Cover } from './plan-cover'
import { kpaOfPsig, saturation } from './refrigerants'
import { settleSet } from './settle-set'
import type { SettledSet } from './settle-set'

/** Load at the target suction as a part of the installed capacity, where nobody entered it: our own estimate. */
export const LOAD_SHARE = 0.6
/** Mains frequency at which a driven machine's capacity is meant, Hz, where nobody says otherwise. */
export const MAINS_HZ = 60

export interface CoverMachine { tag: string, name: string, kw: number | null, on: boolean }

export interface GroupCover {
  groupId: string
  name: string
  refrigerant: string
  machines: CoverMachine[]
  /** facts that are wanted before anything can be computed, each with what to enter; empty: all are there */
  missing: string[]
  load: { kw: number, entered: boolean } | null
  targetPsig: number | null
  lowCutOutPsig: number | null
  /** what the plan holds on, and where suction settles with it; null while facts are missing */
  held: SettledSet | null
  /** what the engine would hold on; null while facts are missing */
  best: Cover | null
}

type PlannedHands = readonly { tag: string, hand: HandPosition }[]
type Assumptions = Pick<Plan, 'assumptions'>

/** Cover of every suction group that has compressors on this controller, by rack and name as the snapshot has them. */
export function groupCovers(snapshot: Snapshot, hands: PlannedHands, plan: Assumptions): GroupCover[] {
  return snapshot.suctionGroups.flatMap((group) => {
    const compressors = snapshot.points.filter(point => point.kind === 'compressor' && point.suctionGroupId === group.id)
    return compressors.length === 0 ? [] : [groupCover(snapshot, group, compressors, hands, plan)]
  })
}

function groupCover(snapshot: Snapshot, group: Snapshot['suctionGroups'][number], compressors: SnapshotPoint[], hands: PlannedHands, plan: Assumptions): GroupCover {
  const handOf = new Map(hands.map(point => [point.tag, point.hand]))
  const on = compressors.filter(({ tag }) => { const hand = handOf.get(tag); return hand !== undefined && isHandActive(hand) }).map(point => point.tag)
  const rack = snapshot.racks.find(item => item.id === group.rackId)!
  const missing = missingFacts(rack, group, compressors)
  const entered = assumed(plan, 'load-kw', group.id)
  const installed = compressors.reduce((sum, point) => sum + (point.capacityKw ?? 0), 0)
  const load = entered !== null ? { kw: entered, entered: true } : missing.length > 0 ? null : { kw: installed * LOAD_SHARE, entered: false }
  const input = missing.length > 0 || load === null ? null : inputOf(snapshot, rack, group, compressors, handOf, load.kw, assumed(plan, 'mains-hz') ?? MAINS_HZ)
  return {
    groupId: group.id,
    name: groupName({ snapshot }, group.id),
    refrigerant: rack.refrigerant,
    machines: compressors.map(({ tag, name, capacityKw }) => ({ tag, name, kw: capacityKw, on: on.includes(tag) })),
    missing,
    load,
    targetPsig: group.targetSuctionPsig,
    lowCutOutPsig: group.lowCutOutPsig,
    held: input && settleSet(input, on),
    best: input && planCover({ ...input, compressors: input.compressors.filter(machine => mayBeHeld(compressors, machine.tag)) }),
  }
}

/** Only a machine with a guard that works in hand may be held on (I9); without any such machine there is nothing to pick. */
function mayBeHeld(compressors: readonly SnapshotPoint[], tag: string): boolean {
  return compressors.find(point => point.tag === tag)!.guards.length > 0
}

function missingFacts(rack: Snapshot['racks'][number], group: Snapshot['suctionGroups'][number], compressors: readonly SnapshotPoint[]): string[] {
  const unrated = compressors.filter(point => point.capacityKw === null || point.capacityKw <= 0).map(point => point.tag)
  return [
    ...isRefrigerantId(rack.refrigerant) ? [] : [`${rack.refrigerant || 'its refrigerant'} is none that Holdover computes: enter the rack's refrigerant as ${'R-448A'}, for example`],
    ...group.targetSuctionPsig === null ? ['the target suction: enter it with the suction group'] : [],
    ...group.lowCutOutPsig === null ? ['the low cut-out: enter it with the suction group'] : [],
    ...unrated.length > 0 ? [`the capacity of ${unrated.join(', ')}: enter it in kW with the point`] : [],
    ...compressors.length > MOST_COMPRESSORS ? [`at most ${MOST_COMPRESSORS} compressors a suction group can be weighed`] : [],
    ...isRefrigerantId(rack.refrigerant) && group.targetSuctionPsig !== null && 'reason' in saturation(rack.refrigerant, { kpa: kpaOfPsig(group.targetSuctionPsig, 0) }) ? [`a target suction at which ${rack.refrigerant} boils: ${group.targetSuctionPsig} psig is none`] : [],
  ]
}

function inputOf(snapshot: Snapshot, rack: Snapshot['racks'][number], group: Snapshot['suctionGroups'][number], compressors: readonly SnapshotPoint[], handOf: ReadonlyMap<string, HandPosition>, loadKw: number, baseHz: number): CoverInput | null {
  const { altitudeM } = snapshot.site
  if (!isRefrigerantId(rack.refrigerant)) return null
  const target = saturation(rack.refrigerant, { kpa: kpaOfPsig(group.targetSuctionPsig!, altitudeM) })
  if ('reason' in target) return null
  const machines = compressors.map((point): Compressor => {
    const drive = snapshot.points.find(item => item.kind === 'drive' && item.drives === point.tag)
    const hand = drive && (handOf.get(drive.tag) ?? drive.hand)
    const driveHz = speedOf(hand ?? null, baseHz)
    return { tag: point.tag, kw: point.capacityKw!, baseHz, ...(driveHz === undefined ? {} : { driveHz }) }
  })
  return { refrigerant: rack.refrigerant, altitudeM, group: group.stage, targetSstC: target.dewCelsius, load: { kw: loadKw }, lowCutOutPsig: group.lowCutOutPsig!, compressors: machines }
}

/** A drive's fixed speed, Hz; undefined: none is set, so its machine counts whole. */
function speedOf(hand: HandPosition | null, baseHz: number): number | undefined {
  if (typeof hand !== 'object' || hand === null) return undefined
  const hz = 'hz' in hand ? hand.hz : hand.percent / 100 * baseHz
  return hz > 0 ? hz : undefined
}

/** Compressors that are proposed on by hand in each suction group, by I4; a group whose facts are missing has no line. */
export function coverPicks(snapshot: Snapshot, plan: Assumptions): Map<string, ReadonlySet<string>> {
  const covers = groupCovers(snapshot, [], plan)
  return new Map(covers.flatMap(({ groupId, best }) => best === null ? [] : [[groupId, new Set(best.pick)] as const]))
}

/** Where a plan holds on more than its load by the figure that was entered or estimated (I4); a reason at one of them lets it stand. */
export function coverRefusals(snapshot: Snapshot, plan: Plan): string[] {
  return groupCovers(snapshot, plan.points, plan).flatMap(({ name, machines, held, load }) => {
    const on = machines.filter(machine => machine.on).map(machine => machine.tag)
    const reasoned = plan.points.some(point => on.includes(point.tag) && point.reason !== '')
    if (!held?.over || load === null || reasoned) return []
    return [`${name}: ${on.join(' + ')} hold ${held.kw.toFixed(0)} kW for a load of ${load.kw.toFixed(0)}${load.entered ? '' : ', an estimate'}: take one off, enter the load, or give a reason at one of them (I4)`]
  })
}
