import { scaleLinear } from 'd3-scale'
import { clipMinutes, firstMeeting, inOrder, joinForecast, polyline } from './path'
import type { ChartReading, DrawnPoint } from './types'

/** One case's trace laid straight. Temperatures in one unit; minutes from the moment control was lost. */
export interface StripInput {
  width: number
  height: number
  fromMinute: number
  toMinute: number
  usual: number
  limit: number
  readings: readonly ChartReading[]
  forecast: readonly ChartReading[]
}

export interface StripGeometry {
  limitY: number
  path: string
  forecastPath: string
  dots: (DrawnPoint & ChartReading)[]
  /** Minute at which the forecast meets the limit, or null. */
  meets: number | null
}

/** The strip in a box from (0, 0) to (width, height). The limit lies a quarter from the top unless readings pass it far. */
export function strip({ width, height, fromMinute, toMinute, usual, limit, readings, forecast }: StripInput): StripGeometry {
  const values = readings.map(reading => reading.value)
  const low = Math.min(usual, ...values, limit - 1)
  const span = limit - low
  const high = Math.max(limit + span * 0.3, ...values)
  const x = scaleLinear([fromMinute, Math.max(toMinute, fromMinute + 1)], [0, width])
  const y = scaleLinear([low - span * 0.08, high + span * 0.05], [height, 0])
  const place = (reading: ChartReading): DrawnPoint => ({ x: x(reading.minute), y: y(reading.value) })
  const ahead = joinForecast(readings, forecast)
  const meeting = firstMeeting(ahead, limit)
  const top = high + span * 0.05
  const leaves = firstMeeting(ahead, top)?.minute ?? toMinute
  return {
    limitY: y(limit),
    path: polyline(clipMinutes(readings, fromMinute, toMinute).map(place)),
    forecastPath: polyline(clipMinutes(ahead, fromMinute, Math.min(toMinute, leaves)).map(place)),
    dots: inOrder(readings)
      .filter(reading => reading.minute >= fromMinute && reading.minute <= toMinute)
      .map(reading => ({ ...reading, ...place(reading) })),
    meets: meeting?.minute ?? null,
  }
}
