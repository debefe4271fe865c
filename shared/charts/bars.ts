import { scaleLinear } from 'd3-scale'
import { area, curveMonotoneX } from 'd3-shape'

/** One case's bar. Minutes counted from the start of the dark. */
export interface HoldBar {
  id: string
  name: string
  /** How long it stays within its limit as the plan leaves it; null when longer than anything that matters. */
  plannedMinutes: number | null
  /** The same if the cover failed too; null when longer than anything that matters. */
  bareMinutes: number | null
}

export interface BarsInput {
  width: number
  cases: readonly HoldBar[]
  /** The work is over by then 19 times in 20. */
  workMinutes: number
  /** How likely control stays away until about that minute; any scale, in order of minutes. */
  likelihood: readonly { minute: number, density: number }[]
  /** Width kept at the left for names; 0 puts each name above its bar. */
  labelWidth: number
}

export interface BarRow {
  id: string
  name: string
  shortest: boolean
  /** Top of the bar. */
  y: number
  width: number
  /** Place of the line inside, or null. */
  bareX: number | null
  /** The hold is longer than the chart: the bar runs to its end. */
  endless: boolean
  plannedMinutes: number | null
  bareMinutes: number | null
  nameY: number
}

export interface BarsGeometry {
  width: number
  height: number
  left: number
  right: number
  barHeight: number
  axisY: number
  gridTop: number
  ticks: { minute: number, x: number }[]
  curve: string
  workX: number
  /** Where the words of the work begin or end, and where the line below them starts. */
  workWords: { x: number, anchor: 'start' | 'end', lineTop: number }
  /** Between the end of the work and the shortest hold; `short` when the hold ends first. */
  margin: { x: number, width: number, y: number, minutes: number, short: boolean } | null
  rows: BarRow[]
}

const barHeight = 30
const curveHeight = 46
/** Room for the words at the end of the work, set at 16 px. */
const workWordsWidth = 264
/** Space right of the longest bar for its words. */
const wordsWidth = 84

/** Rows from the shortest hold down; null is longest; ties break on id. */
export function byHold(cases: readonly HoldBar[]): HoldBar[] {
  const minutes = (item: HoldBar) => item.plannedMinutes ?? Number.POSITIVE_INFINITY
  return [...cases].sort((a, b) => (minutes(a) === minutes(b) ? 0 : minutes(a) - minutes(b)) || a.id.localeCompare(b.id, 'en'))
}

/** The chart from (0, 0); its height follows from the count of cases. */
export function bars({ width, cases, workMinutes, likelihood, labelWidth }: BarsInput): BarsGeometry {
  const sorted = byHold(cases)
  // The zero of the axis needs half its width even where no names stand at the left.
  const left = labelWidth === 0 ? 8 : labelWidth
  const right = Math.max(left + 40, width - wordsWidth)
  const longest = Math.max(workMinutes * 1.25, 30, ...sorted.map(item => item.plannedMinutes ?? 0))
  // A case that holds for a day would press all others flat, so the axis stops at 12 times the work.
  const end = Math.min(longest, Math.max(workMinutes * 12, 120))
  const x = scaleLinear([0, end], [left, right]).clamp(true)
  const gridTop = 4
  const workLabel = 30
  const firstY = workLabel + curveHeight + 20
  const pitch = labelWidth === 0 ? barHeight + 34 : barHeight + 14
  const nameAbove = labelWidth === 0 ? 24 : 0
  const rows = sorted.map((item, index): BarRow => {
    const y = firstY + index * pitch + nameAbove
    return {
      ...item,
      shortest: index === 0 && item.plannedMinutes !== null,
      y,
      width: x(item.plannedMinutes ?? end) - left,
      bareX: item.bareMinutes === null || item.bareMinutes > end ? null : x(item.bareMinutes),
      endless: item.plannedMinutes === null || item.plannedMinutes > end,
      nameY: labelWidth === 0 ? y - 8 : y + barHeight / 2,
    }
  })
  const axisY = firstY + sorted.length * pitch + 2
  const step = [5, 10, 20, 30, 60, 120, 240].find(minute => (right - left) / (end / minute) >= 56) ?? 480
  const peak = Math.max(...likelihood.map(point => point.density), 0)
  const baseline = workLabel + curveHeight
  const curve = area<{ minute: number, density: number }>()
    .x(point => x(point.minute))
    .y0(baseline)
    .y1(point => baseline - (peak > 0 ? point.density / peak : 0) * (curveHeight - 4))
    .curve(curveMonotoneX)
    .digits(2)
  const workX = x(workMinutes)
  const fitsRight = workX + 10 + workWordsWidth <= width
  const fitsLeft = workX - 10 - workWordsWidth >= 0
  const hold = sorted[0]?.plannedMinutes ?? null
  return {
    width,
    height: axisY + 28,
    left,
    right,
    barHeight,
    axisY,
    gridTop,
    ticks: Array.from({ length: Math.floor(end / step) + 1 }, (_, index) => ({ minute: index * step, x: x(index * step) })),
    curve: likelihood.length > 1 ? curve([...likelihood].filter(point => point.minute <= end)) ?? '' : '',
    workX,
    // Where there is no room on either side the words stand across, and the line begins below them.
    workWords: fitsRight
      ? { x: workX + 10, anchor: 'start', lineTop: gridTop + 6 }
      : fitsLeft
        ? { x: workX - 10, anchor: 'end', lineTop: gridTop + 6 }
        : { x: Math.max(0, width - workWordsWidth), anchor: 'start', lineTop: gridTop + 26 },
    margin: hold === null
      ? null
      : {
          x: x(Math.min(hold, workMinutes)),
          width: Math.abs(x(hold) - x(workMinutes)),
          y: firstY - 12,
          minutes: hold - workMinutes,
          short: hold < workMinutes,
        },
    rows,
  }
}
