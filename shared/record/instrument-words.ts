/** What is said of a thermometer's check. */
import { countWords, dateWords, numberWords } from '../charts/words'
import type { InstrumentLine } from './instruments'
import { checkStanding } from './instruments'
import type { OutageState } from './state'

/** The ice point. */
export const ICE_POINT = { C: 0, F: 32 } as const

/** "±0.9 °F". @param accuracyC ± kelvin */
export function accuracyWords(accuracyC: number, unit: 'F' | 'C'): string {
  return `±${numberWords(unit === 'F' ? accuracyC * 1.8 : accuracyC)} °${unit}`
}

/** A day as people write it. @param day 2026-03-03 */
export function dayWords(day: string): string {
  return dateWords(`${day}T12:00:00.000Z`, 'UTC')
}

/** What is wrong with an instrument's check at a moment, in a sentence or two; null when nothing is. @param at Unix ms */
export function standingWords(state: OutageState, instrumentId: string, at: number): string | null {
  const { lastOn, days, overdue, out } = checkStanding(state, instrumentId, at)
  if (out) return 'It was out of tolerance in ice: use another one.'
  if (!overdue) return null
  const every = `The site asks for a check every ${countWords(state.snapshot.site.instrumentCheckDays, 'day')}.`
  return lastOn === null || days === null ? `It was never checked. ${every}` : `Last checked ${dayWords(lastOn)}, ${countWords(days, 'day')} ago. ${every}`
}

/** What a record points out of an instrument that was used; null where nothing is to be said. */
export function doubtWords(line: InstrumentLine): string | null {
  const parts = [
    line.outReadings > 0 || line.checks.some(check => !check.within) ? `out of tolerance in ice, ${countWords(line.outReadings, 'reading')} by it` : '',
    line.overdueReadings > 0 ? `${line.lastOn === null ? 'never checked' : 'check overdue'}, ${countWords(line.overdueReadings, 'reading')} by it` : '',
  ].filter(Boolean)
  return parts.length === 0 ? null : `${line.name}: ${parts.join('; ')}`
}
