/**
 * Temperatures in two units. A limit stays in its rulebook's unit and the reading is converted, never the limit.
 */
import type { TemperatureUnit } from '~~/shared/schemas/assess'

/** Degrees within which two temperatures are the same: 39.2 °F is 4 °C. */
export const SAME_TEMPERATURE = 1e-6

/** A temperature in another unit; returned untouched when the unit is its own. */
export function convertTemperature(value: number, from: TemperatureUnit, to: TemperatureUnit): number {
  if (from === to) return value
  return to === 'F' ? value * 1.8 + 32 : (value - 32) / 1.8
}

/** A difference of temperatures in another unit, which has no zero to move. */
export function convertDifference(degrees: number, from: TemperatureUnit, to: TemperatureUnit): number {
  if (from === to) return degrees
  return to === 'F' ? degrees * 1.8 : degrees / 1.8
}

/** True when a temperature is over a mark, the mark itself being allowed. */
export function isOver(value: number, mark: number): boolean {
  return value > mark + SAME_TEMPERATURE
}

/** True when a temperature is at a mark or over it. */
export function isAtOrOver(value: number, mark: number): boolean {
  return value >= mark - SAME_TEMPERATURE
}

/** True when a temperature is below a mark, the mark itself being allowed. */
export function isBelow(value: number, mark: number): boolean {
  return value < mark - SAME_TEMPERATURE
}
