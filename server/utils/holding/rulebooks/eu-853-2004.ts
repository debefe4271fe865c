import type { Authority, FoodClass, Rulebook } from '../types'

const ANNEX_III: Authority = { clause: 'Annex III', source: 'Regulation (EC) 853/2004', mark: 'V' }
const LIMITED_PERIODS = 'Limited periods outside temperature control are allowed without a number (Regulation (EC) 852/2004 Annex II chapter IX point 5).'
const NOT_FOR_RETAIL = 'Regulation (EC) 853/2004 does not bind ordinary retail (from memory): it serves here as a profile of the product.'

/** A product's profile: over its temperature something must be done at once, no clock being in the law. */
function product(id: string, name: string, limit: number, within: Authority, notes: string[] = []): FoodClass {
  return {
    id,
    name,
    limit,
    within,
    judgedBy: 'product',
    lowMark: -1,
    hotFrom: null,
    rules: [
      {
        kind: 'mark',
        over: 'limit',
        verdict: 'act',
        act: 'Move it to refrigeration that holds the limit now, and have a supervisor decide on it.',
        authority: within,
      },
    ],
    choice: null,
    notes: [...notes, LIMITED_PERIODS, NOT_FOR_RETAIL],
  }
}

const MOVE_FROZEN = 'Move it to a freezer that holds the limit now, and have a supervisor decide on it.'
const TOLERANCE: Authority = { clause: 'Article 5(2)', source: 'Directive 89/108/EEC', mark: 'V' }
const FROZEN_LIMIT: Authority = { clause: '−18 °C', source: 'Directive 89/108/EEC', mark: 'V' }
const STATE_CHOICE: Authority = { clause: 'Article 5(2), Member State’s choice for retail cabinets', source: 'Directive 89/108/EEC', mark: 'V' }

export const eu8532004: Rulebook = {
  id: 'eu-853-2004',
  version: '2026-01',
  changed: [],
  name: 'European Union, product temperatures of Regulation 853/2004 and quick-frozen food',
  unit: 'C',
  classes: [
    product('meat', 'Meat', 7, ANNEX_III),
    product('offal', 'Offal', 3, ANNEX_III),
    product('poultry', 'Poultry', 4, ANNEX_III),
    product('minced-meat', 'Minced meat', 2, ANNEX_III, ['Minced meat is never refrozen.']),
    product('meat-preparations', 'Meat preparations', 4, ANNEX_III),
    product('fish', 'Fresh fish', 2, {
      clause: 'Annex III, approaching melting ice (0 to 2 °C by the French arrêté of 1995)',
      source: 'Regulation (EC) 853/2004',
      mark: 'V',
    }),
    {
      id: 'quick-frozen',
      name: 'Quick-frozen food in a retail cabinet',
      limit: -18,
      within: FROZEN_LIMIT,
      judgedBy: 'product',
      lowMark: null,
      hotFrom: null,
      rules: [
        { kind: 'mark', over: -15, verdict: 'act', act: MOVE_FROZEN, authority: TOLERANCE },
        { kind: 'mark', over: 'limit', verdict: 'above', act: 'Bring it to the limit or below.', authority: TOLERANCE },
      ],
      choice: {
        flag: 'allowsMinus12',
        limit: -12,
        within: STATE_CHOICE,
        rules: [{ kind: 'mark', over: 'limit', verdict: 'act', act: MOVE_FROZEN, authority: STATE_CHOICE }],
      },
      notes: [],
    },
    {
      id: 'quick-frozen-storage',
      name: 'Quick-frozen food in storage',
      limit: -18,
      within: FROZEN_LIMIT,
      judgedBy: 'product',
      lowMark: null,
      hotFrom: null,
      rules: [{ kind: 'mark', over: 'limit', verdict: 'act', act: MOVE_FROZEN, authority: FROZEN_LIMIT }],
      choice: null,
      notes: [],
    },
  ],
  notices: [],
}
