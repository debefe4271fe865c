import type { ChenHeat } from './food-heat'
import { LN_TAU_SD } from './course'
import type { WeighedReading } from './course'
import { frozenAt, frozenMinutes } from './frozen'

/** Coldest temperature of the scale, °C; Chen's formula says nothing below −40. */
const COLDEST_C = -39.9
const NUDGE_K = 0.05
const MOST_STEPS = 50

/**
 * A warming frozen case. Its enthalpy balance has one course only, run through faster or slower: on
 * the scale g(T), minutes from the coldest temperature by the prior conductance, it is the straight
 * line g = from + speed·t.
 */
export interface FrozenCourse {
  from: number
  /** 1: as the prior conductance has it; 2: twice as fast */
  speed: number
  /** covariance of `from` (minutes) and ln speed: ff, fs, ss */
  covariance: readonly [number, number, number]
  minuteOf: (c: number) => number
  celsiusOf: (minute: number) => number
}

/**
 * Fits start and speed to weighed readings, with the prior conductance as one more measurement (ln, sd
 * 0.4 as for a chilled case's time constant). Enthalpy by Chen, as `frozenMinutes`.
 * @param readings at least one
 */
export function fitFrozenCourse(readings: readonly WeighedReading[], ambientC: number, heat: ChenHeat, kgPerWPerK: number): FrozenCourse {
  const clamped = (c: number) => Math.min(Math.max(c, COLDEST_C + NUDGE_K), ambientC - 2 * NUDGE_K)
  const minuteOf = (c: number) => frozenMinutes(COLDEST_C, clamped(c), ambientC, heat, kgPerWPerK)
  const celsiusOf = (minute: number) => frozenAt(COLDEST_C, ambientC, heat, kgPerWPerK, Math.max(0, minute))
  const rows = readings.map(({ hours, c, sdK }) => {
    const at = clamped(c)
    const perKelvin = (minuteOf(at + NUDGE_K) - minuteOf(at - NUDGE_K)) / (2 * NUDGE_K)
    return { minutes: 60 * hours, y: minuteOf(at), weight: 1 / Math.max(1e-6, sdK * perKelvin) ** 2 }
  })
  let from = rows[0]!.y
  let lnSpeed = 0
  let covariance: FrozenCourse['covariance'] = [0, 0, LN_TAU_SD ** 2]
  for (let count = 0; count < MOST_STEPS; count += 1) {
    const speed = Math.exp(lnSpeed)
    let [ff, fs, ss, x, y] = [0, 0, 1 / LN_TAU_SD ** 2, 0, -lnSpeed / LN_TAU_SD ** 2]
    for (const row of rows) {
      const residual = from + speed * row.minutes - row.y
      const bySpeed = speed * row.minutes
      ff += row.weight
      fs += row.weight * bySpeed
      ss += row.weight * bySpeed ** 2
      x -= row.weight * residual
      y -= row.weight * bySpeed * residual
    }
    const determinant = ff * ss - fs * fs
    covariance = [ss / determinant, -fs / determinant, ff / determinant]
    const step = covariance[1] * x + covariance[2] * y
    from += covariance[0] * x + covariance[1] * y
    // A step of the logarithm beyond 1 is cut: the speed would leap by more than its threefold.
    lnSpeed += Math.max(-1, Math.min(1, step))
    if (Math.abs(step) < 1e-9) break
  }
  return { from, speed: Math.exp(lnSpeed), covariance, minuteOf, celsiusOf }
}

/** Minutes from `nowMinutes` after the start until the course comes up to `limitC`, and one standard deviation; 0 when it has. */
export function frozenCourseMinutes({ from, speed, covariance: [ff, fs, ss], minuteOf }: FrozenCourse, limitC: number, nowMinutes: number): { likely: number, sd: number } {
  const whole = (minuteOf(limitC) - from) / speed
  const byFrom = -1 / speed
  const bySpeed = -whole
  const variance = ff * byFrom ** 2 + ss * bySpeed ** 2 + 2 * fs * byFrom * bySpeed
  return { likely: Math.max(0, whole - nowMinutes), sd: Math.sqrt(Math.max(0, variance)) }
}
