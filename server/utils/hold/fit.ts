import type { FitInput } from '~~/shared/schemas/hold'
import { CAREFUL_SDS, courseC, courseMinutes, fitCourse, READING_SD_K } from './course'

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
  const readings = input.readings.map(({ at, c }) => ({ hours: (Date.parse(at) - firstMs) / MS_PER_HOUR, c, sdK: READING_SD_K }))
  const course = fitCourse(readings, input.ambientC, input.priorTauHours)
  const minutes = courseMinutes(course, input.limitC, (Date.parse(input.now) - firstMs) / MS_PER_HOUR)
  const squares = readings.reduce((sum, { hours, c }) => sum + (courseC(course, hours) - c) ** 2, 0)
  return {
    tauHours: course.tauHours,
    minutesToLimit: minutes === null ? null : { likely: minutes.likely, careful: Math.max(0, minutes.likely - CAREFUL_SDS * minutes.sd) },
    rmseK: Math.sqrt(squares / readings.length),
    n: readings.length,
  }
}
