import type { LimitSide } from '~~/shared/schemas/hold'

/** How a drifting temperature stands to its limit. */
export type Crossing = 'past' | 'ahead' | 'never'

/**
 * Whether a temperature that drifts from `startC` toward `towardC` has passed
 * `limitC`, will pass it, or never will. All in °C.
 *
 * Without `side` the limit is taken to lie in the direction of drift, as the
 * same question is asked of a warming case and of one cooling to its low mark.
 * With it, a case that drifts away from its limit on the good side never
 * reaches it. No drift at all: an upper limit, unless told otherwise.
 */
export function crossingOf(startC: number, towardC: number, limitC: number, side?: LimitSide): Crossing {
  if (startC === limitC) {
    return 'past'
  }
  if (startC === towardC) {
    return overLimit(startC, limitC, side ?? 'upper') ? 'past' : 'never'
  }
  const direction: LimitSide = towardC > startC ? 'upper' : 'lower'
  if (overLimit(startC, limitC, direction)) {
    return side === undefined || side === direction ? 'past' : 'never'
  }
  return overLimit(towardC, limitC, direction) ? 'ahead' : 'never'
}

function overLimit(c: number, limitC: number, side: LimitSide): boolean {
  return side === 'upper' ? c > limitC : c < limitC
}
