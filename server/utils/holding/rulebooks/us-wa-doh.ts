import type { Authority, ChartCell, Rulebook, Threshold } from '../types'

const CHART: Authority = { clause: 'outage chart for cold food', source: 'Washington State Department of Health', mark: 'V' }

const TO_45: ChartCell<Threshold> = {
  to: 45,
  included: true,
  verdict: 'above',
  ask: null,
  act: 'It may be sold: cool it to the limit or below at once.',
}
const BELOW_51: ChartCell<Threshold> = {
  to: 51,
  included: false,
  verdict: 'above',
  ask: null,
  act: 'It may be sold: cool it to the limit or below at once, before the deadline.',
}
const BELOW_51_TOO_LONG: ChartCell<Threshold> = {
  ...BELOW_51,
  verdict: 'discard',
  act: 'Discard it: over 45 °F too long after control was lost.',
}
const FROM_51: ChartCell<Threshold> = {
  to: null,
  included: false,
  verdict: 'above',
  ask: null,
  act: 'Cool it to the limit or below at once, before the deadline.',
}
const FROM_51_TOO_LONG: ChartCell<Threshold> = {
  ...FROM_51,
  verdict: 'discard',
  act: 'Discard it: 51 °F or over too long after control was lost.',
}

export const usWaDoh: Rulebook = {
  id: 'us-wa-doh',
  version: '2026-01',
  changed: [],
  name: 'Washington State, outage chart of the Department of Health',
  unit: 'F',
  classes: [
    {
      id: 'tcs',
      name: 'Food that needs time and temperature control for safety',
      limit: 41,
      within: CHART,
      judgedBy: 'product',
      lowMark: 30,
      hotFrom: null,
      rules: [
        {
          kind: 'started-warm',
          verdict: 'act',
          act: 'The chart is for food that was within the limit at the start: have a supervisor decide on this product now.',
          authority: CHART,
        },
        {
          kind: 'chart',
          rows: [
            { until: 120, cells: [TO_45, BELOW_51, FROM_51] },
            { until: 240, cells: [TO_45, BELOW_51, FROM_51_TOO_LONG] },
            { until: null, cells: [TO_45, BELOW_51_TOO_LONG, FROM_51_TOO_LONG] },
          ],
          authority: CHART,
        },
      ],
      choice: null,
      notes: [],
    },
  ],
  notices: [],
}
