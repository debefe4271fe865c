import { isFrozenKind } from '~~/shared/schemas/case-kinds'
import type { CaseKind, ChilledCaseKind, FrozenCaseKind } from '~~/shared/schemas/case-kinds'
import type { FoodComposition, FoodId, HoldInput } from '~~/shared/schemas/hold'

/**
 * Time constant of the warmest package, hours, until the case's own records
 * replace it. Our own estimates, to be shown as such: measured means are 8 to
 * 9 h for an open case, and the front row warms much faster than the mean.
 */
export const DEFAULT_TAU_HOURS: Readonly<Record<ChilledCaseKind, number>> = {
  'open-multideck': 3,
  'open-island': 2.5,
  'fish-counter': 2.5,
  'service-counter': 3,
  'produce-open': 5,
  'glass-door-chilled': 8,
  'walk-in-cooler': 12,
}

/**
 * Conductance to the shop per mass of product, W/(kg·K), of the warmest
 * package of a frozen case, and the food taken where none is named. Our own
 * estimates. Peas warm fastest to −12 °C of the foods the program carries,
 * as nearly all of their ice melts close to 0 °C.
 */
export const DEFAULT_FROZEN_HOLD: Readonly<Record<FrozenCaseKind, { uaPerKgWPerK: number, food: FoodId }>> = {
  'open-coffin': { uaPerKgWPerK: 0.25, food: 'peas' },
  'glass-door-frozen': { uaPerKgWPerK: 0.15, food: 'peas' },
  'walk-in-freezer': { uaPerKgWPerK: 0.06, food: 'peas' },
}

/** What is known of a case beyond its kind; what is absent comes from the defaults. */
export interface CaseHold {
  startC: number
  ambientC: number
  limitC: number
  /** Chilled: the case's own time constant, hours. */
  tauHours?: number
  /** Frozen: the food in it. */
  food?: FoodId | FoodComposition
  /** Frozen: its own conductance per mass, W/(kg·K). */
  uaPerKgWPerK?: number
}

/** The question to put to `holdTime` for a warming case of a kind with an upper limit. */
export function holdInputOf(kind: CaseKind, known: CaseHold): HoldInput {
  const { startC, ambientC, limitC } = known
  const common = { startC, ambientC, limitC, limitSide: 'upper' as const }
  if (!isFrozenKind(kind)) {
    return { kind: 'chilled', tauHours: known.tauHours ?? DEFAULT_TAU_HOURS[kind], ...common }
  }
  const usual = DEFAULT_FROZEN_HOLD[kind]
  return {
    kind: 'frozen',
    food: known.food ?? usual.food,
    massKg: 1,
    uaWPerK: known.uaPerKgWPerK ?? usual.uaPerKgWPerK,
    ...common,
  }
}
