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

/** Groups of equal capacity that are looked for one by one; mostly the first has the answer, and sorting all sets is slow. */
const LOOKED_FOR = 4

/** The sets within `loadKw`, largest capacity first, those of equal capacity in order of preference. */
export function* setsWithin(sets: MachineSets, loadKw: number): Generator<number> {
  const { kwOf } = sets
  let below = loadKw + SAME_KW
  let isBelow = (kw: number) => kw <= below
  for (let looked = 0; looked < LOOKED_FOR; looked += 1) {
    const largestKw = largest(kwOf, isBelow)
    if (largestKw === null) return
    yield* preferred(sets, kw => isBelow(kw) && kw >= largestKw - SAME_KW)
    below = largestKw - SAME_KW
    isBelow = kw => kw < below
  }
  const rest = masksWhere(kwOf, isBelow).sort((a, b) => kwOf[b]! - kwOf[a]!)
  const byPreference = compareEqual(sets.machines)
  for (let from = 0; from < rest.length;) {
    let to = from + 1
    while (to < rest.length && kwOf[rest[to]!]! >= kwOf[rest[from]!]! - SAME_KW) to += 1
    yield* rest.slice(from, to).sort(byPreference)
    from = to
  }
}

/** The sets whose capacity passes, by bit mask. The empty set is no set. */
function masksWhere(kwOf: Float64Array, passes: (kw: number) => boolean): number[] {
  const found: number[] = []
  for (let mask = 1; mask < kwOf.length; mask += 1) if (passes(kwOf[mask]!)) found.push(mask)
  return found
}

/** The largest capacity of a set that passes, kW; null for none. */
function largest(kwOf: Float64Array, passes: (kw: number) => boolean): number | null {
  let found: number | null = null
  for (let mask = 1; mask < kwOf.length; mask += 1) if (passes(kwOf[mask]!) && (found === null || kwOf[mask]! > found)) found = kwOf[mask]!
  return found
}

/** The sets whose capacity passes, in order of preference. */
function preferred({ machines, kwOf }: MachineSets, passes: (kw: number) => boolean): number[] {
  const found = masksWhere(kwOf, passes)
  return found.length > 1 ? found.sort(compareEqual(machines)) : found
}

/** The preferred set of the smallest capacity above `loadKw`, or null when all machines together stay within it. */
export function smallestAbove(sets: MachineSets, loadKw: number): number | null {
  let smallestKw = Infinity
  for (let mask = 1; mask < sets.kwOf.length; mask += 1) if (sets.kwOf[mask]! > loadKw + SAME_KW && sets.kwOf[mask]! < smallestKw) smallestKw = sets.kwOf[mask]!
  return preferred(sets, kw => kw > loadKw + SAME_KW && kw <= smallestKw + SAME_KW)[0] ?? null
}

/** The tags of a set, in their order. */
export function tagsOf({ machines }: Pick<MachineSets, 'machines'>, mask: number): string[] {
  return machines.filter((_, bit) => (mask >> bit & 1) === 1).map(machine => machine.tag)
}
