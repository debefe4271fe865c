/** What is stored in °C and psig, as people at a site read and write it. */
import type { PressureUnit, TemperatureUnit } from '~~/shared/schemas/equipment'
import { numberWords } from '~~/shared/charts/words'
import { fromPsi, toPsi } from '~~/shared/utils/pressure'

export interface SiteUnits { temperatureUnit: TemperatureUnit, pressureUnit: PressureUnit }
/** `temperature`: stored in °C; `difference`: in kelvin; `pressure`: in psig, a gauge pressure. */
export type Quantity = 'temperature' | 'difference' | 'pressure'

export function unitOf(quantity: Quantity, { temperatureUnit, pressureUnit }: SiteUnits): string {
  return quantity === 'pressure' ? pressureUnit : `°${temperatureUnit}`
}

/** A stored number as it is shown, rounded to what an instrument of the trade reads. */
export function toShown(stored: number, quantity: Quantity, units: SiteUnits): number {
  const fahrenheit = units.temperatureUnit === 'F'
  switch (quantity) {
    case 'temperature': return rounded(fahrenheit ? stored * 1.8 + 32 : stored, 1)
    case 'difference': return rounded(fahrenheit ? stored * 1.8 : stored, 1)
    case 'pressure': return fromPsi(stored, units.pressureUnit)
  }
}

/** What was typed as it is stored. */
export function toStored(shown: number, quantity: Quantity, units: SiteUnits): number {
  const fahrenheit = units.temperatureUnit === 'F'
  switch (quantity) {
    case 'temperature': return rounded(fahrenheit ? (shown - 32) / 1.8 : shown, 4)
    case 'difference': return rounded(fahrenheit ? shown / 1.8 : shown, 4)
    case 'pressure': return rounded(toPsi(shown, units.pressureUnit), 4)
  }
}

/** '44 psig', '35.2 °F'; a dash for nothing. */
export function quantityWords(stored: number | null, quantity: Quantity, units: SiteUnits): string {
  if (stored === null) return '–'
  const shown = toShown(stored, quantity, units)
  return `${quantity === 'pressure' ? shown : numberWords(shown, 1)} ${unitOf(quantity, units)}`
}

const rounded = (value: number, decimals: number) => Number(value.toFixed(decimals))
