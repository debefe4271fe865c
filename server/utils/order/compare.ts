/**
 * Compares as a person counts: "Aisle 2" before "Aisle 10". Equal only when the texts are equal.
 * Written out rather than left to the locale, so that phone and server agree to the letter.
 */
export function compareNaturally(one: string, other: string): number {
  const left = one.match(/\d+|\D+/g) ?? []
  const right = other.match(/\d+|\D+/g) ?? []
  for (let index = 0; index < Math.min(left.length, right.length); index += 1) {
    const difference = compareParts(left[index]!, right[index]!)
    if (difference !== 0) return difference
  }
  return left.length - right.length || compareText(one, other)
}

function compareParts(one: string, other: string): number {
  const numbers = /^\d/.test(one) && /^\d/.test(other)
  return numbers ? Number(one) - Number(other) : compareText(one, other)
}

function compareText(one: string, other: string): number {
  return one < other ? -1 : one > other ? 1 : 0
}
