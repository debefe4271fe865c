/** Builds logs for the tests: minutes since control was lost, and degrees. */
import type { AssessInput, AssessReading } from '../../../shared/schemas/assess'

export const DARK_AT = Date.UTC(2026, 2, 1, 2)

/** The instant so many minutes after control was lost. */
export function at(minutes: number): string {
  return new Date(DARK_AT + minutes * 60_000).toISOString()
}

export type Point = [minutes: number, value: number, more?: Partial<AssessReading>]

export interface LogOptions {
  now?: number
  unit?: 'C' | 'F'
  intervalMinutes?: number
  site?: AssessInput['site']
  version?: string
}

const IN_FAHRENHEIT = new Set(['us-food-code-2022', 'us-wa-doh', 'us-sf-dph', 'us-mi-county'])

/** A log for `rulebook/class`; `now` is the last reading unless given, the unit that of the rulebook. */
export function log(row: string, points: Point[], options: LogOptions = {}): AssessInput {
  const [rulebook = '', foodClass = ''] = row.split('/')
  return {
    rulebook,
    foodClass,
    ...(options.version === undefined ? {} : { version: options.version }),
    unit: options.unit ?? (IN_FAHRENHEIT.has(rulebook) ? 'F' : 'C'),
    darkAt: at(0),
    intervalMinutes: options.intervalMinutes ?? 10,
    readings: points.map(([minutes, value, more]) => ({ at: at(minutes), value, ...more })),
    now: at(options.now ?? points.at(-1)?.[0] ?? 0),
    ...(options.site === undefined ? {} : { site: options.site }),
  }
}
