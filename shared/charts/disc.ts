import { arc } from 'd3-shape'
import { clipMinutes, diamond, firstMeeting, inOrder, joinForecast, polyline } from './path'
import type { ChartReading, DrawnPoint } from './types'

/** One case on the disc. Temperatures all in one unit; minutes from the moment control was lost. */
export interface DiscCase {
  id: string
  name: string
  /** The case with the shortest hold is drawn thick. */
  shortest: boolean
  /** The temperature that the case usually has. */
  usual: number
  /** The temperature that it must not pass. */
  limit: number
  readings: readonly ChartReading[]
  /** Expected temperatures; empty when there is no forecast. */
  forecast: readonly ChartReading[]
}

export interface DiscInput {
  elapsedMinutes: number
  /** The planned time without control; null when nothing was planned. */
  plannedMinutes: number | null
  /** How long one turn lasts, from `turnFor`. */
  turnMinutes: number
  cases: readonly DiscCase[]
}

export interface DiscTrace {
  id: string
  name: string
  shortest: boolean
  /** SVG path through the readings; '' for fewer than two. */
  path: string
  /** SVG path of the forecast until it meets the ring or the end of the turn; '' when there is none. */
  forecastPath: string
  /** One diamond a reading. */
  marks: { minute: number, value: number, at: DrawnPoint, path: string }[]
  /** Minute at which the forecast meets the ring, or null. */
  meets: number | null
}

/** All of the drawing around (0, 0), in a square from −size/2 to size/2. */
export interface DiscGeometry {
  size: number
  usualRadius: number
  limitRadius: number
  /** Circles at a quarter, a half and three quarters of the way to the limit. */
  gridRadii: number[]
  spokes: { from: DrawnPoint, to: DrawnPoint }[]
  labels: { text: string, at: DrawnPoint }[]
  /** Filled paths on the rim. */
  elapsed: string
  planned: string
  traces: DiscTrace[]
  /** More time has gone by than one turn holds; the disc shows the first turn and the words say so. */
  beyond: boolean
}

const size = 384
const radii = { usual: 82, limit: 130, spoke: 146, rimInner: 147, rimOuter: 158, planned: 155, label: 175 } as const
/** Traces keep inside these shares, so that no pen writes over the words in the middle or over the rim. */
const shares = { least: -0.1, most: 1.22 } as const
const turns = [60, 120, 240, 480] as const

/**
 * Minutes of one turn: an hour until the shortest hold, the time by which the work is over 19 times in 20, or the time
 * gone by passes 55 minutes; then 2, 4, 8 hours by the same share. Eight hours is the longest.
 */
export function turnFor(...minutes: (number | null)[]): number {
  const longest = Math.max(0, ...minutes.filter((value): value is number => value !== null && Number.isFinite(value)))
  return turns.find(turn => longest <= turn * 55 / 60) ?? turns[turns.length - 1]!
}

/** 'One turn is an hour.', 'One turn is 4 hours.' */
export function turnWords(turnMinutes: number): string {
  return turnMinutes === 60 ? 'One turn is an hour.' : `One turn is ${turnMinutes / 60} hours.`
}

/** How far a temperature is from usual (0) to limit (1); below 0 colder than usual, above 1 past the limit. */
export function progress(value: number, usual: number, limit: number): number {
  // A limit at or below the usual temperature leaves no way to measure: the case is either past it or not.
  if (limit <= usual) return value >= limit ? 1 : 0
  return (value - usual) / (limit - usual)
}

function radiusOf(value: number, { usual, limit }: Pick<DiscCase, 'usual' | 'limit'>): number {
  const share = Math.min(shares.most, Math.max(shares.least, progress(value, usual, limit)))
  return radii.usual + share * (radii.limit - radii.usual)
}

/** The point at an angle in turns (0 is twelve o'clock, clockwise) and a radius. */
export function onDisc(turn: number, radius: number): DrawnPoint {
  const angle = turn * 2 * Math.PI
  return { x: radius * Math.sin(angle), y: -radius * Math.cos(angle) }
}

