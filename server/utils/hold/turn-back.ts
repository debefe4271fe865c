import type { OutageState } from '~~/shared/record/state'
import type { CaseForecast } from './for-outage'

const MINUTE = 60_000

export interface TurnBack {
  /** the latest moment to turn back, Unix ms */
  at: number
  /** when the first case gets worse, Unix ms */
  deadline: number
  caseId: string
  /** the deadline is the rulebook's, of a case that is over its limit already; else the careful end of a hold */
  byRulebook: boolean
}

/**
 * The latest turn-back: the first deadline of any case less the 19-in-20 time of the roll-back. A
 * case within its limit gets worse when it meets it (the careful end of its hold); one over it, at the
 * deadline of the rulebook's verdict; one that is to be discarded has none left. Null: no case has one.
 * @param now Unix ms, to which the forecasts count
 */
export function latestTurnBack(state: OutageState, forecasts: readonly CaseForecast[], now: number): TurnBack | null {
  const deadlines = forecasts.flatMap((forecast) => {
    const verdict = state.cases[forecast.caseId]?.verdict
    if (verdict?.verdict === 'discard') return []
    if (verdict?.deadline != null && verdict.verdict !== 'within') return [{ caseId: forecast.caseId, deadline: verdict.deadline, byRulebook: true }]
    if (forecast.toward === 'low-mark' || forecast.holdMinutes === null) return []
    return [{ caseId: forecast.caseId, deadline: now + forecast.holdMinutes * MINUTE, byRulebook: false }]
  })
  const first = deadlines.sort((a, b) => a.deadline - b.deadline || a.caseId.localeCompare(b.caseId))[0]
  return first ? { ...first, at: first.deadline - state.plan.duration.rollBack19in20 * MINUTE } : null
}
