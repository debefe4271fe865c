import type { Compressor } from '~~/shared/schemas/cover'

/** Capacities this close count as equal, kW. */
export const SAME_KW = 1e-9

/** The machines of a rack in the order of their tags, and the capacity of every set of them by bit mask. */
export interface MachineSets {
  machines: readonly Compressor[]
  kwOf: Float64Array
}

/** Adds up a figure of each machine for all sets of them, by bit mask. */
export function sumsOfSets(values: readonly number[]): Float64Array {
  const sums = new Float64Array(2 ** values.length)
  for (let mask = 1; mask < sums.length; mask += 1) {
    const lowest = 31 - Math.clz32(mask & -mask)
    sums[mask] = sums[mask & (mask - 1)]! + values[lowest]!
  }
  return sums
}

/** Which of two sets of equal capacity comes first: fewer machines, fewer to start, fewer run hours, then by tag. */
function compareEqual(machines: readonly Compressor[]): (a: number, b: number) => number {
  const count = sumsOfSets(machines.map(() => 1))
  const toStart = sumsOfSets(machines.map(machine => machine.running === true ? 0 : 1))
  const hours = sumsOfSets(machines.map(machine => machine.runHours ?? 0))
  return (a, b) => count[a]! - count[b]!
    || toStart[a]! - toStart[b]!
    || hours[a]! - hours[b]!
    // Bits follow the tags: of two sets as large, the one with the lowest bit that differs comes first.
    || ((a & (a ^ b) & -(a ^ b)) === 0 ? 1 : -1)
}

/** The sets within `loadKw`, largest capacity first, those of equal capacity in order of preference. */
export function* setsWithin({ machines, kwOf }: MachineSets, loadKw: number): Generator<number> {
  const within = Array.from(kwOf.keys()).filter(mask => mask > 0 && kwOf[mask]! <= loadKw + SAME_KW)
  within.sort((a, b) => kwOf[b]! - kwOf[a]!)
  const byPreference = compareEqual(machines)
  for (let from = 0; from < within.length;) {
    let to = from + 1
    while (to < within.length && kwOf[within[to]!]! >= kwOf[within[from]!]! - SAME_KW) {
      to += 1
    }
    yield* within.slice(from, to).sort(byPreference)
    from = to
  }
}

/** The preferred set of the smallest capacity above `loadKw`, or null when all machines together stay within it. */
export function smallestAbove({ machines, kwOf }: MachineSets, loadKw: number): number | null {
  const above = Array.from(kwOf.keys()).filter(mask => mask > 0 && kwOf[mask]! > loadKw + SAME_KW)
  const smallestKw = above.reduce((least, mask) => Math.min(least, kwOf[mask]!), Infinity)
  const equal = above.filter(mask => kwOf[mask]! <= smallestKw + SAME_KW)
  return equal.sort(compareEqual(machines))[0] ?? null
}

/** The tags of a set, in their order. */
export function tagsOf({ machines }: Pick<MachineSets, 'machines'>, mask: number): string[] {
  return machines.filter((_, bit) => (mask >> bit & 1) === 1).map(machine => machine.tag)
}
