import type { CoverInput } from '~~/shared/schemas/cover'
import { capacityKw, loadKw } from './capacity'
import { psigOf, saturation } from './refrigerants'
import { SATURATION_CURVES } from './saturation-curves'
import { SAME_KW } from './sets'
import { settledSst } from './settle'

/** No rack is followed further down than this, °C. */
const DEEPEST_SST_C = -100

export interface SettledSet {
  /** capacity at the target suction, kW */
  kw: number
  /** saturated suction at which it meets the load, °C, and as psig; null: nowhere within the refrigerant's saturation */
  sstC: number | null
  suctionPsig: number | null
  /** more capacity than load at the target (I4) */
  over: boolean
}

/** Where suction settles with exactly these machines on, be they within the load or above it. */
export function settleSet(plan: CoverInput, tags: readonly string[]): SettledSet {
  const machines = plan.compressors.filter(machine => tags.includes(machine.tag))
  const capacityAt = (sstC: number) => machines.reduce((sum, machine) => sum + capacityKw(machine, sstC, plan), 0)
  const excess = (sstC: number) => capacityAt(sstC) - loadKw(plan.load, sstC)
  const over = excess(plan.targetSstC) > SAME_KW
  const sstC = machines.length === 0 ? null : settledSst(excess, plan.targetSstC, over ? DEEPEST_SST_C : SATURATION_CURVES[plan.refrigerant].highestC)
  const answer = sstC === null ? null : saturation(plan.refrigerant, { celsius: sstC })
  return { kw: capacityAt(plan.targetSstC), sstC, suctionPsig: answer === null || 'reason' in answer ? null : psigOf(answer.dewKpa, plan.altitudeM), over }
}