/** Points of a pen's line: the radius changes evenly with the angle, so long stretches are cut in steps of 3 degrees. */
function spiral(line: readonly ChartReading[], item: DiscCase, turnMinutes: number): DrawnPoint[] {
  return line.flatMap((reading, index) => {
    const end = { turn: reading.minute / turnMinutes, radius: radiusOf(reading.value, item) }
    const before = line[index - 1]
    if (!before) return [onDisc(end.turn, end.radius)]
    const start = { turn: before.minute / turnMinutes, radius: radiusOf(before.value, item) }
    const steps = Math.max(1, Math.ceil((end.turn - start.turn) * 120))
    return Array.from({ length: steps }, (_, step) => {
      const share = (step + 1) / steps
      return onDisc(start.turn + (end.turn - start.turn) * share, start.radius + (end.radius - start.radius) * share)
    })
  })
}

function traceOf(item: DiscCase, turnMinutes: number): DiscTrace {
  const readings = clipMinutes(item.readings, 0, turnMinutes)
  const ahead = joinForecast(item.readings, item.forecast)
  const meeting = firstMeeting(ahead, item.limit)
  const last = inOrder(item.readings).at(-1)
  const over = last !== undefined && last.value >= item.limit
  const shown = over ? [] : clipMinutes(ahead, 0, Math.min(turnMinutes, meeting?.minute ?? turnMinutes))
  return {
    id: item.id,
    name: item.name,
    shortest: item.shortest,
    path: polyline(spiral(readings, item, turnMinutes)),
    forecastPath: polyline(spiral(shown, item, turnMinutes)),
    marks: inOrder(item.readings)
      .filter(reading => reading.minute >= 0 && reading.minute <= turnMinutes)
      .map((reading) => {
        const at = onDisc(reading.minute / turnMinutes, radiusOf(reading.value, item))
        return { ...reading, at, path: diamond(at, item.shortest ? 7 : 4) }
      }),
    meets: over ? null : meeting?.minute ?? null,
  }
}

function rim(minutes: number, turnMinutes: number, inner: number, outer: number): string {
  const share = Math.min(1, Math.max(0, minutes / turnMinutes))
  if (share === 0) return ''
  return arc().digits(2)({ innerRadius: inner, outerRadius: outer, startAngle: 0, endAngle: share * 2 * Math.PI }) ?? ''
}

/** Minutes of the spokes, and the words at them: every twelfth in minutes, from 4 hours on the hours alone. */
function ticks(turnMinutes: number): { minute: number, text: string }[] {
  const step = turnMinutes === 480 ? 30 : turnMinutes / 12
  return Array.from({ length: turnMinutes / step }, (_, index) => {
    const minute = (index + 1) * step
    if (turnMinutes <= 120) return { minute, text: String(minute) }
    return { minute, text: minute % 60 === 0 ? `${minute / 60} h` : '' }
  })
}

/** The whole disc. Cases are drawn with the shortest hold last, on top; ties break on id. */
export function disc({ elapsedMinutes, plannedMinutes, turnMinutes, cases }: DiscInput): DiscGeometry {
  const marks = ticks(turnMinutes)
  return {
    size,
    usualRadius: radii.usual,
    limitRadius: radii.limit,
    gridRadii: [0.25, 0.5, 0.75].map(share => radii.usual + share * (radii.limit - radii.usual)),
    spokes: marks.map(({ minute }) => ({
      from: onDisc(minute / turnMinutes, radii.usual),
      to: onDisc(minute / turnMinutes, radii.spoke),
    })),
    labels: marks.filter(({ text }) => text).map(({ minute, text }) => ({ text, at: onDisc(minute / turnMinutes, radii.label) })),
    elapsed: rim(elapsedMinutes, turnMinutes, radii.rimInner, radii.rimOuter),
    planned: plannedMinutes === null ? '' : rim(plannedMinutes, turnMinutes, radii.planned, radii.rimOuter),
    traces: [...cases]
      .sort((a, b) => Number(a.shortest) - Number(b.shortest) || a.id.localeCompare(b.id, 'en'))
      .map(item => traceOf(item, turnMinutes)),
    beyond: elapsedMinutes > turnMinutes,
  }
}
