import { rootBetween } from './root'
import { SAME_KW } from './sets'

/** Width of the steps in which the suction is followed away from its target, K. */
export const STEP_K = 0.5

/**
 * The saturated suction temperature in °C at which capacity and load meet: the
 * first after `targetC` on the way to `endC`, or null when they don't meet up
 * to there. `excessAt` is capacity less load in kW; suction rises while it is
 * below 0 and falls while it is above.
 */
export function settledSst(excessAt: (sstC: number) => number, targetC: number, endC: number): number | null {
  const atTarget = excessAt(targetC)
  if (Math.abs(atTarget) <= SAME_KW) {
    return targetC
  }
  const direction = Math.sign(endC - targetC)
  let last = targetC
  while (last !== endC) {
    const next = Math.abs(endC - last) <= STEP_K ? endC : last + direction * STEP_K
    if (Math.sign(excessAt(next)) !== Math.sign(atTarget)) {
      return rootBetween(excessAt, last, next)
    }
    last = next
  }
  return null
}
