import type { Snapshot, SnapshotCase } from '../../../shared/record/snapshot'
import { SHOP_AIR_C } from '../../utils/hold/for-outage'
import { holdInputOf, holdTime } from '../../utils/hold'
import type { CurvePoint } from '../../utils/hold'

const MINUTE = 60_000
/** As far up as a course is drawn, °C. */
const COURSE_TO_C = 20
/** A case with refrigeration back draws near its usual temperature by this time constant, minutes. Invented. */
const COOLING_MINUTES = 28
/** Two probes in one case disagree by so much, K. */
const SCATTER_K = 0.05

export interface Course {
  /** when control was lost and when refrigeration was whole again, Unix ms */
  lostAt: number
  backAt: number
  /** how many times slower than with nothing running, where points are held by hand; by case name, else for all */
  slower: number
  slowerOf?: Record<string, number>
}

/** Product temperature of a case at a moment, °C, with its round. */
export type ProductAt = (known: SnapshotCase, at: number, round: number) => number

/** Nothing has changed yet: every case stands at its usual temperature. */
export function usualCourse(snapshot: Snapshot): ProductAt {
  return (known, _at, round) => known.usualC + scatterOf(snapshot, known, round)
}

/** Product temperature of cases without control and after: the hold model's course without control, then back towards the usual. */
export function productCourse(snapshot: Snapshot, { lostAt, backAt, slower, slowerOf = {} }: Course): ProductAt {
  const curves = new Map<string, CurvePoint[]>()
  const warmed = (known: SnapshotCase, minutes: number): number => {
    if (minutes <= 0) return known.usualC
    const curve = curves.get(known.id) ?? holdTime(holdInputOf(known.kind, { startC: known.usualC, ambientC: SHOP_AIR_C, limitC: COURSE_TO_C, tauHours: known.tauHours })).curve
    curves.set(known.id, curve)
    return along(curve, minutes / (slowerOf[known.name] ?? slower))
  }
  return (known, at, round) => {
    if (at <= backAt) return warmed(known, (at - lostAt) / MINUTE) + scatterOf(snapshot, known, round)
    const highest = warmed(known, (backAt - lostAt) / MINUTE)
    return known.usualC + (highest - known.usualC) * Math.exp(-(at - backAt) / MINUTE / COOLING_MINUTES)
  }
}

function scatterOf(snapshot: Snapshot, known: SnapshotCase, round: number): number {
  return ((snapshot.cases.indexOf(known) * 5 + round * 2) % 3 - 1) * SCATTER_K
}

/** The course at a minute, between the points of its curve. */
function along(curve: CurvePoint[], minutes: number): number {
  const next = curve.findIndex(point => point.minute > minutes)
  if (next <= 0) return curve.at(-1)!.c
  const [from, to] = [curve[next - 1]!, curve[next]!]
  return from.c + (to.c - from.c) * (minutes - from.minute) / (to.minute - from.minute)
}
