/** What a plan may do for its product, and what it may assume otherwise than the product does. */
import { isFrozenKind, isOpenKind } from './case-kinds'
import type { CaseKind } from './case-kinds'

export const MEASURE_KINDS = ['night-covers', 'doors-shut', 'earlier-defrost', 'product-moved', 'dry-ice', 'other'] as const
export type MeasureKind = (typeof MEASURE_KINDS)[number]

export interface MeasureFacts {
  words: string
  /** What it does, as it stands behind "would lengthen it". */
  does: string
  /** So many times as long does the case hold: our own estimates. */
  factor: number
  suits: (kind: CaseKind) => boolean
}

const any = () => true

/** Measures with their factors, in the order in which they are offered. The factors are our own estimates. */
export const MEASURES: Readonly<Record<MeasureKind, MeasureFacts>> = {
  'night-covers': { words: 'Night covers drawn', does: 'night covers', factor: 1.5, suits: isOpenKind },
  'doors-shut': { words: 'Doors kept shut, no restocking', does: 'fewer doors', factor: 1.2, suits: kind => !isOpenKind(kind) },
  'earlier-defrost': { words: 'Pre-cooled by an earlier defrost', does: 'pre-cooling by an earlier defrost', factor: 1.15, suits: any },
  'product-moved': { words: 'Product moved out before the start', does: 'moving product out', factor: 1, suits: any },
  'dry-ice': { words: 'Dry ice laid', does: 'dry ice', factor: 2, suits: kind => isFrozenKind(kind) || !isOpenKind(kind) },
  'other': { words: 'Other', does: 'another measure', factor: 1, suits: any },
}

/** start-c and tau-hours: of a case. load-kw: of a suction group. air-c, lead-minutes, mains-hz: of the plan. */
export const ASSUMPTIONS = ['start-c', 'tau-hours', 'load-kw', 'air-c', 'lead-minutes', 'mains-hz'] as const
export type AssumptionKind = (typeof ASSUMPTIONS)[number]

export const ASSUMPTION_RANGE: Readonly<Record<AssumptionKind, { min: number, max: number }>> = {
  'start-c': { min: -40, max: 30 },
  'tau-hours': { min: 0.1, max: 200 },
  'load-kw': { min: 0, max: 5000 },
  'air-c': { min: -10, max: 50 },
  'lead-minutes': { min: 0, max: 1440 },
  'mains-hz': { min: 40, max: 70 },
}
