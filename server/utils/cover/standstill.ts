import { atmosphereKpa, saturation } from './refrigerants'
import { SATURATION_CURVES } from './saturation-curves'

const KPA_PER_BAR = 100
/**
 * Above the critical temperature the charge in the volume decides: R-744 at
 * 35 °C at three charge densities, from its reference equation of state.
 */
export const R744_AT_35C: readonly { kgPerM3: number, barAbsolute: number }[] = [
  { kgPerM3: 300, barAbsolute: 76.6 },
  { kgPerM3: 400, barAbsolute: 79.7 },
  { kgPerM3: 600, barAbsolute: 84.2 },
]

/** A relief valve and the pressure at which it lifts. */
export interface ReliefValve {
  tag: string
  barGauge: number
}

/**
 * `barAbsolute` is the highest pressure with everything off, null above the
 * critical temperature; `liftsFirst` the valve with the lowest setting, the
 * temperature at which it lifts (null when that lies above the critical one),
 * and whether the warmest place gets there (null where charge decides).
 */
export interface Standstill {
  barAbsolute: number | null
  liftsFirst: { tag: string, barGauge: number, atC: number | null, lifts: boolean | null } | null
}

/**
 * The pressure to which R-744 goes with everything off: at most saturation at
 * the warmest place where there is liquid, `warmestC` in °C.
 */
export function r744Standstill(warmestC: number, altitudeM: number, valves: readonly ReliefValve[]): Standstill {
  const answer = saturation('R-744', { celsius: warmestC })
  const barAbsolute = 'reason' in answer ? null : answer.dewKpa / KPA_PER_BAR
  const first = [...valves].sort((a, b) => a.barGauge - b.barGauge || (a.tag < b.tag ? -1 : 1))[0]
  if (first === undefined) {
    return { barAbsolute, liftsFirst: null }
  }
  const setKpa = first.barGauge * KPA_PER_BAR + atmosphereKpa(altitudeM)
  const set = saturation('R-744', { kpa: setKpa })
  const atC = 'reason' in set ? null : set.dewCelsius
  const lifts = warmestC > SATURATION_CURVES['R-744'].highestC
    ? (atC === null ? null : true)
    : barAbsolute !== null && barAbsolute * KPA_PER_BAR >= setKpa
  return { barAbsolute, liftsFirst: { ...first, atC, lifts } }
}
