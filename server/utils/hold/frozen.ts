import { REFERENCE_C } from './food-heat'
import type { ChenHeat } from './food-heat'

/** Under this ratio of ambient to product temperature the closed form loses digits and the series takes over. */
const SERIES_RATIO = 0.05
const SERIES_TERMS = 14
const HALVINGS = 200

/**
 * Minutes in which a frozen or thawing food drifts from `fromC` to `toC` toward
 * `towardC` (°C; `toC` between the two): the integral of dH/(UA·(T∞ − T)/m),
 * in closed form. `kgPerWPerK` is mass over conductance, kg/(W/K).
 * Source: enthalpy by Chen (1985) in ASHRAE Handbook, Refrigeration, ch. 19.
 */
export function frozenMinutes(fromC: number, toC: number, towardC: number, heat: ChenHeat, kgPerWPerK: number): number {
  const clampBelow = (c: number) => Math.min(c, heat.freezingC)
  const clampAbove = (c: number) => Math.max(c, heat.freezingC)
  const kjPerKgPerK = solidPart(clampBelow(fromC), clampBelow(toC), towardC, heat)
    + thawedPart(clampAbove(fromC), clampAbove(toC), towardC, heat)
  return kjPerKgPerK * 1000 * kgPerWPerK / 60
}

/** Temperature in °C after `minutes` of the same drift, by halving between start and ambient. */
export function frozenAt(fromC: number, towardC: number, heat: ChenHeat, kgPerWPerK: number, minutes: number): number {
  let reached = fromC
  let beyond = towardC
  for (let step = 0; step < HALVINGS; step += 1) {
    const middle = (reached + beyond) / 2
    if (middle === reached || middle === beyond) {
      break
    }
    if (frozenMinutes(fromC, middle, towardC, heat, kgPerWPerK) <= minutes) {
      reached = middle
    } else {
      beyond = middle
    }
  }
  return reached
}

function thawedPart(fromC: number, toC: number, towardC: number, heat: ChenHeat): number {
  return fromC === toC ? 0 : heat.thawed * Math.log((towardC - fromC) / (towardC - toC))
}

function solidPart(fromC: number, toC: number, towardC: number, heat: ChenHeat): number {
  if (fromC === toC) {
    return 0
  }
  const warming = Math.log((towardC - fromC) / (towardC - toC))
  return heat.solid * warming + Math.abs(REFERENCE_C) * heat.melt * meltPart(fromC, toC, towardC, warming)
}

/**
 * ∫ dT / (T²·(T∞ − T)). By partial fractions; for an ambient near 0 °C, where
 * these cancel, by the power series in T∞/T.
 */
function meltPart(fromC: number, toC: number, towardC: number, warming: number): number {
  if (Math.abs(towardC) >= SERIES_RATIO * Math.min(Math.abs(fromC), Math.abs(toC))) {
    return (1 / fromC - 1 / toC) / towardC + (Math.log(toC / fromC) + warming) / towardC ** 2
  }
  let sum = 0
  for (let n = 0; n < SERIES_TERMS; n += 1) {
    sum += towardC ** n * (toC ** -(n + 2) - fromC ** -(n + 2)) / (n + 2)
  }
  return sum
}
