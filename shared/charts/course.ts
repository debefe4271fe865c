import { scaleLinear } from 'd3-scale'
import { inOrder, polyline } from './path'
import type { ChartReading, DrawnPoint } from './types'

/** One case's temperatures against its limit, with what the rulebook said at each time along the bottom. Minutes from any moment. */
export interface CourseInput {
  width: number
  height: number
  limit: number
  readings: readonly ChartReading[]
  /** one after another */
  bands: readonly { verdict: string, from: number, to: number }[]
  darkMinute: number
  nowMinute: number
  /** when the verdict gets worse if the product stays as it is; null: never */
  deadlineMinute: number | null
}

export interface CourseBandDrawn { verdict: string, x: number, width: number, /** there is room for words of so many px */ room: number }

export interface CourseGeometry {
  plot: { left: number, right: number, top: number, bottom: number }
  strip: { y: number, height: number }
  yTicks: { value: number, y: number }[]
  xTicks: { minute: number, x: number }[]
  limitY: number
  line: string
  /** from the last reading to now, at its value: what is judged while nobody measures */
  held: string
  dots: (DrawnPoint & ChartReading)[]
  bands: CourseBandDrawn[]
  darkX: number
  nowX: number
  deadlineX: number | null
}

const margin = { left: 44, right: 12, top: 26, bottom: 30 } as const
const STRIP = 28
const GAP = 10
/** Words of a time take so many px. */
const TICK_WORDS = 96
const STEPS = [1, 2, 5, 10, 15, 30, 60, 120, 240, 480, 720] as const

/** The chart in a box from (0, 0) to (width, height). A deadline stretches the axis only where that at most doubles it. */
export function course({ width, height, limit, readings, bands, darkMinute, nowMinute, deadlineMinute }: CourseInput): CourseGeometry {
  const plot = { left: margin.left, right: Math.max(margin.left + 40, width - margin.right), top: margin.top, bottom: height - margin.bottom - STRIP - GAP }
  const sorted = inOrder(readings)
  const from = Math.min(darkMinute, sorted[0]?.minute ?? darkMinute)
  const end = Math.max(nowMinute, sorted.at(-1)?.minute ?? nowMinute, from + 10)
  const shown = deadlineMinute !== null && deadlineMinute <= end + Math.max(end - from, 60)
  const to = shown ? Math.max(end, deadlineMinute) : end
  const x = scaleLinear([from, to], [plot.left, plot.right]).clamp(true)
  const values = [...sorted.map(reading => reading.value), limit]
  const y = scaleLinear([Math.min(...values) - 2, Math.max(...values) + 2], [plot.bottom, plot.top]).nice(6)
  const dots = sorted.map(reading => ({ ...reading, x: x(reading.minute), y: y(reading.value) }))
  const last = dots.at(-1)
  const most = Math.max(2, Math.floor((plot.right - plot.left) / TICK_WORDS))
  const step = STEPS.find(minutes => (to - from) / minutes <= most) ?? 1440
  const first = Math.ceil(from / step) * step
  return {
    plot,
    strip: { y: plot.bottom + GAP, height: STRIP },
    yTicks: y.ticks(Math.max(2, Math.floor((plot.bottom - plot.top) / 32))).map(value => ({ value, y: y(value) })),
    xTicks: Array.from({ length: Math.floor((to - first) / step) + 1 }, (_, index) => ({ minute: first + index * step, x: x(first + index * step) })),
    limitY: y(limit),
    line: polyline(dots),
    held: last && nowMinute > last.minute ? polyline([last, { x: x(nowMinute), y: last.y }]) : '',
    dots,
    bands: bands.map(band => ({ verdict: band.verdict, x: x(band.from), width: Math.max(x(band.to) - x(band.from), 2), room: x(band.to) - x(band.from) - 16 })),
    darkX: x(darkMinute),
    nowX: x(nowMinute),
    deadlineX: shown ? x(deadlineMinute) : null,
  }
}
