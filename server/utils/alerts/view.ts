/** What the rules of alerts look at: the folded outage at a moment, with the forecasts worked out once. */
import { openDark, productReadings, watchedCases } from '~~/shared/record/select'
import type { DarkInterval, OutageState } from '~~/shared/record/state'
import type { CaseForecast } from '../hold/for-outage'
import { forecastCases } from '../hold/for-outage'
import { MINUTE } from '../hold/evidence'

/** Somebody who works on the outage, and when something of theirs last came. Unix ms. */
export interface Heard {
  person: string
  name: string
  at: number
  /** until when no signal is to be expected of them; null: nothing was said */
  until: number | null
}

/** A case that is to be read: when it was or is due, Unix ms, and at what interval, ms. */
export interface DueCase { caseId: string, dueAt: number, every: number }

export interface AlertView {
  state: OutageState
  /** Unix ms */
  now: number
  /** the time without control that runs now */
  dark: DarkInterval | null
  /** of the watched cases, shortest hold first; none with control */
  forecasts: CaseForecast[]
  /** cases in the order in which they are due; none with control */
  due: DueCase[]
  /** when the first case meets its limit by the careful end of its forecast, Unix ms; null: none does */
  holdEnds: number | null
  /** who has worked on it since points went in hand, or since control was lost; the holder among them */
  hands: Heard[]
  /** the last product reading of any case, Unix ms; null: none */
  lastReading: number | null
}

/** @param now Unix ms */
export function alertView(state: OutageState, now: number): AlertView {
  const dark = openDark(state)
  const forecasts = dark ? forecastCases(state, now) : []
  const ends = forecasts.filter(item => item.toward === 'limit' && item.holdMinutes !== null).map(item => now + item.holdMinutes! * MINUTE)
  const readings = watchedCases(state).flatMap(item => productReadings(item).map(reading => reading.at)).filter(at => at <= now)
  return {
    state, now, dark, forecasts,
    due: dark ? forecasts.map(item => dueCase(state, item, dark)).sort((a, b) => a.dueAt - b.dueAt || a.caseId.localeCompare(b.caseId)) : [],
    holdEnds: ends.length > 0 ? Math.round(Math.min(...ends)) : null,
    hands: handsOf(state, dark),
    lastReading: readings.length > 0 ? Math.max(...readings) : null,
  }
}

function dueCase(state: OutageState, { caseId, dueAt }: CaseForecast, dark: DarkInterval): DueCase {
  const last = productReadings(state.cases[caseId]!).at(-1)
  const from = Math.max(last?.at ?? dark.from, dark.from)
  // Nobody could be asked for a reading before the loss of control was known.
  return { caseId, dueAt: Math.max(Math.round(dueAt), dark.mark.at), every: Math.round(dueAt) - from }
}

function handsOf(state: OutageState, dark: DarkInterval | null): Heard[] {
  const since = state.inHandBegun?.at ?? dark?.mark.at ?? Infinity
  const people = new Map<string, Heard>()
  for (const [device, { at, until }] of Object.entries(state.heard)) {
    const signer = state.signers[device]
    if (!signer || signer.role === 'server') continue
    const holds = state.holder?.person === signer.person
    // Who only decides from a desk is not expected to be heard from.
    if (!holds && (signer.role !== 'technician' || at < since)) continue
    const known = people.get(signer.person)
    const latest = [known?.until ?? null, until].filter((moment): moment is number => moment !== null)
    people.set(signer.person, { person: signer.person, name: signer.name, at: Math.max(known?.at ?? -Infinity, at), until: latest.length > 0 ? Math.max(...latest) : null })
  }
  return [...people.values()].sort((a, b) => a.person.localeCompare(b.person))
}

/**
 * Whether somebody's silence was announced and is still no reason to worry: until the time that they
 * signed, or until a hold ends, whichever comes first.
 */
export function isSilenceAnnounced({ now, holdEnds }: Pick<AlertView, 'now' | 'holdEnds'>, { until }: Heard): boolean {
  return until !== null && until > now && (holdEnds === null || holdEnds > now)
}

/** Rounds are kept on phones without a signal: while everybody announced that, late ones are not known to be late. */
export function areRoundsHeard(view: AlertView): boolean {
  return view.hands.length === 0 || !view.hands.every(heard => isSilenceAnnounced(view, heard))
}
