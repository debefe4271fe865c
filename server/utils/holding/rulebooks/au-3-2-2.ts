import type { Authority, ClockRule, Rulebook, Threshold } from '../types'

const STANDARD: Authority = { clause: 'Standard 3.2.2', source: 'Australia New Zealand Food Standards Code', mark: 'V' }
const TWO_FOUR: Authority = { clause: '2-hour/4-hour rule', source: 'FSANZ; NSW Food Authority', mark: 'V' }

/** From this temperature up food is held hot, and no minutes count. */
const HOT_FROM = 60

function twoHourFourHour(over: Threshold): ClockRule {
  return {
    kind: 'clock',
    over,
    counts: 'over',
    overdueCounts: false,
    steps: [
      { minutes: 120, reached: 'at', verdict: 'act', act: 'Use or sell it now: it may not go back to cold holding.' },
      { minutes: 240, reached: 'at', verdict: 'discard', act: 'Discard it: too long between cold and hot holding.' },
    ],
    act: 'Refrigerate or use it before the deadline.',
    authority: TWO_FOUR,
  }
}

export const au322: Rulebook = {
  id: 'au-3-2-2',
  version: '2026-01',
  changed: [],
  name: 'Australia, Standard 3.2.2 and the 2-hour/4-hour rule',
  unit: 'C',
  classes: [
    {
      id: 'tcs',
      name: 'Ready-to-eat potentially hazardous food',
      limit: 5,
      within: STANDARD,
      judgedBy: 'product',
      lowMark: -1,
      hotFrom: HOT_FROM,
      rules: [twoHourFourHour('limit')],
      choice: null,
      notes: ['The 2-hour/4-hour rule is for ready-to-eat food.'],
    },
    {
      id: 'frozen',
      name: 'Frozen food',
      limit: -15,
      within: { clause: 'keep mark −15 °C', source: 'common practice, no source', mark: 'common practice' },
      judgedBy: 'product',
      lowMark: null,
      hotFrom: HOT_FROM,
      rules: [
        twoHourFourHour(5),
        {
          kind: 'rises',
          from: 2,
          verdict: 'act',
          act: 'Use or sell it now: it may be refrozen only once.',
          authority: { clause: 'refreezing once', source: 'common practice, no source', mark: 'common practice' },
        },
        {
          kind: 'mark',
          over: 'limit',
          verdict: 'above',
          act: 'Bring it back to the keep mark; it may be refrozen once.',
          authority: { clause: 'keep mark −15 °C', source: 'common practice, no source', mark: 'common practice' },
        },
      ],
      choice: null,
      notes: [],
    },
  ],
  notices: [],
}
