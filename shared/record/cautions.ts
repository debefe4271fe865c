import type { Hazard } from '../look/palette'
import type { OutageState } from './state'

export interface Caution { id: string, hazard: Hazard, words: string }

/** Standing at the end of every record and on the page of rules. */
export const DISCLAIMER = 'Local codes, the authority having jurisdiction and licensed practice come first. Holdover advises and records; it controls nothing.'

/**
 * The caution for opening or reaching into a panel. Approach distances: NFPA 70E, shock protection
 * boundaries for fixed circuit parts. A selector is not an energy-isolating device: 29 CFR 1910.147(b).
 */
export function panelCaution(state: OutageState): Caution {
  const volts = state.snapshot.controller.panelVolts
  const distance = volts === null || volts < 50 ? '' : volts <= 150 ? ' Avoid contact (50 to 150 V).' : volts <= 750 ? ' Stay 3 ft 6 in (1.0 m) away unless qualified; within 1 ft (0.3 m) only with protection.' : ' Approach distances by NFPA 70E.'
  return { id: 'panel', hazard: 'warning', words: `Live panel. Qualified persons only. A selector is not a lockout.${distance}` }
}

const FIXED = {
  leak: { hazard: 'warning', words: 'Refrigerant leak alarms may be silent while the controller is away. Carry a portable detector, or stay out of the machinery room.' },
  standstill: { hazard: 'warning', words: 'Carbon dioxide at a standstill: pressure rises towards that of the warmest wet place, and a relief valve may lift. Stay clear of its outlet.' },
  heater: { hazard: 'caution', words: 'Heaters and anti-sweat elements stay hot after they are switched off.' },
  food: { hazard: 'notice', words: 'Product over its limit is dealt with as the rulebook says. When in doubt, ask the authority.' },
} as const satisfies Record<string, Omit<Caution, 'id'>>

/** Cautions that apply to an outage as a whole. */
export function outageCautions(state: OutageState): Caution[] {
  const carbonDioxide = state.snapshot.racks.some(rack => /^(R-?744|CO2)$/i.test(rack.refrigerant))
  const ids: (keyof typeof FIXED)[] = ['leak', ...(carbonDioxide ? ['standstill' as const] : []), 'heater', 'food']
  return [panelCaution(state), ...ids.map(id => ({ id, ...FIXED[id] }))]
}

/** What stands before a means of override: its panel, the text before the first comma. */
export function panelOf(place: string): string {
  return place.split(',')[0]!.trim()
}

/** The panel caution, where this is the first point at its panel in this run; else null. */
export function cautionAt(state: OutageState, tag: string): Caution | null {
  const panel = panelOf(state.snapshot.points.find(point => point.tag === tag)?.place ?? '')
  const signedHere = state.snapshot.points.some(point => point.tag !== tag && panelOf(point.place) === panel && state.points[point.tag]?.mark)
  return signedHere ? null : panelCaution(state)
}
