import { REFRIGERANT_IDS } from '~~/shared/schemas/refrigerants'
import type { RefrigerantId, SaturationQuery } from '~~/shared/schemas/refrigerants'
import { rootBetween } from './root'
import { SATURATION_CURVES } from './saturation-curves'
import type { SaturationCurve } from './saturation-curves'

const ZERO_C_IN_K = 273.15
/** Kilopascals in a pound per square inch. */
export const KPA_PER_PSI = 6.894757293168

/** A refrigerant with the temperatures between which its saturation is known, °C. */
export interface Refrigerant {
  id: RefrigerantId
  nature: 'pure' | 'blend'
  lowestC: number
  highestC: number
}

/** All refrigerants in the order of their list. */
export function listRefrigerants(): Refrigerant[] {
  return REFRIGERANT_IDS.map((id) => {
    const { nature, lowestC, highestC } = SATURATION_CURVES[id]
    return { id, nature, lowestC, highestC }
  })
}

/** Why there is no answer; `field` is the one asked by. */
export interface SaturationRefusal {
  field: 'celsius' | 'kpa'
  reason: string
}

export interface SaturationPressure { celsius: number, bubbleKpa: number, dewKpa: number }
export interface SaturationTemperature { kpa: number, bubbleCelsius: number, dewCelsius: number }

/**
 * Saturation of a refrigerant at a temperature in °C (pressures in kPa
 * absolute) or at a pressure in kPa absolute (temperatures in °C). Bubble is
 * for liquid, dew for suction and superheat. Refused in words above the
 * critical temperature and outside the range of the curves.
 */
export function saturation(id: RefrigerantId, at: { celsius: number }): SaturationPressure | SaturationRefusal
export function saturation(id: RefrigerantId, at: { kpa: number }): SaturationTemperature | SaturationRefusal
export function saturation(id: RefrigerantId, at: SaturationQuery): SaturationPressure | SaturationTemperature | SaturationRefusal
export function saturation(id: RefrigerantId, at: SaturationQuery): SaturationPressure | SaturationTemperature | SaturationRefusal {
  return 'celsius' in at ? pressureAt(id, at.celsius) : temperatureAt(id, at.kpa)
}

function pressureAt(id: RefrigerantId, celsius: number): SaturationPressure | SaturationRefusal {
  const curves = SATURATION_CURVES[id]
  if (!(celsius >= curves.lowestC)) {
    return { field: 'celsius', reason: `${id} ${curves.below}` }
  }
  if (celsius > curves.highestC) {
    return { field: 'celsius', reason: `${id} ${curves.above}` }
  }
  return { celsius, bubbleKpa: curveKpa(curves.bubble, celsius), dewKpa: curveKpa(curves.dew, celsius) }
}

function temperatureAt(id: RefrigerantId, kpa: number): SaturationTemperature | SaturationRefusal {
  const curves = SATURATION_CURVES[id]
  const ends = [curves.bubble, curves.dew].map(curve =>
    [curveKpa(curve, curves.lowestC), curveKpa(curve, curves.highestC)] as const)
  // Both curves must hold the pressure: a blend has no answer where only one of them does.
  const lowestKpa = Math.max(...ends.map(end => end[0]))
  const highestKpa = Math.min(...ends.map(end => end[1]))
  if (!(kpa >= lowestKpa)) {
    return { field: 'kpa', reason: `${id} ${curves.below}, ${lowestKpa.toPrecision(4)} kPa` }
  }
  if (kpa > highestKpa) {
    return { field: 'kpa', reason: `${id} ${curves.above}, ${highestKpa.toPrecision(4)} kPa` }
  }
  const celsiusOf = (curve: SaturationCurve) =>
    rootBetween(celsius => Math.log(curveKpa(curve, celsius) / kpa), curves.lowestC, curves.highestC)
  return { kpa, bubbleCelsius: celsiusOf(curves.bubble), dewCelsius: celsiusOf(curves.dew) }
}

function curveKpa({ reducingK, reducingKpa, factors, powers }: SaturationCurve, celsius: number): number {
  const kelvin = celsius + ZERO_C_IN_K
  // At the very end of a curve rounding may carry θ below 0, where no power of it exists.
  const theta = Math.max(0, 1 - kelvin / reducingK)
  const sum = factors.reduce((total, factor, index) => total + factor * theta ** powers[index]!, 0)
  return reducingKpa * Math.exp(reducingK / kelvin * sum)
}

/**
 * Pressure of the air in kPa at an altitude in m. Standard atmosphere, as in
 * ASHRAE Handbook, Fundamentals, ch. 1.
 */
export function atmosphereKpa(altitudeM: number): number {
  return 101.325 * (1 - 2.25577e-5 * altitudeM) ** 5.25588
}

/** Gauge pressure in psig of a pressure in kPa absolute, at an altitude in m. */
export function psigOf(kpaAbsolute: number, altitudeM: number): number {
  return (kpaAbsolute - atmosphereKpa(altitudeM)) / KPA_PER_PSI
}

/** Pressure in kPa absolute of a gauge pressure in psig, at an altitude in m. */
export function kpaOfPsig(psig: number, altitudeM: number): number {
  return psig * KPA_PER_PSI + atmosphereKpa(altitudeM)
}
