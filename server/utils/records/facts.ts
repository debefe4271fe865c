/** What the log of an outage says to those who look for it; times in seconds, moments in Unix ms. */
import type { EntryKind } from '../../../shared/record/kinds'
import { overLimit } from '../../../shared/record/record-lines'
import { darkMs, openDark, productReadings, watchedCases } from '../../../shared/record/select'
import type { OutageState } from '../../../shared/record/state'
import type { RecordOutcome } from '../../../shared/schemas/record-filter'
import { RECORD_OUTCOMES } from '../../../shared/schemas/record-filter'
import { historyOf } from '../hold/history'
import { shortestHold } from '../hold/shortest-hold'

/** Raised when the rules below change, so that rows that older ones made are made anew. */
export const SEARCH_VERSION = 1
/** A conversion's rounding, K. */
const ROUNDING_K = 1e-6

export interface SearchFacts {
  /** the site's day, 2026-03-03 */
  openedOn: string
  endedAt: number | null
  darkSince: number | null
  darkSeconds: number
  /** null: no case came near its limit, or none was read without control */
  holdSeconds: number | null
  lateReadings: number
  outcomes: RecordOutcome[]
  people: string[]
  tags: string[]
}

/** @param openedAt when the server took the outage up, Unix ms */
export function searchFacts(state: OutageState, openedAt: number): SearchFacts {
  const hold = shortestHold(state)
  const late = lateReadings(state)
  return {
    openedOn: dayAt(openedAt, state.snapshot.site.timeZone),
    endedAt: state.sealed?.mark.at ?? state.calledOff?.mark.at ?? null,
    darkSince: openDark(state)?.from ?? null,
    darkSeconds: Math.round(darkMs({ ...state, darks: state.darks.filter(dark => dark.to !== null) }, 0) / 1000),
    holdSeconds: hold === null ? null : Math.round(hold * 60),
    lateReadings: late,
    outcomes: RECORD_OUTCOMES.filter(outcome => outcome === 'late-rounds' ? late > 0 : CAME[outcome](state)),
    people: [...new Set(Object.values(state.signers).map(signer => signer.person))].filter(person => person !== 'server').sort(),
    tags: [...new Set([...state.plan.points.map(point => point.tag), ...Object.values(state.points).filter(point => point.mark !== null).map(point => point.tag)].map(tag => tag.toUpperCase()))].sort(),
  }
}

/** How each outcome is told from the state. */
const CAME: Record<Exclude<RecordOutcome, 'late-rounds'>, (state: OutageState) => boolean> = {
  'unplanned': state => !state.planned,
  'turned-back': state => state.turnedBack !== null,
  'act': state => Object.values(state.cases).some(item => item.openings.length > 0 || item.acts.length > 0),
  'above-limit': state => watchedCases(state).some(item => productReadings(item).some(reading => overLimit(state, item.id, reading) > ROUNDING_K)),
  'discard': state => Object.values(state.cases).some(item => item.acts.some(({ act }) => act === 'discarded')),
  'excused': state => Object.values(state.points).some(point => point.excuse !== null),
  'left-in-hand': state => Object.values(state.points).some(point => point.exception !== null),
  'questioned': state => state.questioned.length > 0,
  'returned': state => state.returned.length > 0,
}

/** Readings that came late or never, of a record that has ended: before that each further entry may change it. */
function lateReadings(state: OutageState): number {
  const until = state.sealed?.mark.at ?? state.submitted?.mark.at ?? state.calledOff?.mark.at ?? 0
  return state.phase === 'submitted' || state.phase === 'sealed' || state.phase === 'called-off' ? historyOf(state, until).late.length : 0
}

function dayAt(at: number, timeZone: string): string {
  return new Intl.DateTimeFormat('en-CA', { timeZone, year: 'numeric', month: '2-digit', day: '2-digit' }).format(at)
}

/** Kinds after which phase and `searchFacts` stay what they were; an accepted entry of another kind asks for them anew. */
const STILL: ReadonlySet<EntryKind> = new Set<EntryKind>(['check-signed', 'instrument-checked', 'note-added', 'plant-warned', 'pressure-read', 'question-answered', 'question-asked', 'silence-announced', 'step-ticked'])

/** Whether an added entry may change what `searchFacts` gives. */
export function bearsOnSearch({ kind, standing }: { kind: string, standing: string }): boolean {
  return standing === 'questioned' || !(STILL as ReadonlySet<string>).has(kind)
}
