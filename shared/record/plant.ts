/** Pressures and currents of a round judged: what is wrong with the plant now, and what to do about it. */
import { isHandActive } from '../schemas/point-kinds'
import type { PointKind } from '../schemas/point-kinds'
import { ABOVE_CUT_OUT_PSI } from './gates'
import type { PlantFault } from './kinds/server'
import { pressureDifferenceWords, pressureWords } from '../utils/pressure'
import { groupName, pointName } from './select'
import type { OutageState, PressureState } from './state'
import type { SnapshotPoint } from './snapshot'

/** Suction this far under what was foretold is falling away, psi. Common practice, no source. */
export const BELOW_FORECAST_PSI = 5
/** Discharge above this share of the high cut-out is too near to it. Common practice, no source. */
export const OF_HIGH_CUT_OUT = 0.9

export interface PlantWarning {
  fault: PlantFault
  /** id of the suction group, or tag of the point */
  about: string
  words: string
  act: string
}

/**
 * What the last reading of each suction group and the last current of each point in hand say. Only
 * while points may be in hand: before and after, the controller sees to it. Sorted by fault, then by
 * what it is about. Pressures in psig, currents in A.
 */
export function plantWarnings(state: OutageState): PlantWarning[] {
  if (!['in-hand', 'dark', 'hand-back', 'settle'].includes(state.phase)) return []
  const pressures = state.snapshot.suctionGroups.flatMap((group) => {
    const last = lastPressure(state, group.id)
    return last ? [...suctionWarnings(state, group, last), ...dischargeWarnings(state, group, last)] : []
  })
  return [...pressures, ...currentWarnings(state)].sort((a, b) => a.fault.localeCompare(b.fault) || a.about.localeCompare(b.about))
}

/** The last pressure of a group since points began to go in hand; a questioned one does not count. */
function lastPressure(state: OutageState, groupId: string): PressureState | null {
  const since = state.inHandBegun?.at ?? state.darks[0]?.from ?? 0
  return state.pressures.filter(item => item.suctionGroupId === groupId && !item.questioned && item.at >= since).sort((a, b) => a.at - b.at || a.seq - b.seq).at(-1) ?? null
}

type Group = OutageState['snapshot']['suctionGroups'][number]

function suctionWarnings(state: OutageState, group: Group, { suctionPsig }: PressureState): PlantWarning[] {
  const name = groupName(state, group.id)
  const unit = state.snapshot.site.pressureUnit
  const on = heldOn(state, 'compressor', point => point.suctionGroupId === group.id)
  const act = dropWords(state, on)
  if (group.lowCutOutPsig !== null && suctionPsig < group.lowCutOutPsig + ABOVE_CUT_OUT_PSI) {
    return [{ fault: 'suction-near-cut-out', about: group.id, words: `${name}: suction ${pressureWords(suctionPsig, unit)} is within ${pressureDifferenceWords(ABOVE_CUT_OUT_PSI, unit)} of the low cut-out, ${pressureWords(group.lowCutOutPsig, unit)}`, act }]
  }
  // The cover is chosen so that suction settles at its target or above it.
  if (group.targetSuctionPsig !== null && on.length > 0 && suctionPsig <= group.targetSuctionPsig - BELOW_FORECAST_PSI) {
    return [{ fault: 'suction-below-forecast', about: group.id, words: `${name}: suction ${pressureWords(suctionPsig, unit)} is ${pressureDifferenceWords(group.targetSuctionPsig - suctionPsig, unit)} below the ${pressureWords(group.targetSuctionPsig, unit)} foretold`, act }]
  }
  return []
}

function dischargeWarnings(state: OutageState, group: Group, { dischargePsig }: PressureState): PlantWarning[] {
  const rack = state.snapshot.racks.find(item => item.id === group.rackId)
  if (dischargePsig === null || !rack || rack.highCutOutPsig === null || dischargePsig <= OF_HIGH_CUT_OUT * rack.highCutOutPsig) return []
  const unit = state.snapshot.site.pressureUnit
  const spare = state.snapshot.points.filter(point => point.kind === 'condenser-fan' && point.rackId === rack.id && !isOn(state, point)).sort(byTag)[0]
  const act = spare
    ? `Add a condenser fan: ${spare.tag} ${pointName(state, spare.tag)} on by hand.`
    : `Every condenser fan is on: ${dropWords(state, heldOn(state, 'compressor', point => point.rackId === rack.id)).replace(/^./, first => first.toLowerCase())} Look at the condenser.`
  return [{ fault: 'discharge-high', about: group.id, words: `${groupName(state, group.id)}: discharge ${pressureWords(dischargePsig, unit)} is above 90 % of the high cut-out, ${pressureWords(rack.highCutOutPsig, unit)}`, act }]
}

function currentWarnings(state: OutageState): PlantWarning[] {
  return state.snapshot.points.flatMap((point): PlantWarning[] => {
    const held = state.points[point.tag]
    if (held?.status !== 'hand' || held.value?.unit !== 'A' || point.ratedA === null || held.value.number <= point.ratedA) return []
    return [{ fault: 'current-above-plate', about: point.tag, words: `${point.tag} ${point.name}: ${held.value.number} A is more than the ${point.ratedA} A on its plate`, act: `Read it again; if it stays, put ${point.tag} off by hand and look for the cause.` }]
  })
}

function isOn(state: OutageState, point: SnapshotPoint): boolean {
  const held = state.points[point.tag]
  return held?.status === 'hand' && held.hand !== null && isHandActive(held.hand)
}

function heldOn(state: OutageState, kind: PointKind, where: (point: SnapshotPoint) => boolean): SnapshotPoint[] {
  return state.snapshot.points.filter(point => point.kind === kind && where(point) && isOn(state, point))
}

/** The smallest of the compressors on goes first; where its capacity is not known it counts as the largest. */
function dropWords(state: OutageState, on: readonly SnapshotPoint[]): string {
  const first = [...on].sort((a, b) => (a.capacityKw ?? Infinity) - (b.capacityKw ?? Infinity) || byTag(a, b))[0]
  if (!first) return 'No compressor is on by hand: see what still runs.'
  return `${on.length > 1 ? 'Drop the smallest compressor' : 'Drop the only compressor that is on'}: ${first.tag} ${pointName(state, first.tag)} off by hand.`
}

const byTag = (a: { tag: string }, b: { tag: string }) => a.tag.localeCompare(b.tag)
