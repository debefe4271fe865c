import type { Authority, Rulebook } from '../types'

const HOLDING: Authority = { clause: 'Schedule 4 paragraph 2', source: 'SI 2013/2996', mark: 'V' }
const FOUR_HOURS: Authority = { clause: 'Schedule 4 paragraph 5(1)', source: 'SI 2013/2996', mark: 'VA' }
const ADVICE: Authority = { clause: 'advice on thawed quick-frozen food', source: 'local-authority advice', mark: 'V' }
const ICE_CREAM_MARK: Authority = { clause: 'keep mark −12 °C', source: 'common practice, no source', mark: 'common practice' }

export const ukEngland2013: Rulebook = {
  id: 'uk-england-2013',
  version: '2026-01',
  changed: [],
  name: 'England, Food Safety and Hygiene Regulations 2013 and quick-frozen foodstuffs',
  unit: 'C',
  classes: [
    {
      id: 'chilled',
      name: 'Chilled food on display or for service',
      limit: 8,
      within: HOLDING,
      judgedBy: 'product',
      lowMark: -1,
      hotFrom: null,
      rules: [
        {
          kind: 'rises',
          from: 2,
          verdict: 'discard',
          act: 'Discard it: only one period above the limit is allowed. A signed decision may argue paragraph 5(2), breakdown.',
          authority: FOUR_HOURS,
        },
        {
          // The sum over all periods is that of the single one: a second period is lost before its minutes matter.
          kind: 'clock',
          over: 'limit',
          counts: 'over',
          overdueCounts: false,
          steps: [{
            minutes: 240,
            reached: 'at',
            verdict: 'discard',
            act: 'Discard it: its one period above the limit was too long. A signed decision may argue paragraph 5(2), breakdown.',
          }],
          act: 'Bring it to the limit or below before the deadline; this single period is the only one.',
          authority: FOUR_HOURS,
        },
      ],
      choice: null,
      notes: [],
    },
    {
      id: 'chilled-storage',
      name: 'Chilled food in storage',
      limit: 8,
      within: HOLDING,
      judgedBy: 'product',
      lowMark: -1,
      hotFrom: null,
      rules: [
        {
          kind: 'mark',
          over: 'limit',
          verdict: 'act',
          act: 'Move it to refrigeration that holds the limit now, and have a supervisor decide on it.',
          authority: { ...HOLDING, clause: 'Schedule 4 paragraph 2 (paragraph 5(1) is for display and service only)' },
        },
      ],
      choice: null,
      notes: [],
    },
    {
      id: 'quick-frozen',
      name: 'Quick-frozen food in a retail cabinet',
      limit: -12,
      within: { clause: 'paragraph 2(b)(ii)', source: 'SI 2007/191', mark: 'V' },
      judgedBy: 'product',
      lowMark: null,
      hotFrom: null,
      rules: [
        {
          kind: 'clock',
          over: 8,
          counts: 'over',
          overdueCounts: false,
          steps: [{ minutes: 240, reached: 'after', verdict: 'discard', act: 'Discard it: over 8 °C for longer than is advised.' }],
          act: 'Bring it to 8 °C or below before the deadline; it may no longer be sold as quick-frozen once thawed.',
          authority: ADVICE,
        },
        {
          kind: 'mark',
          over: 'limit',
          verdict: 'above',
          act: 'Bring it to the limit or below, or move it to a colder freezer.',
          authority: ADVICE,
        },
      ],
      choice: null,
      notes: ['Ice cream is outside this law.'],
    },
    {
      id: 'quick-frozen-storage',
      name: 'Quick-frozen food in storage',
      limit: -18,
      within: { clause: 'paragraph 1', source: 'SI 2007/191', mark: 'V' },
      judgedBy: 'product',
      lowMark: null,
      hotFrom: null,
      rules: [
        {
          kind: 'mark',
          over: 'limit',
          verdict: 'act',
          act: 'Move it to a freezer that holds the limit now, and have a supervisor decide on it.',
          authority: { clause: 'paragraph 1', source: 'SI 2007/191', mark: 'V' },
        },
      ],
      choice: null,
      notes: ['Ice cream is outside this law.'],
    },
    {
      id: 'ice-cream',
      name: 'Ice cream',
      limit: -12,
      within: ICE_CREAM_MARK,
      judgedBy: 'product',
      lowMark: null,
      hotFrom: null,
      rules: [
        {
          kind: 'mark',
          over: -5.6,
          verdict: 'discard',
          act: 'Discard it: it has partly thawed.',
          authority: { clause: 'freezing point of ice cream, −5.6 °C', source: 'from memory', mark: 'M' },
        },
        {
          kind: 'mark',
          over: 'limit',
          verdict: 'act',
          act: 'Move it to a colder freezer now; discard what has softened.',
          authority: ICE_CREAM_MARK,
        },
      ],
      choice: null,
      notes: [],
    },
  ],
  notices: [],
}
