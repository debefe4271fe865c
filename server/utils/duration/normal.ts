/** Number of standard deviations above the mean below which a normal variable lies 19 times in 20. */
export const Z_19_IN_20 = 1.6448536269514722

/**
 * Probability that a standard normal variable is at most z.
 * Taylor series about 0: 1/2 + φ(z)·(z + z³/3 + z⁵/(3·5) + …), by G. Marsaglia, Evaluating the
 * Normal Distribution, Journal of Statistical Software 11 (2004). Error below 1e-14.
 */
export function normalBelow(z: number): number {
  if (z <= -8) return 0
  if (z >= 8) return 1
  let term = z
  let sum = z
  let before = Number.NaN
  for (let odd = 3; sum !== before; odd += 2) {
    before = sum
    term *= z * z / odd
    sum += term
  }
  return 0.5 + sum * Math.exp(-0.5 * z * z) / Math.sqrt(2 * Math.PI)
}
