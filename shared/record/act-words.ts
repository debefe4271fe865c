/** Acts in words: why one is open, what ends it, and what is to be discarded. */
import { clockWords, temperatureWords } from '../charts/words'
import { measureOf, openingOf } from './act-course'
import { isoTime } from './entry'
import type { ActCause } from './kinds/server'
import { ACT_WORDS } from './kinds/rounds'
import { caseName, nameOf, openDark } from './select'
import type { ActState, CaseState, OutageState } from './state'

/** Under so many minutes of hold an act opens. */
export const SHORT_HOLD_MINUTES = 15
/** Why an act is open. */
export const CAUSE_WORDS: Record<ActCause, string> = {
  'hold-short': `under ${SHORT_HOLD_MINUTES} min of hold left`,
  'deadline-near': 'its deadline is near',
  'act': 'its verdict asks for an act now',
  'discard': 'it must be discarded',
}

/** Time of day at the site. @param at Unix ms */
export function siteClock(state: OutageState, at: number): string {
  return clockWords(isoTime(at), state.snapshot.site.timeZone)
}

/** The limit of a case as its rulebook writes it. */
export function limitWords(state: OutageState, caseId: string): string {
  const limit = state.snapshot.cases.find(item => item.id === caseId)?.limit
  return limit ? temperatureWords(limit.value, limit.unit) : 'its limit'
}

/** A measure in words: "to be cooled by 03:10", "night covers drawn". */
export function measureWords(state: OutageState, { act, coolBy }: ActState): string {
  return act === 'cool-by' && coolBy !== null ? `to be cooled by ${siteClock(state, coolBy)}` : ACT_WORDS[act].toLowerCase()
}

/** What ends the act that is open on a case, in words. */
export function endsBy(state: OutageState, item: CaseState): string {
  const cause = openingOf(item)?.cause
  if (cause === 'discard') return 'sign what is discarded'
  if (cause === 'act') return 'sign what is done with the product'
  const measure = measureOf(state, item)
  if (cause === 'hold-short' && !measure && openDark(state)) return 'sign what is done'
  return measure ? `${measureWords(state, measure)}, a reading at or under ${limitWords(state, item.id)} proves it` : 'sign what is done, or read it at or under its limit'
}

/** Each case on which an act is open, with why and what ends it; in the order of the equipment. */
export function openActFaults(state: OutageState): string[] {
  return state.snapshot.cases.flatMap(({ id }) => {
    const item = state.cases[id]
    const opening = item && openingOf(item)
    return item && opening ? [`${caseName(state, id)}: an act is open, ${CAUSE_WORDS[opening.cause]}: ${endsBy(state, item)}`] : []
  })
}

/** Product that was discarded: what the shop's contact is told. */
export interface Discard { caseId: string, name: string, product: string, quantity: number | null, unit: string, place: string, takenBy: string, photos: string[], seq: number, entry: string, at: number, by: string }

/** Every signed discard of an outage, in the order of the log. */
export function discards(state: OutageState): Discard[] {
  return Object.values(state.cases)
    .flatMap(item => item.acts.filter(act => act.act === 'discarded').map(({ product, quantity, unit, place, takenBy, photos, mark }): Discard => ({
      caseId: item.id, name: caseName(state, item.id), product, quantity, unit, place, takenBy, photos, seq: mark.seq, entry: mark.entry, at: mark.at, by: nameOf(state, mark.by),
    })))
    .sort((a, b) => a.seq - b.seq)
}
