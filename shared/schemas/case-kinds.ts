/**
 * The kinds of refrigerated case that the program knows. Forms, tables and
 * the plan's default time constants all take their list from here.
 */
export const CASE_KINDS = [
  'open-multideck',
  'open-island',
  'fish-counter',
  'service-counter',
  'produce-open',
  'glass-door-chilled',
  'walk-in-cooler',
  'open-coffin',
  'glass-door-frozen',
  'walk-in-freezer',
] as const

export type CaseKind = (typeof CASE_KINDS)[number]

/** The words by which people are told of a kind, as they stand within a sentence. */
export const CASE_KIND_WORDS: Readonly<Record<CaseKind, string>> = {
  'open-multideck': 'open multideck',
  'open-island': 'open island',
  'fish-counter': 'fish counter',
  'service-counter': 'service counter',
  'produce-open': 'open produce case',
  'glass-door-chilled': 'chilled glass-door case',
  'walk-in-cooler': 'walk-in cooler',
  'open-coffin': 'open frozen coffin',
  'glass-door-frozen': 'frozen glass-door case',
  'walk-in-freezer': 'walk-in freezer',
}

export const FROZEN_CASE_KINDS = ['open-coffin', 'glass-door-frozen', 'walk-in-freezer'] as const

export type FrozenCaseKind = (typeof FROZEN_CASE_KINDS)[number]
export type ChilledCaseKind = Exclude<CaseKind, FrozenCaseKind>

/** True for a case that holds frozen product. */
export function isFrozenKind(kind: CaseKind): kind is FrozenCaseKind {
  return (FROZEN_CASE_KINDS as readonly CaseKind[]).includes(kind)
}

const OPEN_CASE_KINDS: readonly CaseKind[] = [
  'open-multideck',
  'open-island',
  'fish-counter',
  'service-counter',
  'produce-open',
  'open-coffin',
]

/**
 * True for a case with no door between product and shop. A service or fish
 * counter is open to the air behind its front glass, so it counts.
 */
export function isOpenKind(kind: CaseKind): boolean {
  return OPEN_CASE_KINDS.includes(kind)
}

const SLOW_CASE_KINDS: readonly CaseKind[] = ['glass-door-frozen', 'walk-in-freezer', 'walk-in-cooler']

/** True for closed freezers and walk-ins, whose rounds may lie up to an hour apart. */
export function isSlowKind(kind: CaseKind): boolean {
  return SLOW_CASE_KINDS.includes(kind)
}
