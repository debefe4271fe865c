/** One course of a warming chilled case fitted to weighed readings: start, surroundings and time constant together. */
export interface WeighedReading {
  /** hours since the course began; 0 for what was read before it */
  hours: number
  c: number
  /** how far the reading may lie from the course, one standard deviation, K */
  sdK: number
}

/** A reading, one standard deviation, K. Our own estimate. */
export const READING_SD_K = 0.3
/** One-sided 95 % of the normal distribution. */
export const CAREFUL_SDS = 1.645

export interface Course {
  startC: number
  towardC: number
  tauHours: number
  /** covariance of start (K), surroundings (K) and ln τ, row by row: ss, st, sl, tt, tl, ll */
  covariance: readonly [number, number, number, number, number, number]
}

/** Standard deviations of the two things known beforehand: ln τ, and the surroundings in K. Our own estimates. */
export const LN_TAU_SD = 0.4
export const AMBIENT_SD_K = 1.2
const MOST_STEPS = 100
const MOST_HALVINGS = 40
const ROUNDING = 1e-10
const SMALLEST_FALL = 1e-18

/**
 * Least squares by Gauss and Newton's method in three parameters, each step halved until the sum of
 * squares falls; the known surroundings and the prior time constant are two more measurements. The
 * covariance is (JᵀJ)⁻¹, not rescaled by the scatter of a handful of readings. Written without
 * arrays in the inner loop, as a long record asks for thousands of fits.
 * @param readings at least one
 */
export function fitCourse(readings: readonly WeighedReading[], ambientC: number, priorTauHours: number): Course {
  const lnPrior = Math.log(priorTauHours)
  let startC = readings[0]!.c
  let towardC = ambientC
  let lnTau = lnPrior
  let squares = squaresOf(readings, ambientC, lnPrior, startC, towardC, lnTau)
  let normal = normalOf(readings, ambientC, lnPrior, startC, towardC, lnTau)
  for (let count = 0; count < MOST_STEPS; count += 1) {
    const { inverse, descent } = normal
    const [ss, st, sl, tt, tl, ll] = inverse
    const step = [
      ss * descent[0] + st * descent[1] + sl * descent[2],
      st * descent[0] + tt * descent[1] + tl * descent[2],
      sl * descent[0] + tl * descent[1] + ll * descent[2],
    ] as const
    // Below this the sum of squares cannot tell one solution from the next any more: the last step is taken whole.
    const falls = step[0] * descent[0] + step[1] * descent[1] + step[2] * descent[2]
    const last = !(falls > ROUNDING * squares + SMALLEST_FALL)
    let part = 1
    let next = last ? -1 : Infinity
    for (let halving = 0; !last && halving < MOST_HALVINGS; halving += 1, part /= 2) {
      next = squaresOf(readings, ambientC, lnPrior, startC + part * step[0], towardC + part * step[1], lnTau + part * step[2])
      if (next < squares) break
    }
    if (!last && !(next < squares)) break
    startC += part * step[0]
    towardC += part * step[1]
    lnTau += part * step[2]
    squares = next
    normal = normalOf(readings, ambientC, lnPrior, startC, towardC, lnTau)
    if (last) break
  }
  return { startC, towardC, tauHours: Math.exp(lnTau), covariance: normal.inverse }
}

/** Temperature of a course, °C, `hours` after it began. */
export function courseC({ startC, towardC, tauHours }: Pick<Course, 'startC' | 'towardC' | 'tauHours'>, hours: number): number {
  return towardC + (startC - towardC) * Math.exp(-hours / tauHours)
}

/**
 * Minutes from `nowHours` until a course comes up to `limitC`, with one standard deviation by
 * propagating the covariance; null when it never does, 0 when it has.
 */
export function courseMinutes(course: Course, limitC: number, nowHours: number): { likely: number, sd: number } | null {
  const { startC, towardC, tauHours, covariance: [ss, st, sl, tt, tl, ll] } = course
  if (courseC(course, nowHours) >= limitC) return { likely: 0, sd: 0 }
  if (towardC <= limitC) return null
  const spans = Math.log((towardC - startC) / (towardC - limitC))
  const byStart = -tauHours / (towardC - startC)
  const byToward = tauHours / (towardC - startC) - tauHours / (towardC - limitC)
  const byLnTau = tauHours * spans
  const variance = ss * byStart ** 2 + tt * byToward ** 2 + ll * byLnTau ** 2
    + 2 * (st * byStart * byToward + sl * byStart * byLnTau + tl * byToward * byLnTau)
  return { likely: Math.max(0, 60 * (tauHours * spans - nowHours)), sd: 60 * Math.sqrt(Math.max(0, variance)) }
}

/** Standard deviations of the logarithm of a time that its careful end lies under the likely one: on synthetic cases not late in at least 95 of 100, with few readings and with many. */
const CAREFUL_LOG_SDS = 2

/**
 * The careful end of a time on a run's screens, minutes. With one or two readings the spread is as
 * large as the time itself, and taking multiples of it away would leave nothing: times are
 * proportions, so the spread is taken of their logarithm.
 */
export function carefulMinutes({ likely, sd }: { likely: number, sd: number }): number {
  return likely <= 0 ? 0 : likely * Math.exp(-CAREFUL_LOG_SDS * sd / likely)
}

function squaresOf(readings: readonly WeighedReading[], ambientC: number, lnPrior: number, startC: number, towardC: number, lnTau: number): number {
  const tauHours = Math.exp(lnTau)
  let sum = ((lnTau - lnPrior) / LN_TAU_SD) ** 2 + ((towardC - ambientC) / AMBIENT_SD_K) ** 2
  for (const { hours, c, sdK } of readings) sum += ((towardC + (startC - towardC) * Math.exp(-hours / tauHours) - c) / sdK) ** 2
  return sum
}

/** (JᵀJ)⁻¹ as its upper triangle, and the direction of descent −Jᵀr. */
function normalOf(readings: readonly WeighedReading[], ambientC: number, lnPrior: number, startC: number, towardC: number, lnTau: number) {
  const tauHours = Math.exp(lnTau)
  let a = 0
  let b = 0
  let c = 0
  let d = 1 / AMBIENT_SD_K ** 2
  let e = 0
  let f = 1 / LN_TAU_SD ** 2
  let x = 0
  let y = -(towardC - ambientC) / AMBIENT_SD_K ** 2
  let z = -(lnTau - lnPrior) / LN_TAU_SD ** 2
  for (const reading of readings) {
    const left = Math.exp(-reading.hours / tauHours)
    const weight = 1 / reading.sdK ** 2
    const residual = towardC + (startC - towardC) * left - reading.c
    const byToward = 1 - left
    const byLnTau = (startC - towardC) * left * reading.hours / tauHours
    a += weight * left * left
    b += weight * left * byToward
    c += weight * left * byLnTau
    d += weight * byToward * byToward
    e += weight * byToward * byLnTau
    f += weight * byLnTau * byLnTau
    x -= weight * left * residual
    y -= weight * byToward * residual
    z -= weight * byLnTau * residual
  }
  const aa = d * f - e * e
  const ab = c * e - b * f
  const ac = b * e - c * d
  const determinant = a * aa + b * ab + c * ac
  const inverse = [aa, ab, ac, a * f - c * c, b * c - a * e, a * d - b * b].map(value => value / determinant) as unknown as Course['covariance']
  return { inverse, descent: [x, y, z] as const }
}
