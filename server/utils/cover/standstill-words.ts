import type { Snapshot } from '~~/shared/record/snapshot'
import { R744_AT_35C, r744Standstill } from './standstill'

const tenth = (value: number) => value.toFixed(1)

/**
 * The standstill pressure of each carbon dioxide rack with everything off, in words: at its warmest
 * place, and which relief valve lifts first. Empty: no such rack. Pressures in bar absolute, settings in
 * bar gauge.
 */
export function standstillWords({ racks, site }: Pick<Snapshot, 'racks' | 'site'>): string[] {
  return racks.filter(rack => rack.refrigerant === 'R-744').map((rack) => {
    const charge = `${tenth(R744_AT_35C[0]!.barAbsolute)} to ${tenth(R744_AT_35C.at(-1)!.barAbsolute)} bar at 35 °C, as the charge decides`
    if (rack.warmestC === null) {
      return `${rack.name}: carbon dioxide at a standstill goes to ${tenth(r744Standstill(20, site.altitudeM, []).barAbsolute!)} bar at 20 °C and ${tenth(r744Standstill(30, site.altitudeM, []).barAbsolute!)} bar at 30 °C. Its warmest place is not entered${firstValve(rack, null, site.altitudeM)}. Stay clear of relief outlets.`
    }
    const { barAbsolute } = r744Standstill(rack.warmestC, site.altitudeM, rack.reliefValves)
    const goes = barAbsolute === null ? `may go to ${charge}` : `goes to ${tenth(barAbsolute)} bar`
    return `${rack.name}: carbon dioxide at a standstill ${goes}, its warmest place being ${tenth(rack.warmestC)} °C${firstValve(rack, rack.warmestC, site.altitudeM)}. Stay clear of relief outlets.`
  })
}

function firstValve(rack: Snapshot['racks'][number], warmestC: number | null, altitudeM: number): string {
  const first = r744Standstill(warmestC ?? 20, altitudeM, rack.reliefValves).liftsFirst
  if (first === null) return '; no relief valve is entered'
  const at = first.atC === null ? '' : ` (at ${tenth(first.atC)} °C)`
  if (warmestC === null || first.lifts === null) return `; ${first.tag}, ${first.barGauge} bar gauge${at}, lifts first`
  return first.lifts ? `; ${first.tag}, ${first.barGauge} bar gauge, lifts first${at}: it will lift` : `; ${first.tag}, ${first.barGauge} bar gauge, would lift first${at}, and does not get there`
}
