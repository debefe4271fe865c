/** The hold alone is what the whole forecast says; a rule of this project, no published source. */
import { describe, expect, it } from 'vitest'
import { forecastCase, holdToLimit } from '../../../server/utils/hold/for-outage'
import type { RecordStage } from '../../support/scenario'
import { buildRecord } from '../../support/scenario'

const MINUTE = 60_000

describe('the hold to the limit', () => {
  const records = (['approved', 'in-hand', 'dark', 'hand-back'] satisfies RecordStage[]).map(until => buildRecord({ until, roundsAt: [10, 20, 35, 50, 90] }))
  // With no suction known a case is not held on; a limit above the shop's air is never reached.
  const states = records.flatMap(({ state, now }) => [
    { state, now },
    { state: { ...state, pressures: [], snapshot: { ...state.snapshot, suctionGroups: [] } }, now },
    { state: { ...state, snapshot: { ...state.snapshot, cases: state.snapshot.cases.map(known => ({ ...known, limit: { value: 30, unit: 'C' as const } })) } }, now },
    { state: { ...state, points: Object.fromEntries(Object.entries(state.points).map(([tag, point]) => [tag, { ...point, status: 'auto' as const, hand: null }])) }, now },
  ])

  it('is that of the forecast, in every phase and at every moment', () => {
    const seen = new Set<string>()
    for (const { state, now } of states) {
      for (const at of [-120, -45, -5, 0, 3, 30, 240].map(minutes => now + minutes * MINUTE)) {
        for (const known of state.snapshot.cases) {
          const { toward, holdMinutes } = forecastCase(state, known, at)
          const hold = holdToLimit(state, known, at)
          expect(hold, `${known.name} ${at - now}`).toBe(toward === 'limit' ? holdMinutes : 'held')
          seen.add(typeof hold === 'number' ? 'minutes' : String(hold))
        }
      }
    }
    expect([...seen].sort()).toEqual(['held', 'minutes', 'null'])
  })
})
