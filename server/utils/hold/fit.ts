import type { FitInput } from '~~/shared/schemas/hold'
import { gaussNewton } from './gauss-newton'
import type { Triple } from './gauss-newton'

/** Standard deviations that weigh readings, prior time constant (of its logarithm) and ambient. */
const READING_SD_K = 0.3
const LN_TAU_SD = 0.4
const AMBIENT_SD_K = 1.2
/** One-sided 95 % of the normal distribution. */
const CAREFUL_SDS = 1.645
const MINUTES_PER_HOUR = 60
const MS_PER_HOUR = 3_600_000

/**
 * `tauHours` as fitted; minutes from `now` to the limit, or null when it is
 * never reached; root mean square of (model − reading) in K; count of readings.
 */
export interface HoldFit {
  tauHours: number
  minutesToLimit: { likely: number, careful: number } | null
  rmseK: number
  n: number
}

/**
 * Fits start, ambient and time constant of one case to its readings, with the
 * known ambient and the prior time constant as two more measurements, and says
 * when the product comes up to `limitC`. *Careful* is the early end: the
 * likely time less 1.645 standard deviations, from the covariance (JᵀJ)⁻¹,
 * which is not rescaled by the scatter of a handful of readings. The first
 * reading is not taken for the true start: its own error would go into the
 * whole curve. Takes input that `parseFitInput` has passed.
 */
export function fitHold(input: FitInput): HoldFit {
  const firstMs = Date.parse(input.readings[0]!.at)
  const readings = input.readings.map(({ at, c }) => ({ hours: (Date.parse(at) - firstMs) / MS_PER_HOUR, c }))
  const nowHours = (Date.parse(input.now) - firstMs) / MS_PER_HOUR
  const lnPrior = Math.log(input.priorTauHours)

  const { solution, covariance } = gaussNewton([readings[0]!.c, input.ambientC, lnPrior], (guess) => {
    const [startC, towardC, lnTau] = guess
    const rows = readings.map(({ hours, c }) => {
      const left = Math.exp(-hours / Math.exp(lnTau))
      return {
        residual: (modelC(guess, hours) - c) / READING_SD_K,
        slopes: [
          left / READING_SD_K,
          (1 - left) / READING_SD_K,
          (startC - towardC) * left * hours / Math.exp(lnTau) / READING_SD_K,
        ] as Triple,
      }
    })
    return [
      ...rows,
      { residual: (lnTau - lnPrior) / LN_TAU_SD, slopes: [0, 0, 1 / LN_TAU_SD] },
      { residual: (towardC - input.ambientC) / AMBIENT_SD_K, slopes: [0, 1 / AMBIENT_SD_K, 0] },
    ]
  })

  const squares = readings.reduce((sum, { hours, c }) => sum + (modelC(solution, hours) - c) ** 2, 0)
  return {
    tauHours: Math.exp(solution[2]),
    minutesToLimit: minutesToLimit(solution, covariance, input.limitC, nowHours),
    rmseK: Math.sqrt(squares / readings.length),
    n: readings.length,
  }
}

function modelC([startC, towardC, lnTau]: Triple, hours: number): number {
  return towardC + (startC - towardC) * Math.exp(-hours / Math.exp(lnTau))
}

function minutesToLimit(
  solution: Triple, covariance: readonly Triple[], limitC: number, nowHours: number,
): HoldFit['minutesToLimit'] {
  const [startC, towardC, lnTau] = solution
  if (modelC(solution, nowHours) >= limitC) {
    return { likely: 0, careful: 0 }
  }
  if (towardC <= limitC) {
    return null
  }
  const tauHours = Math.exp(lnTau)
  const spans = Math.log((towardC - startC) / (towardC - limitC))
  const likely = Math.max(0, MINUTES_PER_HOUR * (tauHours * spans - nowHours))
  const gradient: Triple = [
    -tauHours / (towardC - startC),
    tauHours / (towardC - startC) - tauHours / (towardC - limitC),
    tauHours * spans,
  ]
  const variance = gradient.reduce((sum, slope, row) =>
    sum + slope * gradient.reduce((inner, other, column) => inner + covariance[row]![column]! * other, 0), 0)
  const sd = MINUTES_PER_HOUR * Math.sqrt(variance)
  return { likely, careful: Math.max(0, likely - CAREFUL_SDS * sd) }
}
