import { scaleLinear } from 'd3-scale'

/** One step's three planned times and what it took, minutes. */
export interface StepStrip { id: string, name: string, shortest: number, likely: number, longest: number, took: readonly number[] }

export interface StepStripsInput {
  width: number
  steps: readonly StepStrip[]
  /** Width kept at the left for names; 0 puts each name above its strip. */
  labelWidth: number
}

export interface StepStripRow {
  id: string
  name: string
  nameY: number
  /** Middle of the strip. */
  y: number
  from: number
  width: number
  likelyX: number
  /** What each outage took; outside: shorter than the shortest or longer than the longest. */
  marks: { x: number, outside: boolean }[]
}

export interface StepStripsGeometry { width: number, height: number, left: number, right: number, axisY: number, ticks: { minute: number, x: number }[], rows: StepStripRow[] }

/** Half the height of a strip. */
export const STRIP_HALF = 9

/** Strips on one scale from 0, in the order given; the height follows from their count. */
export function stepStrips({ width, steps, labelWidth }: StepStripsInput): StepStripsGeometry {
  const left = labelWidth === 0 ? 10 : labelWidth
  const right = Math.max(left + 40, width - 14)
  const end = Math.max(10, ...steps.flatMap(step => [step.longest, ...step.took])) * 1.05
  const x = scaleLinear([0, end], [left, right])
  const pitch = labelWidth === 0 ? 60 : 40
  const rows = steps.map((step, index): StepStripRow => {
    const y = (labelWidth === 0 ? 40 : 20) + index * pitch
    return {
      id: step.id, name: step.name, y, nameY: labelWidth === 0 ? y - 20 : y,
      from: x(step.shortest), width: x(step.longest) - x(step.shortest), likelyX: x(step.likely),
      marks: step.took.map(minutes => ({ x: x(minutes), outside: minutes < step.shortest || minutes > step.longest })),
    }
  })
  const axisY = (labelWidth === 0 ? 20 : 4) + steps.length * pitch
  const step = [5, 10, 20, 30, 60, 120, 240].find(minute => (right - left) / (end / minute) >= 56) ?? 480
  return { width, height: axisY + 28, left, right, axisY, ticks: Array.from({ length: Math.floor(end / step) + 1 }, (_, index) => ({ minute: index * step, x: x(index * step) })), rows }
}
