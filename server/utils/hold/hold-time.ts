import type { HoldInput } from '~~/shared/schemas/hold'
import { chilledAt, chilledMinutes } from './chilled'
import { crossingOf } from './drift'
import { chenHeat } from './food-heat'
import { compositionOf } from './foods'
import { frozenAt, frozenMinutes } from './frozen'

/** The curve is drawn to the limit, or this far where the limit is not reached within it, minutes. */
const LONGEST_CURVE_MINUTES = 600
const CURVE_STEPS = 60

export interface CurvePoint {
  minute: number
  c: number
}

/**
 * `minutes` to the limit, unrounded: 0 at or past it in the direction of
 * drift; for a start past it that drifts back, the minutes until it is back;
 * null when the surroundings never carry it there. `curve` runs from minute 0.
 */
export interface HoldTime {
  minutes: number | null
  curve: CurvePoint[]
}

interface Drift {
  towardC: number
  minutesTo: (c: number) => number
  at: (minutes: number) => number
}

/**
 * Hold time of a case with nothing controlled, from `startC` to `limitC` (°C)
 * in surroundings at `ambientC`. Chilled: lumped capacitance with τ in hours
 * (internal heat P raises the ambient by P/UA). Frozen: enthalpy balance by
 * Chen. An estimate: it is as good as the τ or UA that it is given.
 */
export function holdTime(input: HoldInput): HoldTime {
  const drift = input.kind === 'chilled' ? chilledDrift(input) : frozenDrift(input)
  const minutes = minutesOf(input, drift)
  // A limit within a rounding of the start comes out as 0 minutes too, and has no curve of its own.
  if (minutes === null || minutes === 0 || minutes > LONGEST_CURVE_MINUTES) {
    return { minutes, curve: curveOf(input.startC, LONGEST_CURVE_MINUTES, drift) }
  }
  const curve = curveOf(input.startC, minutes, drift)
  curve[CURVE_STEPS] = { minute: minutes, c: input.limitC }
  return { minutes, curve }
}

function minutesOf(input: HoldInput, drift: Drift): number | null {
  switch (crossingOf(input.startC, drift.towardC, input.limitC, input.limitSide)) {
    case 'past': return 0
    case 'never': return null
    case 'ahead': return Math.max(0, drift.minutesTo(input.limitC))
  }
}

function chilledDrift(input: Extract<HoldInput, { kind: 'chilled' }>): Drift {
  const { startC, tauHours } = input
  const riseK = input.heatW === undefined || input.uaWPerK === undefined ? 0 : input.heatW / input.uaWPerK
  const towardC = input.ambientC + riseK
  return {
    towardC,
    minutesTo: c => chilledMinutes(startC, c, towardC, tauHours),
    at: minutes => chilledAt(startC, towardC, tauHours, minutes),
  }
}

function frozenDrift(input: Extract<HoldInput, { kind: 'frozen' }>): Drift {
  const { startC, ambientC: towardC } = input
  const heat = chenHeat(compositionOf(input.food))
  const kgPerWPerK = input.massKg / input.uaWPerK
  return {
    towardC,
    minutesTo: c => frozenMinutes(startC, c, towardC, heat, kgPerWPerK),
    at: minutes => frozenAt(startC, towardC, heat, kgPerWPerK, minutes),
  }
}

function curveOf(startC: number, endMinutes: number, drift: Drift): CurvePoint[] {
  return Array.from({ length: CURVE_STEPS + 1 }, (_, step) => {
    const minute = endMinutes * step / CURVE_STEPS
    return { minute, c: step === 0 ? startC : drift.at(minute) }
  })
}
