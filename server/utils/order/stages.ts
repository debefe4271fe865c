/**
 * The sequence of the trade: at which stage each point goes in hand, and is handed back.
 * Common practice, no published source: loads that add heat first, then what carries heat away,
 * then what feeds the machines, then the machines; and the machines first on the way back.
 */
import type { OrderDirection } from '~~/shared/schemas/plan-order'
import { isAlarm, isHandAtRest, isValve, type PointKind } from '~~/shared/schemas/point-kinds'
import { compareNaturally } from './compare'
import { sharesScope, type Placed } from './layout'

export type Stage = 'stopped-machine' | 'defrost' | 'evaporator-fan' | 'heat-rejection' | 'comfort' | 'liquid-valve' | 'machine' | 'alarm'

const IN_HAND: readonly Stage[] = ['stopped-machine', 'defrost', 'evaporator-fan', 'heat-rejection', 'comfort', 'liquid-valve', 'machine']
const HAND_BACK: readonly Stage[] = ['machine', 'liquid-valve', 'evaporator-fan', 'heat-rejection', 'comfort', 'defrost', 'alarm']

const STAGE_OF_KIND: Record<PointKind, Stage> = {
  'compressor': 'machine',
  'drive': 'machine',
  'condenser-fan': 'heat-rejection',
  'pump': 'heat-rejection',
  'evaporator-fan': 'evaporator-fan',
  'defrost-heater': 'defrost',
  'hot-gas-valve': 'defrost',
  'liquid-line-valve': 'liquid-valve',
  'expansion-valve': 'liquid-valve',
  'suction-regulator': 'liquid-valve',
  'suction-stop-valve': 'liquid-valve',
  'high-pressure-valve': 'heat-rejection',
  'flash-gas-valve': 'heat-rejection',
  'oil-valve': 'liquid-valve',
  'anti-sweat-heater': 'comfort',
  'light': 'comfort',
  'egress-light': 'comfort',
  'ventilation': 'comfort',
  'machinery-room-ventilation': 'comfort',
  'leak-alarm': 'comfort',
  'person-trapped-alarm': 'comfort',
  'other': 'comfort',
}

/** A drive stands at the stage of the machine that it drives. */
export function stageOf(place: Placed, direction: OrderDirection): Stage {
  const { kind } = place.machine
  if (direction === 'hand-back') return isAlarm(kind) ? 'alarm' : STAGE_OF_KIND[kind]
  if (kind === 'compressor' && isHandAtRest(place.machine.hand)) return 'stopped-machine'
  return STAGE_OF_KIND[kind]
}

/** Position of a stage in the sequence, from 0. */
export function stageRank(stage: Stage, direction: OrderDirection): number {
  return (direction === 'in-hand' ? IN_HAND : HAND_BACK).indexOf(stage)
}

/**
 * Whether the sequence has a point of stage `from` before the point `then` of stage `to`, given
 * that they share a scope and the first isn't left as found. A point left as found may come
 * anywhere, but for an alarm, which closes the hand back all the same. A machine asked off has no place among the other stages but two: before the heat rejection is
 * touched, and before the valves of its group are closed.
 */
export function stagesDemand(from: Stage, to: Stage, then: Placed, direction: OrderDirection): boolean {
  if (to === 'stopped-machine') return false
  if (to !== 'alarm' && isAsFound(then)) return false
  if (from === 'stopped-machine') {
    return to === 'heat-rejection' || (isValve(then.point.kind) && then.atRest)
  }
  return stageRank(from, direction) < stageRank(to, direction)
}

/**
 * Whether the sequence binds the two at all. Heat rejection is the whole rack's, whatever group its
 * points name. (Alarms close the hand back of everything; the caller sees to that.)
 */
export function stageBinds(first: Placed, then: Placed): boolean {
  if (sharesScope(first, then)) return true
  return first.rack === then.rack && (isHeatRejection(first) || isHeatRejection(then))
}

/** Medium-stage machines, the one best put in hand first first: on a drive, then running, then by place and tag. */
export function firstMediumFirst(medium: readonly Placed[]): Placed[] {
  return [...medium].sort((one, other) =>
    Number(other.driven) - Number(one.driven)
    || Number(other.point.running === true) - Number(one.point.running === true)
    || comparePlaces(one, other))
}

/** Medium-stage machines, the one best handed back last first: at a fixed speed, then by place and tag from the end. */
export function lastMediumFirst(medium: readonly Placed[]): Placed[] {
  return [...medium].sort((one, other) => Number(one.driven) - Number(other.driven) || -comparePlaces(one, other))
}

export function comparePlaces(one: Placed, other: Placed): number {
  return compareNaturally(placeOf(one), placeOf(other)) || compareNaturally(one.point.tag, other.point.tag)
}

export function isAsFound({ active, atRest }: Placed): boolean {
  return !active && !atRest
}

/** A drive is dealt with where its machine is. */
export function placeOf({ machine, point }: Placed): string {
  return machine.place ?? point.place ?? ''
}

function isHeatRejection(place: Placed): boolean {
  return STAGE_OF_KIND[place.machine.kind] === 'heat-rejection'
}
