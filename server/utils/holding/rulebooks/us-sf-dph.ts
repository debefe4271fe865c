import type { Authority, ChartCell, Rulebook, Threshold } from '../types'

const CHART: Authority = {
  clause: 'outage chart for cold food',
  source: 'San Francisco Department of Public Health',
  mark: 'V',
}

type Cell = ChartCell<Threshold>

const to45 = (verdict: Cell['verdict'], ask: Cell['ask'], act: string): Cell => ({ to: 45, included: true, verdict, ask, act })
const below50 = (verdict: Cell['verdict'], ask: Cell['ask'], act: string): Cell => ({ to: 50, included: false, verdict, ask, act })

const FROM_50: Cell = { to: null, included: false, verdict: 'discard', ask: null, act: 'Discard it: 50 °F or over.' }

export const usSfDph: Rulebook = {
  id: 'us-sf-dph',
  version: '2026-01',
  changed: [],
  name: 'San Francisco, outage chart of the Department of Public Health',
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
          kind: 'chart',
          rows: [
            {
              until: 120,
              cells: [
                to45('above', null, 'Cool it to the limit or below.'),
                below50('above', { to: 45, minutes: 120 }, 'It may then be kept.'),
                FROM_50,
              ],
            },
            {
              // The chart's row is 2 to 3 hours; 3 to 4 hours is not on it and is read as this row.
              until: 240,
              cells: [
                to45('above', { to: 'limit', minutes: 120 }, 'It may then be kept.'),
                below50('act', { to: 45, minutes: 60 }, 'Discard it if that fails.'),
                FROM_50,
              ],
            },
            {
              until: null,
              cells: [
                to45('act', { to: 'limit', minutes: 60 }, 'Discard it if that fails.'),
                below50('discard', null, 'Discard it: over 45 °F too long after control was lost.'),
                FROM_50,
              ],
            },
          ],
          authority: CHART,
        },
      ],
      choice: null,
      notes: ['The chart’s row of 2 to 3 hours is read up to 4 hours, since 3 to 4 hours is not on it.'],
    },
  ],
  notices: [],
}
