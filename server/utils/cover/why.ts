import type { Compressor } from '~~/shared/schemas/cover'

/** Before going dark suction has to stand within this above the target, psi. */
const STEADY_ABOVE_TARGET_PSI = 10

/** R-744 with everything off: saturation at the warmest wet place, from its reference equation of state. */
export const R744_STANDSTILL = 'With everything off, R-744 rises to saturation at the warmest place that holds liquid: '
  + '57.3 bar absolute at 20 °C, 64.3 at 25 °C, 72.1 at 30 °C. Know which relief valve lifts first.'

/** Why a machine cannot be held on, or null when it can. */
export function leftOutBecause(machine: Compressor, kwAtTarget: number): string | null {
  const wait = machine.restartAllowedInMin ?? 0
  if (machine.running !== true && wait > 0) {
    return `${machine.tag} is left out: it stopped and may not start for another ${wait} min.`
  }
  if (kwAtTarget <= 0) {
    return `${machine.tag} is left out: its coefficients give no capacity at the target suction.`
  }
  return null
}

/** Says which sets were refused for settling too low; the first is named, the rest counted. */
export function passedOver(refused: readonly string[][], lowestPsig: number): string[] {
  const first = refused[0]
  if (first === undefined) {
    return []
  }
  const others = refused.length > 1 ? ` So are ${refused.length - 1} smaller sets.` : ''
  return [`${first.join(' + ')} is passed over: it would settle below ${lowestPsig.toFixed(1)} psig.${others}`]
}

/** Says when suction settles so high that the rack will not count as steady. */
export function farAboveTarget(suctionPsig: number | null, targetPsig: number | null): string[] {
  if (suctionPsig === null) {
    return ['Capacity stays below the load at any suction of this refrigerant: the cases will warm.']
  }
  if (targetPsig === null || suctionPsig <= targetPsig + STEADY_ABOVE_TARGET_PSI) {
    return []
  }
  return [`Suction settles ${(suctionPsig - targetPsig).toFixed(1)} psi above the target: more than the `
    + `${STEADY_ABOVE_TARGET_PSI} psi within which the rack counts as steady.`]
}

/** Why nothing is picked. */
export function whyNothing(machines: number, loadKw: number, refused: number, lowestPsig: number): string {
  if (machines === 0) {
    return 'No compressor can be held on now.'
  }
  if (loadKw <= 0) {
    return 'There is no load at the target suction.'
  }
  if (refused > 0) {
    return `Every set within the load would settle below ${lowestPsig.toFixed(1)} psig.`
  }
  return `Even the smallest machine is above the load of ${loadKw.toFixed(1)} kW.`
}
