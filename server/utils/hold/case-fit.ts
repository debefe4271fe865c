/** One warming case fitted to what is known of it since control was lost. */
import { isFrozenKind } from '~~/shared/schemas/case-kinds'
import type { CaseKind } from '~~/shared/schemas/case-kinds'
import { carefulMinutes, courseC, courseMinutes, fitCourse, READING_SD_K } from './course'
import type { WeighedReading } from './course'
import { DEFAULT_FROZEN_HOLD } from './defaults'
import { chenHeat } from './food-heat'
import { compositionOf } from './foods'
import { fitFrozenCourse, frozenCourseMinutes } from './frozen-course'

/** A reading taken before the course began says where it began, this well, K: a case under control swings a little. Our own estimate. */
export const BEFORE_SD_K = 0.4
/** The start of a case that nobody read lies this near its usual temperature, K. Our own estimate. */
export const USUAL_SD_K = 1

export interface CaseEvidence {
  kind: CaseKind
  usualC: number
  limitC: number
  ambientC: number
  /** time constant known beforehand, hours; not asked of frozen cases */
  priorTauHours: number
  /** °C, read before the course began and near to it */
  before: readonly number[]
  /** minutes after the course began, ascending */
  since: readonly { minutes: number, c: number }[]
}

export interface CaseFit {
  /** fitted time constant, hours; null for frozen product, which has none */
  tauHours: number | null
  /** of the readings since the course began */
  n: number
  rmseK: number
  /** minutes from a moment (minutes after the course began) to the limit; null: never reached */
  minutesFrom: (minutes: number) => { likely: number, careful: number } | null
  /** likely temperature at a moment, °C */
  at: (minutes: number) => number
}

/**
 * Readings before the course began bear on its start alone: nothing was warming yet, so their times
 * say nothing of how fast it warms. Without any, the usual temperature stands in with a wide error.
 */
export function fitCase({ kind, usualC, limitC, ambientC, priorTauHours, before, since }: CaseEvidence): CaseFit {
  const starts: WeighedReading[] = before.map(c => ({ hours: 0, c, sdK: BEFORE_SD_K }))
  const readings = [
    ...(starts.length > 0 || (since.length > 0 && since[0]!.minutes <= 0) ? starts : [{ hours: 0, c: usualC, sdK: USUAL_SD_K }]),
    ...since.map(({ minutes, c }) => ({ hours: Math.max(0, minutes) / 60, c, sdK: READING_SD_K })),
  ]
  const { at, minutesFrom, tauHours } = isFrozenKind(kind) ? frozenFit(kind, readings, limitC, ambientC) : chilledFit(readings, limitC, ambientC, priorTauHours)
  const squares = since.reduce((sum, { minutes, c }) => sum + (at(minutes) - c) ** 2, 0)
  return { tauHours, n: since.length, rmseK: since.length === 0 ? 0 : Math.sqrt(squares / since.length), minutesFrom, at }
}

function chilledFit(readings: WeighedReading[], limitC: number, ambientC: number, priorTauHours: number): Pick<CaseFit, 'at' | 'minutesFrom' | 'tauHours'> {
  const course = fitCourse(readings, ambientC, priorTauHours)
  return {
    tauHours: course.tauHours,
    at: minutes => courseC(course, Math.max(0, minutes) / 60),
    minutesFrom: (minutes) => {
      const time = courseMinutes(course, limitC, minutes / 60)
      return time && { likely: time.likely, careful: carefulMinutes(time) }
    },
  }
}

function frozenFit(kind: keyof typeof DEFAULT_FROZEN_HOLD, readings: WeighedReading[], limitC: number, ambientC: number): Pick<CaseFit, 'at' | 'minutesFrom' | 'tauHours'> {
  const { uaPerKgWPerK, food } = DEFAULT_FROZEN_HOLD[kind]
  const course = fitFrozenCourse(readings, ambientC, chenHeat(compositionOf(food)), 1 / uaPerKgWPerK)
  return {
    tauHours: null,
    at: minutes => course.celsiusOf(course.from + course.speed * Math.max(0, minutes)),
    minutesFrom: (minutes) => {
      if (limitC >= ambientC) return null
      const time = frozenCourseMinutes(course, limitC, minutes)
      return { likely: time.likely, careful: carefulMinutes(time) }
    },
  }
}
