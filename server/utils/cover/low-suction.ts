import type { CoverInput } from '~~/shared/schemas/cover'
import { capacityKw, loadKw } from './capacity'
import { kpaOfPsig, saturation } from './refrigerants'
import { SATURATION_CURVES } from './saturation-curves'
import { SAME_KW, sumsOfSets } from './sets'
import type { MachineSets } from './sets'
import { STEP_K } from './settle'

/** Suction stays this far above the low cut-out, psi. Common practice, no source. */
const CUT_OUT_MARGIN_PSI = 3

/** Lowest suction at which a cover may settle, psig: cut-out + 3 psi, and never a vacuum. */
export function lowestSuctionPsig(lowCutOutPsig: number): number {
  return Math.max(lowCutOutPsig + CUT_OUT_MARGIN_PSI, 0)
}

/**
 * A test for sets that settle below the lowest suction. A set within the load
 * settles at or above the target, so nothing is refused unless the target lies
 * below that; then a set is refused whose capacity has met the load before.
 */
export function lowSuctionTest(plan: CoverInput, { machines }: MachineSets): (mask: number) => boolean {
  const floorC = floorSstC(plan)
  if (plan.targetSstC >= floorC) {
    return () => false
  }
  const stops: number[] = []
  for (let sstC = plan.targetSstC; sstC < floorC && sstC <= SATURATION_CURVES[plan.refrigerant].highestC; sstC += STEP_K) {
    stops.push(sstC)
  }
  const excessAt = (sstC: number) => {
    const kwOf = sumsOfSets(machines.map(machine => capacityKw(machine, sstC, plan)))
    const load = loadKw(plan.load, sstC)
    return (mask: number) => kwOf[mask]! - load
  }
  const before = stops.map(excessAt)
  const atFloor = Number.isFinite(floorC) ? excessAt(floorC) : () => Infinity
  return mask => before.some(excess => excess(mask) >= 0) || atFloor(mask) > SAME_KW
}

/** Saturation (dew) at the lowest suction, °C; −∞ where its curve does not go so low, ∞ where it is beyond its curves. */
function floorSstC(plan: CoverInput): number {
  const kpa = kpaOfPsig(lowestSuctionPsig(plan.lowCutOutPsig), plan.altitudeM)
  const answer = saturation(plan.refrigerant, { kpa })
  if (!('reason' in answer)) {
    return answer.dewCelsius
  }
  const middle = saturation(plan.refrigerant, { celsius: 0 })
  return !('reason' in middle) && kpa < middle.dewKpa ? -Infinity : Infinity
}
