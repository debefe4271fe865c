const MOST_HALVINGS = 200

/**
 * The root of a function between two arguments at which it has opposite signs
 * (or is 0), by halving until the two meet. Of several roots, one of them.
 */
export function rootBetween(valueAt: (x: number) => number, from: number, to: number): number {
  let [low, high] = [from, to]
  const lowValue = valueAt(low)
  if (lowValue === 0) {
    return low
  }
  for (let count = 0; count < MOST_HALVINGS; count += 1) {
    const middle = (low + high) / 2
    if (middle === low || middle === high) {
      break
    }
    if (Math.sign(valueAt(middle)) === Math.sign(lowValue)) {
      low = middle
    } else {
      high = middle
    }
  }
  return high
}
