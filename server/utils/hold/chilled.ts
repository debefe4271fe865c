/**
 * Minutes in which a body drifts from `fromC` to `toC` while its surroundings
 * draw it toward `towardC`; `toC` lies between the two. Lumped capacitance,
 * t = −τ·ln((T∞ − L)/(T∞ − T0)) (Incropera, ch. 5; Çengel, ch. 4).
 */
export function chilledMinutes(fromC: number, toC: number, towardC: number, tauHours: number): number {
  return 60 * tauHours * Math.log((towardC - fromC) / (towardC - toC))
}

/** Temperature in °C after `minutes` of the same drift. */
export function chilledAt(fromC: number, towardC: number, tauHours: number, minutes: number): number {
  return towardC + (fromC - towardC) * Math.exp(-minutes / (60 * tauHours))
}
