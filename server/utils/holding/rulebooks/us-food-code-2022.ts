import type { Authority, Rulebook } from '../types'

const OUTAGE_PRACTICE: Authority = {
  clause: 'outage practice: 4 hours over the limit',
  source: 'outage guidance of Iowa DIAL, El Paso and Washoe County',
  mark: 'V',
}

const FROZEN_PRACTICE: Authority = {
  clause: 'outage practice: thawed frozen food',
  source: 'outage guidance of Iowa DIAL',
  mark: 'V',
}

const KEEP_MARK: Authority = {
  clause: 'keep mark 10 °F (3-501.11 gives no number)',
  source: 'common practice, no source',
  mark: 'common practice',
}

const DISCARD_AFTER_FOUR_HOURS = {
  minutes: 240,
  reached: 'after',
  verdict: 'discard',
  act: 'Discard it: over the limit for longer than is allowed.',
} as const

export const usFoodCode2022: Rulebook = {
  id: 'us-food-code-2022',
  version: '2026-01',
  changed: [],
  name: 'United States, FDA Food Code 2022 with the outage practice of state agencies',
  unit: 'F',
  classes: [
    {
      id: 'tcs',
      name: 'Food that needs time and temperature control for safety',
      limit: 41,
      within: { clause: '3-501.16(A)(2)', source: 'FDA Food Code 2022', mark: 'VA' },
      judgedBy: 'product',
      lowMark: 30,
      hotFrom: null,
      rules: [
        {
          kind: 'clock',
          over: 'limit',
          counts: 'over',
          overdueCounts: false,
          steps: [DISCARD_AFTER_FOUR_HOURS],
          act: 'Cool it to the limit or below before the deadline.',
          authority: OUTAGE_PRACTICE,
        },
      ],
      choice: null,
      notes: [],
    },
    {
      id: 'shell-eggs',
      name: 'Shell eggs, judged by the air about them',
      limit: 45,
      within: { clause: '3-501.16(B)', source: 'FDA Food Code 2022', mark: 'VA' },
      judgedBy: 'air',
      lowMark: null,
      hotFrom: null,
      rules: [
        {
          kind: 'clock',
          over: 'limit',
          counts: 'over',
          overdueCounts: false,
          steps: [DISCARD_AFTER_FOUR_HOURS],
          act: 'Bring the air about the eggs to the limit or below before the deadline.',
          authority: OUTAGE_PRACTICE,
        },
      ],
      choice: null,
      notes: [],
    },
    {
      id: 'frozen',
      name: 'Frozen food',
      limit: 10,
      within: KEEP_MARK,
      judgedBy: 'product',
      lowMark: null,
      hotFrom: null,
      rules: [
        {
          kind: 'clock',
          over: 41,
          counts: 'over',
          overdueCounts: false,
          steps: [{ ...DISCARD_AFTER_FOUR_HOURS, act: 'Discard it: thawed and over 41 °F for longer than is allowed.' }],
          act: 'Refreeze it, or cool it to 41 °F or below, before the deadline.',
          authority: FROZEN_PRACTICE,
        },
        {
          kind: 'mark',
          over: 'limit',
          verdict: 'above',
          act: 'Bring it back to the keep mark; it may be refrozen.',
          authority: FROZEN_PRACTICE,
        },
      ],
      choice: null,
      notes: [],
    },
    {
      id: 'ice-cream',
      name: 'Ice cream and frozen desserts',
      limit: 10,
      within: KEEP_MARK,
      judgedBy: 'product',
      lowMark: null,
      hotFrom: null,
      rules: [
        {
          kind: 'mark',
          over: 22,
          verdict: 'discard',
          act: 'Discard it: it has partly thawed.',
          authority: { clause: 'discard once partly thawed', source: 'FoodSafety.gov chart', mark: 'V' },
        },
        {
          kind: 'mark',
          over: 'limit',
          verdict: 'act',
          act: 'Move it to a colder freezer now; discard what has softened.',
          authority: KEEP_MARK,
        },
      ],
      choice: null,
      notes: ['22 °F (−5.6 °C) as the point over which ice cream has partly thawed is from memory.'],
    },
  ],
  notices: [
    {
      words: 'An extended interruption may be an imminent health hazard: discontinue the operations concerned and tell the authority.',
      afterMinutes: null,
      clause: '8-404.11',
      source: 'FDA Food Code 2022',
      mark: 'VA',
    },
    {
      words: 'Oklahoma: close and tell the authority when an interruption lasts more than 4 hours.',
      afterMinutes: 240,
      clause: 'closure over 4 hours',
      source: 'Oklahoma outage guidance',
      mark: 'V',
    },
    {
      words: 'Georgia (district guidance): close and tell the authority when an interruption lasts 2 hours or more.',
      afterMinutes: 120,
      clause: 'closure at 2 hours or more',
      source: 'Georgia health district outage guidance',
      mark: 'V',
    },
    {
      words: 'Southern Nevada: an interruption of 2 hours or less may be allowed.',
      afterMinutes: 120,
      clause: 'operation up to 2 hours',
      source: 'Southern Nevada Health District outage guidance',
      mark: 'V',
    },
  ],
}
