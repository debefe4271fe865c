import { scaleLinear } from 'd3-scale'
import { inOrder, polyline } from './path'
import type { ChartReading, DrawnPoint } from './types'

/** Product temperatures of a record against time. Minutes from the moment control was first lost; one unit for all. */
export interface TemperatureInput {
  width: number
  height: number
  /** Without control, in order; `to` null while it lasts. */
  dark: readonly { from: number, to: number | null }[]
  /** Limits to draw, each once. */
  limits: readonly { value: number, label: string }[]
  cases: readonly { id: string, name: string, readings: readonly ChartReading[] }[]
}

export interface TemperatureGeometry {
  plot: { left: number, right: number, top: number, bottom: number }
  yTicks: { value: number, y: number }[]
  xTicks: { minute: number, x: number }[]
  /** `wordsY` is the baseline of the words in a span: at the top, or at the bottom where a limit runs through the top */
  dark: { x: number, width: number, wordsY: number }[]
  limits: { value: number, label: string, y: number }[]
  /** Names stand in one column at the right; `leader` leads from the last reading of a line to its name. */
  lines: { id: string, name: string, path: string, dots: (DrawnPoint & ChartReading)[], label: DrawnPoint, leader: string }[]
}

const margin = { left: 44, right: 148, top: 12, bottom: 30 } as const
/** Between the plot and the names: room for the leaders. */
const labelGap = 24

/** Pushes labels apart until they stand at least `gap` from each other, from the top down, then back inside `bottom`. */
export function spreadLabels(wanted: readonly number[], gap: number, bottom: number): number[] {
  const order = wanted.map((y, index) => ({ y, index })).sort((a, b) => a.y - b.y || a.index - b.index)
  order.forEach((label, rank) => {
    const above = order[rank - 1]
    if (above && label.y < above.y + gap) label.y = above.y + gap
  })
  for (let rank = order.length - 1; rank >= 0; rank--) {
    const below = order[rank + 1]
    const lowest = below ? below.y - gap : bottom
    if (order[rank]!.y > lowest) order[rank]!.y = lowest
  }
  return order.sort((a, b) => a.index - b.index).map(label => label.y)
}

/** The chart in a box from (0, 0) to (width, height). Without a single reading the axes still stand around the limits. */
export function temperatures({ width, height, dark, limits, cases }: TemperatureInput): TemperatureGeometry {
  const readings = cases.flatMap(item => item.readings)
  const minutes = [...readings.map(reading => reading.minute), ...dark.flatMap(span => [span.from, span.to ?? span.from])]
  const values = [...readings.map(reading => reading.value), ...limits.map(limit => limit.value)]
  const plot = { left: margin.left, right: Math.max(margin.left + 40, width - margin.right), top: margin.top, bottom: height - margin.bottom }
  const firstMinute = Math.min(0, ...minutes)
  const lastMinute = Math.max(firstMinute + 10, ...minutes)
  const x = scaleLinear([firstMinute - (lastMinute - firstMinute) * 0.04, lastMinute], [plot.left, plot.right]).clamp(true)
  const low = values.length ? Math.min(...values) : 0
  const high = values.length ? Math.max(...values) : 10
  const y = scaleLinear([low - 2, high + 2], [plot.bottom, plot.top]).nice(8)
  const step = [5, 10, 15, 30, 60, 120, 240, 480].find(minute => (lastMinute - firstMinute) / minute <= 8) ?? 1440
  const firstTick = Math.ceil(firstMinute / step) * step

  const lines = [...cases].filter(item => item.readings.length > 0).map((item) => {
    const dots = inOrder(item.readings).map(reading => ({ ...reading, x: x(reading.minute), y: y(reading.value) }))
    return { id: item.id, name: item.name, dots, path: polyline(dots) }
  })
  const labels = spreadLabels(lines.map(line => line.dots.at(-1)!.y), 18, plot.bottom)
  return {
    plot,
    yTicks: y.ticks(Math.max(2, Math.floor((plot.bottom - plot.top) / 28))).map(value => ({ value, y: y(value) })),
    xTicks: Array.from({ length: Math.floor((lastMinute - firstTick) / step) + 1 }, (_, index) => ({
      minute: firstTick + index * step,
      x: x(firstTick + index * step),
    })),
    dark: dark.map(span => ({ x: x(span.from), width: x(span.to ?? lastMinute) - x(span.from), wordsY: limits.some(limit => Math.abs(y(limit.value) - plot.top - 14) < 16) ? plot.bottom - 8 : plot.top + 18 })),
    limits: limits.map(limit => ({ ...limit, y: y(limit.value) })),
    lines: lines.map((line, index) => {
      const last = line.dots.at(-1)!
      const label = { x: plot.right + labelGap, y: labels[index]! }
      return { ...line, label, leader: polyline([{ x: last.x + 5, y: last.y }, { x: plot.right + 5, y: last.y }, { x: label.x - 3, y: label.y }]) }
    }),
  }
}
