/** The hand position that the product proposes for a point, before the technician changes it. */
import { isAlarm, isHandActive, isHandAtRest, type HandPosition, type PointKind } from '~~/shared/schemas/point-kinds'

export interface ProposablePoint {
  kind: PointKind
  /** The point's usual hand position, where the equipment names one. */
  hand?: HandPosition | null
}

export interface ProposalContext {
  /** Whether a compressor of the point's suction group will be held on. */
  compressorOn: boolean
  /** Whether the point's circuit has an expansion valve on this controller. */
  expansionValveInCircuit?: boolean
}

/**
 * The usual hand position of the point where rules I1, I2 and I3 let it stand, else what its kind
 * is for: heat off, fans on, liquid valves open only where a compressor of their group will be on.
 * A compressor without a usual position is proposed off: the cover picks those that go on. What
 * only its maker can say (a drive's speed, the valves of a carbon dioxide rack) is left as found.
 */
export function proposeHand(point: ProposablePoint, context: ProposalContext): HandPosition {
  const usual = point.hand ?? null
  return usual !== null && mayStand(point.kind, usual, context) ? usual : usualOfKind(point.kind, context)
}

function mayStand(kind: PointKind, hand: HandPosition, { compressorOn }: ProposalContext): boolean {
  if (kind === 'defrost-heater' || kind === 'hot-gas-valve') return !isHandActive(hand)
  if (kind === 'liquid-line-valve' || kind === 'expansion-valve') return compressorOn || !isHandActive(hand)
  if (isAlarm(kind) || kind === 'machinery-room-ventilation' || kind === 'egress-light') return !isHandAtRest(hand)
  return true
}

function usualOfKind(kind: PointKind, { compressorOn, expansionValveInCircuit }: ProposalContext): HandPosition {
  switch (kind) {
    case 'compressor':
    case 'defrost-heater':
      return 'off'
    case 'hot-gas-valve':
      return 'closed'
    case 'evaporator-fan':
    case 'condenser-fan':
    case 'pump':
    case 'anti-sweat-heater':
    case 'light':
    case 'egress-light':
    case 'ventilation':
    case 'machinery-room-ventilation':
      return 'on'
    case 'expansion-valve':
      return compressorOn ? 'open' : 'closed'
    case 'liquid-line-valve':
      // Closing both would shut liquid in between them (I12); the expansion valve is the one closed.
      if (!compressorOn && expansionValveInCircuit) return 'as-found'
      return compressorOn ? 'open' : 'closed'
    case 'suction-regulator':
    case 'suction-stop-valve':
      return compressorOn ? 'open' : 'as-found'
    case 'drive':
    case 'high-pressure-valve':
    case 'flash-gas-valve':
    case 'oil-valve':
    case 'leak-alarm':
    case 'person-trapped-alarm':
    case 'other':
      return 'as-found'
  }
}
