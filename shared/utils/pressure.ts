/** Gauge pressures are kept in psig and read in the unit of their site. One psi is 6.894757 kPa (NIST SP 811, appendix B.8). */
import type { PressureUnit } from '../schemas/equipment'

const PER_PSI: Record<PressureUnit, number> = { psig: 1, kPa: 6.894757, bar: 0.06894757 }
/** What a gauge of the trade is read to. */
const DECIMALS: Record<PressureUnit, number> = { psig: 1, kPa: 0, bar: 2 }

/** A gauge pressure, or a difference of two, in psi as a number in a site's unit, rounded to what a gauge is read to. */
export function fromPsi(psi: number, unit: PressureUnit): number {
  return Number((psi * PER_PSI[unit]).toFixed(DECIMALS[unit]))
}

/** What was read in a site's unit in psi, not rounded. */
export function toPsi(shown: number, unit: PressureUnit): number {
  return shown / PER_PSI[unit]
}

/** A gauge pressure for a column of figures, all with the same decimals. @param psig gauge pressure, psig */
export function pressureFigure(psig: number, unit: PressureUnit): string {
  return fromPsi(psig, unit).toFixed(DECIMALS[unit])
}

/** '44 psig', '3.03 bar gauge'. @param psig gauge pressure, psig */
export function pressureWords(psig: number, unit: PressureUnit): string {
  return `${fromPsi(psig, unit)} ${pressureUnitWords(unit)}`
}

/** '3 psi', '0.21 bar'. @param psi a difference of two pressures, psi */
export function pressureDifferenceWords(psi: number, unit: PressureUnit): string {
  return `${fromPsi(psi, unit)} ${unit === 'psig' ? 'psi' : unit}`
}

/** A pressure's unit with the word that says from where it counts. */
export function pressureUnitWords(unit: PressureUnit): string {
  return unit === 'psig' ? 'psig' : `${unit} gauge`
}
