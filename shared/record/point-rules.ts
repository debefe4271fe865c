/** What the signing of a point must fit: the safe order, its guards, its rest, the plan. */
import { handWords, isAlarm, isHandActive, isHandAtRest } from '../schemas/point-kinds'
import type { HandPosition } from '../schemas/point-kinds'
import type { Entry } from './entry'
import { happenedAt } from './entry'
import type { OutageState } from './state'

/** Minutes that a stopped compressor rests where its point says nothing (I5). */
const DEFAULT_MIN_OFF = 5

export function knownPoint(state: OutageState, tag: string): string[] {
  return state.points[tag] ? [] : [`there is no point ${tag}`]
}

export function stillHeld(state: OutageState, tag: string): boolean {
  const point = state.points[tag]
  return point !== undefined && point.status === 'hand' && point.exception === null
}

/** An exception names what is left in hand or unproven (I8); given beforehand it would cover what nobody has looked at. */
export function exceptionUnfit(state: OutageState, tag: string): string[] {
  const point = state.points[tag]
  if (!point) return knownPoint(state, tag)
  const open = point.status === 'hand' || point.status === 'returned' || point.tried !== null
  return open ? [] : [`${tag} is neither in hand nor waiting for its proof`]
}

/** What a compressor, a heater or a thing that keeps people safe may never do in hand (I2, I3, I9). */
function neverUnfit(state: OutageState, tag: string, hand: HandPosition): string[] {
  const { kind } = state.points[tag]!
  if (isHandActive(hand) && (kind === 'defrost-heater' || kind === 'hot-gas-valve')) return ['a defrost heater or hot-gas valve is never in hand on (I2)']
  if (isHandAtRest(hand) && (isAlarm(kind) || kind === 'machinery-room-ventilation' || kind === 'egress-light')) return ['it keeps people safe and is never off (I3)']
  const guards = state.snapshot.points.find(item => item.tag === tag)?.guards ?? []
  return isHandActive(hand) && kind === 'compressor' && guards.length === 0 ? ['no guard of this compressor works in hand (I9)'] : []
}

/** Order, minimum off time, and a reason for leaving the plan. */
export function pointInHandUnfit(state: OutageState, entry: Entry<'point-in-hand'>): string[] {
  const { tag, hand, reason } = entry.body
  const point = state.points[tag]
  if (!point) return knownPoint(state, tag)
  const missing = neverUnfit(state, tag, hand)
  const planned = state.plan.points.find(item => item.tag === tag)
  if (reason === '' && (!planned || handWords(planned.hand) !== handWords(hand))) missing.push(planned ? `the plan says ${handWords(planned.hand)}: give a reason` : 'the plan does not touch this point: give a reason')
  const minOff = state.snapshot.points.find(item => item.tag === tag)?.minOffMin ?? DEFAULT_MIN_OFF
  if (point.kind === 'compressor' && isHandActive(hand) && point.stoppedAt !== null && happenedAt(entry) - point.stoppedAt < minOff * 60_000) missing.push(`stopped less than ${minOff} minutes ago (I5)`)
  if (state.phase === 'in-hand' || state.phase === 'dark') {
    const before = (state.plan.order.find(line => line.tag === tag)?.after ?? []).filter(other => isWaiting(state, other))
    if (before.length > 0) missing.push(`comes after ${before.join(', ')}`)
  }
  return missing
}

/** A point of the plan that is neither in hand nor excused. */
export function isWaiting(state: OutageState, tag: string): boolean {
  const point = state.points[tag]
  return point !== undefined && (point.status === 'auto' || (point.tried !== null && point.status !== 'excused'))
}
