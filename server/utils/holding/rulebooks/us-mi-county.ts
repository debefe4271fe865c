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
    steps: [{ minutes, reached: 'at', verdict: 'discard', act: `Discard it: too long at ${words} or over.` }],
    act: 'Cool it to the limit or below before the deadline.',
    authority: GUIDANCE,
  }
}

export const usMiCounty: Rulebook = {
  id: 'us-mi-county',
  version: '2026-01',
  changed: [],
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
        line(50, 120, '50 °F'),
        line(46, 240, '46 °F'),
        line('limit', 300, 'the limit itself'),
      ],
      choice: null,
      notes: [],
    },
  ],
  notices: [],
}
