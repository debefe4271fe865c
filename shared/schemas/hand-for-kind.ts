import type { HandPosition, PointKind } from './point-kinds'
import { isAlarm, isHandActive, isHandAtRest, isValve } from './point-kinds'

/**
 * Why a point of this kind cannot have this usual hand position, or null when it can.
 * Rules I2 (no defrost heat by hand) and I3 (what keeps people safe is never off), and what the words mean:
 * a valve is open or closed, anything else on or off.
 */
export function handFault(kind: PointKind, hand: HandPosition): string | null {
  if (hand === 'as-found') return null
  if ((kind === 'defrost-heater' || kind === 'hot-gas-valve') && isHandActive(hand)) return 'A defrost heater or hot-gas valve is never held on'
  if ((isAlarm(kind) || kind === 'machinery-room-ventilation' || kind === 'egress-light') && isHandAtRest(hand)) return 'It keeps people safe and is never off'
  if (kind === 'other') return null
  if (isValve(kind)) return valveFault(hand)
  if (hand === 'open' || hand === 'closed') return 'Only a valve is open or closed; write on or off'
  if (kind === 'drive' && hand === 'on') return 'A drive is held at a speed; write it as 45 Hz or 60 %'
  return typeof hand === 'object' && !VARIABLE.has(kind) ? 'A point of this kind has no speed; write on or off' : null
}

function valveFault(hand: HandPosition): string | null {
  if (hand === 'on' || hand === 'off') return 'A valve is held open or closed'
  return typeof hand === 'object' && 'hz' in hand ? 'A valve has an opening in %, not a speed' : null
}

/** Kinds that can be held at a speed or level. */
const VARIABLE: ReadonlySet<PointKind> = new Set([
  'compressor', 'drive', 'condenser-fan', 'pump', 'evaporator-fan', 'anti-sweat-heater', 'light', 'ventilation', 'machinery-room-ventilation',
])
