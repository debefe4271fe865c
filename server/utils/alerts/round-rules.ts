/** Alerts of rounds, and of people who are not heard from. */
import { minuteWords } from '~~/shared/charts/words'
import { siteClock } from '~~/shared/record/act-words'
import { shortList } from '~~/shared/record/alerts'
import { caseName } from '~~/shared/record/select'
import { MINUTE } from '../hold/evidence'
import { LATE_MS } from '../hold/history'
import type { AlertRule, AlertFinding } from './finding'
import { areRoundsHeard, isSilenceAnnounced } from './view'
import type { AlertView, DueCase, Heard } from './view'

/** While readings come in so close upon each other, a round is being taken, ms. Common practice, no source. */
const UNDER_WAY_MS = 2 * MINUTE
/** A phone may be silent for so many intervals. */
const SILENT_INTERVALS = 2

const isUnderWay = ({ now, lastReading }: AlertView) => lastReading !== null && now - lastReading < UNDER_WAY_MS
/** When a case is late by half of its own interval, or by two minutes where that is more. Unix ms. */
const missedAt = ({ dueAt, every }: DueCase) => dueAt + Math.max(LATE_MS, Math.round(every / 2))

function lateFindings(view: AlertView, lateAt: (due: DueCase) => number): AlertFinding[] {
  if (!areRoundsHeard(view)) return []
  return view.due.filter(due => due.dueAt <= view.now && lateAt(due) - LATE_MS <= view.now).map(due => ({
    about: due.caseId, since: lateAt(due) - LATE_MS, begins: lateAt(due) <= view.now && !isUnderWay(view),
  }))
}

/** 'Fish service, Meat 1–3 and 2 more were due from 02:24 on'. */
function dueWords({ state, due }: AlertView, about: readonly string[]): string {
  const named = due.filter(item => about.includes(item.caseId))
  const [first] = named
  return `${shortList(named.map(item => caseName(state, item.caseId)))} ${named.length === 1 ? 'was due at' : 'were due from'} ${siteClock(state, first?.dueAt ?? 0)}${named.length === 1 ? '' : ' on'}`
}

/** What is at stake: the shortest hold. @param said ids of cases that the line has named already, and nothing after them */
function holdWords({ state, now, forecasts, holdEnds }: AlertView, said: readonly string[] = []): string {
  const first = forecasts.find(item => item.toward === 'limit' && item.holdMinutes !== null)
  if (!first || holdEnds === null) return ''
  const who = said.length === 1 && said[0] === first.caseId ? 'it' : caseName(state, first.caseId)
  return holdEnds <= now ? `, and ${who} may be at its limit` : `, and ${who} holds until ${siteClock(state, holdEnds)} by the careful estimate`
}

export const ROUND_LATE: AlertRule = {
  start: 1,
  together: true,
  oneAtATime: true,
  yieldsTo: 'round-missed',
  find: view => lateFindings(view, due => due.dueAt + LATE_MS),
  words: (view, about) => `the round is late: ${dueWords(view, about)}${holdWords(view, about)}. Take the round now.`,
  until: view => view.holdEnds,
}

export const ROUND_MISSED: AlertRule = {
  start: 2,
  together: true,
  oneAtATime: true,
  find: view => lateFindings(view, missedAt),
  words: (view, about) => `a round is missed: ${dueWords(view, about)}${holdWords(view, about)}. Call whoever is there, and have the round taken now.`,
  until: view => view.holdEnds,
}

/** The interval at which something is to be heard, ms: that of the case that is read most often, but no less than the site's. */
function interval({ state, due }: AlertView): number {
  return Math.max(state.snapshot.site.intervalMinutes * MINUTE, Math.min(...due.map(item => item.every), Infinity))
}

function silentSince(view: AlertView, { at, until }: Heard): number {
  const usual = at + SILENT_INTERVALS * (view.due.length > 0 ? interval(view) : view.state.snapshot.site.intervalMinutes * MINUTE)
  return until === null || until > view.now ? usual : Math.max(usual, until)
}

const nameOf = ({ hands }: AlertView, about: readonly string[]) => hands.find(heard => heard.person === about[0])
const heardWords = ({ state, now }: AlertView, heard: Heard | undefined) => heard ? `last heard ${siteClock(state, heard.at)}, ${minuteWords(Math.floor((now - heard.at) / MINUTE))} ago` : 'not heard from'

export const UNHEARD: AlertRule = {
  start: 2,
  together: false,
  find: (view) => {
    if (!view.dark) return []
    return view.hands
      .filter(heard => !isSilenceAnnounced(view, heard) && silentSince(view, heard) <= view.now)
      .map(heard => ({ about: heard.person, since: silentSince(view, heard), begins: true }))
  },
  words: (view, about) => {
    const heard = nameOf(view, about)
    const said = heard?.until != null && heard.until <= view.now && heard.until > heard.at ? `; no signal was announced until ${siteClock(view.state, heard.until)}` : ''
    return `the phone of ${heard?.name ?? 'a technician'} is not heard from: ${heardWords(view, heard)}${said}${holdWords(view)}. Call them.`
  },
  until: view => view.holdEnds,
}

export const WORKER_SILENT: AlertRule = {
  start: 2,
  together: false,
  find: (view) => {
    const [alone, other] = view.hands
    const missed = view.due.find(due => missedAt(due) <= view.now)
    if (!view.dark || !alone || other || !missed || alone.at >= missed.dueAt || isSilenceAnnounced(view, alone)) return []
    return [{ about: alone.person, since: missedAt(missed), begins: !isUnderWay(view) }]
  },
  words: (view, about) => {
    const heard = nameOf(view, about)
    return `${heard?.name ?? 'A technician'} works alone and is silent past a missed round: ${heardWords(view, heard)}. ${whomToCall(view)}`
  },
  until: view => view.holdEnds,
}

/** Whom to call about a lone worker: as signed in the check before, else the shop's contact. */
function whomToCall({ state }: AlertView): string {
  const signed = state.checks['second-contact']?.words.trim() ?? ''
  const { contactName, contactPhone } = state.snapshot.site
  const shop = [contactName, contactPhone].filter(Boolean).join(', ')
  if (signed !== '') return `Call, as signed before: ${signed.slice(0, 240)}.`
  return shop === '' ? 'Call them, then somebody who can go there.' : `Nobody was named to be called: call the shop, ${shop}.`
}
