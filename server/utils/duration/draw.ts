/**
 * A stream of uniform numbers in the open interval (0, 1), the same for the same seed.
 * Generator sfc32 by C. Doty-Humphrey (PractRand): 128 bits of state, counter against short cycles.
 */
export function uniformStream(seed: number): () => number {
  let a = 0
  let b = seed | 0
  let c = (seed ^ 0x9E3779B9) | 0
  let counter = 1
  const next = () => {
    const sum = (((a + b) | 0) + counter) | 0
    counter = (counter + 1) | 0
    a = b ^ (b >>> 9)
    b = (c + (c << 3)) | 0
    c = (((c << 21) | (c >>> 11)) + sum) | 0
    // Half a step up: neither 0 nor 1 may come out, since logarithms are taken.
    return ((sum >>> 0) + 0.5) / 4294967296
  }
  for (let warmUp = 0; warmUp < 15; warmUp += 1) next()
  return next
}

/**
 * A drawer of durations: beta on [shortest, longest] with shapes 1 + 4(m − a)/(b − a) and
 * 1 + 4(b − m)/(b − a), whose mean is (a + 4m + b)/6. In the units of its arguments.
 * Algorithm BB of R. C. H. Cheng, Generating beta variates with nonintegral shape parameters,
 * Communications of the ACM 21 (1978).
 */
export function durationDrawer(shortest: number, likely: number, longest: number): (uniform: () => number) => number {
  const range = longest - shortest
  if (range <= 0) return () => shortest
  const rise = 1 + 4 * (likely - shortest) / range
  const fall = 1 + 4 * (longest - likely) / range
  // With one shape 1 the distribution function is a power and is inverted at once.
  if (rise <= 1) return uniform => longest - range * uniform() ** (1 / fall)
  if (fall <= 1) return uniform => shortest + range * uniform() ** (1 / rise)

  const low = Math.min(rise, fall)
  const high = Math.max(rise, fall)
  const total = rise + fall
  const scale = Math.sqrt((total - 2) / (2 * low * high - total))
  const slope = low + 1 / scale
  const logFour = Math.log(4)
  const onePlusLogFive = 1 + Math.log(5)
  return (uniform) => {
    for (;;) {
      const first = uniform()
      const second = uniform()
      const v = scale * Math.log(first / (1 - first))
      const w = low * Math.exp(v)
      const z = first * first * second
      const r = slope * v - logFour
      const s = low + r - w
      if (s + onePlusLogFive < 5 * z) {
        const t = Math.log(z)
        if (s < t && r + total * Math.log(total / (high + w)) < t) continue
      }
      return shortest + range * (low === rise ? w : high) / (high + w)
    }
  }
}
