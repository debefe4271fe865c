import { describe, expect, it } from 'vitest'
import { latestTurnBack } from '~~/server/utils/hold/turn-back'
import type { CaseForecast } from '~~/server/utils/hold/for-outage'
import { DAIRY, FISH, storyTo } from '../record/store'

const MINUTE = 60_000
const forecast = (caseId: string, holdMinutes: number | null, toward: CaseForecast['toward'] = 'limit'): CaseForecast => ({ caseId, toward, holdMinutes, likelyMinutes: holdMinutes, scattered: false, readings: 2, dueAt: 0, curve: [], held: null })

/** The way back takes 15 minutes, 19 times in 20. */
describe('latest turn-back', () => {
  const dark = () => { const { state, now } = storyTo('dark'); return { state, now } }
  const verdict = (verdict: 'above' | 'discard' | 'within', deadline: number | null) => ({ verdict, deadline, minutesAbove: 5, clause: '', source: '', act: null, why: [], at: 0, seq: 1 })

  it('is the shortest careful hold less the way back', () => {
    const { state, now } = dark()
    expect(latestTurnBack(state, [forecast(DAIRY, 40), forecast(FISH, 52)], now)).toEqual({ at: now + 25 * MINUTE, deadline: now + 40 * MINUTE, caseId: DAIRY, byRulebook: false })
  })

  it('lies in the past where the way back takes longer than the hold', () => {
    const { state, now } = dark()
    expect(latestTurnBack(state, [forecast(DAIRY, 10)], now)!.at).toBe(now - 5 * MINUTE)
  })

  it('takes the deadline of the verdict where a case is over its limit', () => {
    const { state, now } = dark()
    state.cases[DAIRY]!.verdict = verdict('above', now + 100 * MINUTE)
    expect(latestTurnBack(state, [forecast(DAIRY, 0)], now)).toEqual({ at: now + 85 * MINUTE, deadline: now + 100 * MINUTE, caseId: DAIRY, byRulebook: true })
  })

  it('leaves out what is to be discarded, what never meets its limit, and what is held on by hand', () => {
    const { state, now } = dark()
    state.cases[DAIRY]!.verdict = verdict('discard', null)
    expect(latestTurnBack(state, [forecast(DAIRY, 0), forecast(FISH, null)], now)).toBeNull()
    expect(latestTurnBack(state, [forecast(FISH, 12, 'low-mark')], now)).toBeNull()
  })

  it('of two that end together names the one with the lower id', () => {
    const { state, now } = dark()
    const [first, second] = [DAIRY, FISH].sort()
    expect(latestTurnBack(state, [forecast(second!, 30), forecast(first!, 30)], now)!.caseId).toBe(first)
  })
})
