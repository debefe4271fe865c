import { holdTime } from './hold-time'

/** A chilled case held on by hand may cool no further than this, °C. */
export const LOW_MARK_C = -1
/** Supply air stands this far above the settled suction temperature, K. Our own estimate. */
export const SUPPLY_ABOVE_SUCTION_K = 5
const MS_PER_MINUTE = 60_000

/** A case whose refrigeration is held on by hand, and when its coil was last cleared. */
export interface HeldOn {
  startC: number
  tauHours: number
  /** Saturated suction temperature at which the cover settles, °C. */
  sstC: number
  /** End of its last defrost as ISO 8601, or null when unknown. */
  lastDefrostAt: string | null
  /** Usual gap between its defrosts, hours. */
  usualGapHours: number
  now: string
}

/**
 * `minutesToLowMark` is null when the supply air is no colder than the mark;
 * the defrost figures say for how long the coil has gathered ice, and how much
 * of the usual gap is left (below 0 when it is over), null when not known.
 */
export interface HeldOnHold {
  supplyC: number
  minutesToLowMark: number | null
  minutesSinceDefrost: number | null
  minutesOfGapLeft: number | null
}

/** How long a case can be held on by hand: toward its low mark, and with no defrost. */
export function heldOnHold(held: HeldOn): HeldOnHold {
  const supplyC = held.sstC + SUPPLY_ABOVE_SUCTION_K
  const { minutes } = holdTime({
    kind: 'chilled',
    startC: held.startC,
    ambientC: supplyC,
    tauHours: held.tauHours,
    limitC: LOW_MARK_C,
    limitSide: 'lower',
  })
  const minutesSinceDefrost = held.lastDefrostAt === null
    ? null
    : (Date.parse(held.now) - Date.parse(held.lastDefrostAt)) / MS_PER_MINUTE
  return {
    supplyC,
    minutesToLowMark: minutes,
    minutesSinceDefrost,
    minutesOfGapLeft: minutesSinceDefrost === null ? null : held.usualGapHours * 60 - minutesSinceDefrost,
  }
}
