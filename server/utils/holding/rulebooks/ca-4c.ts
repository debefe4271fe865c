import type { Authority, Rulebook } from '../types'

const SHEET: Authority = { clause: 'outage sheet for food service', source: 'Canadian outage sheet for food service', mark: 'V' }

export const ca4c: Rulebook = {
  id: 'ca-4c',
  version: '2026-01',
  changed: [],
  name: 'Canada, 4 °C and 2 hours',
  unit: 'C',
  classes: [
    {
      id: 'tcs',
      name: 'Potentially hazardous food',
      limit: 4,
      within: SHEET,
      judgedBy: 'product',
      lowMark: -1,
      hotFrom: null,
      rules: [
        {
          kind: 'clock',
          over: 'limit',
          counts: 'over',
          overdueCounts: true,
          steps: [{
            minutes: 120,
            reached: 'after',
            verdict: 'discard',
            act: 'Discard it: too long over the limit or without a reading.',
          }],
          act: 'Cool it to the limit or below before the deadline.',
          authority: SHEET,
        },
      ],
      choice: null,
      notes: ['Time without a reading, once a round is overdue, is added to the minutes over the limit.'],
    },
  ],
  notices: [],
}
