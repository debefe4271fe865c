import type { Authority, ClockRule, Rulebook, Threshold } from '../types'

const GUIDANCE: Authority = {
  clause: 'outage guidance: temperature and hours',
  source: 'Berrien County Health Department, Michigan',
  mark: 'VS',
}

/** One line of the guidance: so many minutes at a temperature or over it, and the product is lost. */
function line(over: Threshold, minutes: number, words: string): ClockRule {
  return {
    kind: 'clock',
    over,
    counts: 'at-or-over',
    overdueCounts: false,
    steps: [{ minutes, reached: 'at', verdict: 'discard', act: `Discard it: ${words}.` }],
    act: 'Cool it to the limit or below before the deadline.',
    authority: GUIDANCE,
  }
}

export const usMiCounty: Rulebook = {
  id: 'us-mi-county',
  version: '2026-01',
  name: 'Michigan, county outage guidance (Berrien County)',
  unit: 'F',
  classes: [
    {
      id: 'tcs',
      name: 'Food that needs time and temperature control for safety',
      limit: 41,
      within: GUIDANCE,
      judgedBy: 'product',
      lowMark: 30,
      hotFrom: null,
      rules: [
        line(50, 120, '2 hours or more at 50 °F or over'),
        line(46, 240, '4 hours or more at 46 °F or over'),
        line('limit', 300, '5 hours or more at 41 °F or over'),
      ],
      choice: null,
      notes: [],
    },
  ],
  notices: [],
}
