import { scaleLinear } from 'd3-scale'
import { diamond } from './path'

/** A round on the watch strip: taken, or expected at that minute. */
export interface TimelineRound {
  minute: number
  taken: boolean
}

/** One outage laid straight. All minutes count from the moment control was lost; null for what has not happened. */
export interface TimelineInput {
  width: number
  height: number
  fromMinute: number
  toMinute: number
  nowMinute: number
  /** First point put in hand. */
  inHandMinute: number | null
  /** Control back; null while dark. */
  backMinute: number | null
  /** The time by which the work should be over. */
  plannedMinute: number | null
  /** The earliest deadline of any case. */
  deadlineMinute: number | null
  rounds: readonly TimelineRound[]
}

export interface TimelineBar {
  x: number
  y: number
  width: number
  height: number
}

export interface TimelineGeometry {
  grid: { x: number, minute: number }[]
  lostX: number
  nowX: number
  inHand: TimelineBar | null
  dark: TimelineBar | null
  planned: TimelineBar | null
  deadline: TimelineBar | null
  /** From the deadline to the end of the strip. */
  past: TimelineBar | null
  /** `on` says what the diamond lies on, so that it is drawn against it. */
  rounds: { minute: number, taken: boolean, path: string, on: 'dark' | 'ground' }[]
}

/** Minutes between grid lines: at most 16 of them. */
function gridStep(span: number): number {
  return [10, 20, 30, 60, 120, 240].find(step => span / step <= 16) ?? 480
}

/** The strip in a box from (0, 0) to (width, height); bars outside the span are cut at its ends. */
export function timeline(input: TimelineInput): TimelineGeometry {
  const { width, height, fromMinute, toMinute, nowMinute, inHandMinute, backMinute, plannedMinute, deadlineMinute } = input
  const x = scaleLinear([fromMinute, Math.max(toMinute, fromMinute + 1)], [0, width]).clamp(true)
  const bar = (from: number, to: number, share: number): TimelineBar | null => {
    const left = x(from)
    const right = x(to)
    return right <= left ? null : { x: left, y: height * (1 - share) / 2, width: right - left, height: height * share }
  }
  const step = gridStep(toMinute - fromMinute)
  const first = Math.ceil(fromMinute / step) * step
  const darkEnd = backMinute ?? nowMinute
  const deadlineShown = deadlineMinute !== null && deadlineMinute <= toMinute
  return {
    grid: Array.from({ length: Math.max(0, Math.floor((toMinute - first) / step) + 1) }, (_, index) => ({
      minute: first + index * step,
      x: x(first + index * step),
    })),
    lostX: x(0),
    nowX: x(nowMinute),
    inHand: inHandMinute === null ? null : bar(inHandMinute, Math.min(0, nowMinute), 0.26),
    dark: bar(0, darkEnd, 0.48),
    planned: plannedMinute === null ? null : bar(Math.max(0, darkEnd), plannedMinute, 0.48),
    deadline: deadlineShown ? { x: x(deadlineMinute) - 1.5, y: 0, width: 3, height } : null,
    past: deadlineShown ? { x: x(deadlineMinute), y: height * 0.04, width: width - x(deadlineMinute), height: height * 0.92 } : null,
    rounds: [...input.rounds]
      .filter(round => round.minute >= fromMinute && round.minute <= toMinute)
      .sort((a, b) => a.minute - b.minute)
      .map(({ minute, taken }) => ({
        minute,
        taken,
        path: diamond({ x: x(minute), y: height / 2 }, taken ? 6.5 : 7.5),
        on: minute > 0 && minute <= darkEnd ? 'dark' : 'ground',
      })),
  }
}
