/**
 * A case's log made ready for judging: the readings that its class is judged by, in the rulebook's unit,
 * and the flags that the other readings raise.
 */
import type { AssessInput, AssessReading, ReadingMethod, TemperatureUnit } from '~~/shared/schemas/assess'
import type { EffectiveClass } from './types'
import { convertDifference, convertTemperature, isBelow, isOver } from './units'

export const MINUTE = 60_000

/** One judged reading: ms since the epoch, and degrees of the rulebook's unit. */
export interface LogReading {
  at: number
  value: number
}

export interface HoldingLog {
  readings: LogReading[]
  darkAt: number
  now: number
  intervalMs: number
  tooCold: boolean
  suspect: boolean
}

/**
 * The accuracy demanded of a thermometer that states none, by rulebook unit: food ±1 °C or ±2 °F,
 * air ±1.5 °C or ±3 °F (Food Code 4-203.11 and 4-203.12).
 */
const DEMANDED_ACCURACY: Record<TemperatureUnit, { food: number, air: number }> = {
  C: { food: 1, air: 1.5 },
  F: { food: 2, air: 3 },
}

/** A reading's accuracy in degrees of the rulebook's unit. */
function accuracyOf(reading: AssessReading, method: ReadingMethod, from: TemperatureUnit, to: TemperatureUnit): number {
  if (reading.accuracy !== undefined) return convertDifference(reading.accuracy, from, to)
  return method === 'air' ? DEMANDED_ACCURACY[to].air : DEMANDED_ACCURACY[to].food
}

/**
 * Reads an input into a log. A reading without a method is of the kind that its class is judged by.
 * The low mark looks at the value as it was read, since an added accuracy would hide cold.
 */
export function readLog(input: AssessInput, foodClass: EffectiveClass, unit: TemperatureUnit): HoldingLog {
  const log: HoldingLog = {
    readings: [],
    darkAt: Date.parse(input.darkAt),
    now: Date.parse(input.now),
    intervalMs: input.intervalMinutes * MINUTE,
    tooCold: false,
    suspect: false,
  }
  for (const reading of input.readings) {
    const method = reading.method ?? foodClass.judgedBy
    const seen = convertTemperature(reading.value, input.unit, unit)
    const value = input.site?.addAccuracy ? seen + accuracyOf(reading, method, input.unit, unit) : seen
    if (method !== foodClass.judgedBy) {
      log.suspect ||= isOver(value, foodClass.limit)
      continue
    }
    log.tooCold ||= foodClass.lowMark !== null && isBelow(seen, foodClass.lowMark)
    log.readings.push({ at: Date.parse(reading.at), value })
  }
  return log
}
