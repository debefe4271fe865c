/**
 * How an act on a case opens and ends. A verdict `act` or `discard` opens one, and so does the server
 * when a deadline is near or the hold has grown short. What is signed ends it or only records a measure:
 *
 * - discarded, with nothing left in the case: ends any;
 * - moved, used, emptied, with nothing left in the case: ends any but `discard`;
 * - cool by, night covers, ice, restored by hand: measures. They end nothing; afterwards a reading at or
 *   under the limit ends an act opened by a near deadline or a short hold;
 * - decided otherwise, by a supervisor: ends any.
 *
 * A short hold is also ended by the server once readings show that the case holds long enough again.
 * A near deadline is also ended by a reading at or under the limit alone. A verdict `act` is never ended
 * by a reading: product that must be used, moved or decided upon does not become sound by being cold again.
 */
import type { Act } from './kinds/rounds'
import type { ActCause } from './kinds/server'
import { celsius, inUnit, isOver, openDark } from './select'
import type { ActOpening, CaseState, Mark, OutageState, ReadingState } from './state'

/** Acts after which nothing of the case is left to judge, unless product was left. */
const EMPTYING: readonly Act[] = ['moved', 'used', 'emptied', 'discarded']
/** Acts that hold a case for a while. */
export const MEASURES: readonly Act[] = ['cool-by', 'night-covers', 'ice', 'restored-by-hand']

/** The act that is open on a case, or null. */
export function openingOf(item: CaseState): ActOpening | null {
  return item.openAct === null ? null : item.openings.find(opening => opening.seq === item.openAct) ?? null
}

export function openAct(item: CaseState, cause: ActCause, deadline: number | null, mark: Mark): void {
  closeAct(item, 'worse', mark)
  item.openings.push({ seq: mark.seq, at: mark.at, cause, deadline, closed: null })
  item.openAct = mark.seq
}

export function closeAct(item: CaseState, how: NonNullable<ActOpening['closed']>['how'], mark: Mark): void {
  const opening = openingOf(item)
  if (opening) opening.closed = { how, mark }
  item.openAct = null
}

/** What a signed act does to the case and to the act that is open on it. */
export function endBySigning(item: CaseState, { act, left }: { act: Act, left: boolean }, mark: Mark): void {
  if (EMPTYING.includes(act) && !left) item.empty = true
  const ends = act === 'cooled' || (EMPTYING.includes(act) && !left)
  if (ends && (openingOf(item)?.cause !== 'discard' || act === 'discarded')) closeAct(item, 'act', mark)
}

/** The last measure signed since control was lost and no later than a moment, or null. */
export function measureOf(state: OutageState, item: CaseState, until = Infinity): CaseState['acts'][number] | null {
  const since = state.darks[0]?.from ?? -Infinity
  return item.acts.filter(act => MEASURES.includes(act.act) && act.mark.at >= since && act.mark.at <= until).at(-1) ?? null
}

/** The kind of temperature by which a class of food is judged: shell eggs alone by air. */
export function judgedMethod(foodClass: string): ReadingState['method'] {
  return foodClass === 'shell-eggs' ? 'air' : 'product'
}

/** Ends the open act where the reading that was just added proves that the case is cool. */
export function proveAct(state: OutageState, caseId: string, mark: Mark): void {
  const item = state.cases[caseId]
  const reading = item?.readings.at(-1)
  const opening = item && openingOf(item)
  if (!item || !reading || !opening || !isProof(state, item, reading) || reading.at < opening.at) return
  if (opening.cause === 'deadline-near') closeAct(item, 'reading', mark)
  // A case short of hold is within its limit before and after: only what was done, or control, makes a reading tell.
  if (opening.cause === 'hold-short' && (openDark(state) === null || measureOf(state, item, reading.at))) closeAct(item, 'reading', mark)
}

/** A proof that was corrected away opens its act again. */
export function correctProof(state: OutageState, item: CaseState, reading: ReadingState): void {
  const opening = item.openings.at(-1)
  if (opening?.closed?.how !== 'reading' || opening.closed.mark.entry !== reading.entry || isProof(state, item, reading)) return
  opening.closed = null
  item.openAct = opening.seq
}

/** An act that a decision had ended opens again where that decision was denied, unless nothing is left in the case. */
export function reopenDecided(item: CaseState, decision: string): void {
  const opening = item.openings.find(known => known.closed?.how === 'decision' && known.closed.mark.entry === decision)
  if (!opening || item.openAct !== null || item.empty) return
  opening.closed = null
  item.openAct = opening.seq
}

/** Judged as the case is judged, not struck, and at or under its limit; with its accuracy added where the site asks for it. */
function isProof(state: OutageState, item: CaseState, reading: ReadingState): boolean {
  const known = state.snapshot.cases.find(other => other.id === item.id)
  if (known === undefined || reading.struck || reading.method !== judgedMethod(known.foodClass)) return false
  const { unit } = known.limit
  const added = state.snapshot.site.holding.addAccuracy ? accuracyOf(state, reading, unit) : 0
  return !isOver({ value: inUnit(celsius(reading.value, reading.unit), unit) + added, unit }, known.limit)
}

/** ± degrees of a unit: the instrument's, else what Food Code 4-203.11 and 4-203.12 demand, as the rule engine has it. */
function accuracyOf(state: OutageState, { instrumentId, method }: ReadingState, unit: 'F' | 'C'): number {
  const instrument = state.snapshot.instruments.find(item => item.id === instrumentId)
  if (instrument) return unit === 'F' ? instrument.accuracyC * 1.8 : instrument.accuracyC
  if (method === 'air') return unit === 'F' ? 3 : 1.5
  return unit === 'F' ? 2 : 1
}
