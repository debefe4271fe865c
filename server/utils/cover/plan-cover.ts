import type { Compressor, CoverInput } from '~~/shared/schemas/cover'
import { capacityKw, loadKw } from './capacity'
import { lowestSuctionPsig, lowSuctionTest } from './low-suction'
import { psigOf, saturation } from './refrigerants'
import { SATURATION_CURVES } from './saturation-curves'
import { settledSst } from './settle'
import { setsWithin, smallestAbove, sumsOfSets, tagsOf } from './sets'
import type { MachineSets } from './sets'
import { farAboveTarget, leftOutBecause, passedOver, R744_STANDSTILL, whyNothing } from './why'

/** No rack is followed further down than this, °C. */
const DEEPEST_SST_C = -100

/**
 * `pick`: tags to hold on, in their order, with their capacity at the target
 * and where suction settles (°C, psig); these are null when nothing is picked,
 * or when capacity and load don't meet within the refrigerant's saturation.
 * `over`: the smallest set above the load. `none`: why nothing is picked.
 */
export interface Cover {
  pick: string[]
  kw: number
  sstC: number | null
  suctionPsig: number | null
  over: { tags: string[], kw: number, sstC: number | null } | null
  none: string | null
  why: string[]
}

/**
 * The compressors to hold on by hand: of all sets the one with the largest
 * capacity within the load at the target suction. Too little capacity lets the
 * cases drift up slowly; too much pulls suction down to cut-out or vacuum, so
 * the error is made on the safe side. Takes input that `parseCoverInput` has
 * passed. Enumeration, 2¹⁶ sets at most. Common practice, no source.
 */
export function planCover(plan: CoverInput): Cover {
  const target = { group: plan.group, targetSstC: plan.targetSstC }
  const leftOut = plan.compressors.map(machine => leftOutBecause(machine, capacityKw(machine, plan.targetSstC, target)))
  const machines = plan.compressors
    .filter((_, index) => leftOut[index] === null)
    .sort((a, b) => a.tag < b.tag ? -1 : 1)
  const sets: MachineSets = {
    machines,
    kwOf: sumsOfSets(machines.map(machine => capacityKw(machine, plan.targetSstC, target))),
  }
  const load = loadKw(plan.load, plan.targetSstC)
  const settles = (mask: number, endC: number) => settledSst(excessOf(plan, machines, mask), plan.targetSstC, endC)

  const { mask, refused } = firstWithin(plan, sets, load)
  const sstC = mask === null ? null : settles(mask, SATURATION_CURVES[plan.refrigerant].highestC)
  const suctionPsig = sstC === null ? null : dewPsig(plan, sstC)
  const overMask = smallestAbove(sets, load)
  const lowestPsig = lowestSuctionPsig(plan.lowCutOutPsig)

  return {
    pick: mask === null ? [] : tagsOf(sets, mask),
    kw: mask === null ? 0 : sets.kwOf[mask]!,
    sstC,
    suctionPsig,
    over: overMask === null
      ? null
      : { tags: tagsOf(sets, overMask), kw: sets.kwOf[overMask]!, sstC: settles(overMask, DEEPEST_SST_C) },
    none: mask === null ? whyNothing(machines.length, load, refused.length, lowestPsig) : null,
    why: [
      ...leftOut.filter(text => text !== null),
      ...passedOver(refused.map(set => tagsOf(sets, set)), lowestPsig),
      ...(mask === null ? [] : farAboveTarget(suctionPsig, dewPsig(plan, plan.targetSstC))),
      ...(plan.refrigerant === 'R-744' ? [R744_STANDSTILL] : []),
    ],
  }
}

/** The first set within the load that doesn't settle too low, and those refused before it. */
function firstWithin(plan: CoverInput, sets: MachineSets, load: number): { mask: number | null, refused: number[] } {
  const settlesTooLow = lowSuctionTest(plan, sets)
  const refused: number[] = []
  for (const mask of setsWithin(sets, load)) {
    if (!settlesTooLow(mask)) {
      return { mask, refused }
    }
    refused.push(mask)
  }
  return { mask: null, refused }
}

/** Capacity of a set less the load, kW, by saturated suction temperature. */
function excessOf(plan: CoverInput, machines: readonly Compressor[], mask: number): (sstC: number) => number {
  const picked = machines.filter((_, bit) => (mask >> bit & 1) === 1)
  return sstC => picked.reduce((sum, machine) => sum + capacityKw(machine, sstC, plan), 0) - loadKw(plan.load, sstC)
}

function dewPsig(plan: CoverInput, sstC: number): number | null {
  const answer = saturation(plan.refrigerant, { celsius: sstC })
  return 'reason' in answer ? null : psigOf(answer.dewKpa, plan.altitudeM)
}
