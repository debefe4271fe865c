/** Alerts of an outage as its log has them: which are open, which nobody has acknowledged, and how they read. */
import { countWords, listWords } from '../charts/words'
import { ALERT_WORDS } from './kinds/alerts'
import type { AlertName } from './kinds/alerts'
import type { AlertState, OutageState } from './state'

/** More names than this are counted. */
const NAMES = 3

/** Alerts whose cause is still there, in the order in which they were raised. None once the record is closed. */
export function openAlerts(state: OutageState): AlertState[] {
  return state.phase === 'sealed' || state.phase === 'called-off' ? [] : state.alerts.filter(alert => alert.over === null)
}

/** Open alerts that nobody has acknowledged. */
export function unansweredAlerts(state: OutageState): AlertState[] {
  return openAlerts(state).filter(alert => alert.acknowledged === null)
}

/** 'to Juno Tarrant and Sabine Ockham'; 'to nobody: no one is named for it'. @param names printed names */
export function toldWords(names: readonly string[]): string {
  if (names.length === 0) return 'to nobody: no one is named for it'
  return `to ${shortList(names)}`
}

/** 'A, B and 4 more'. */
export function shortList(names: readonly string[], most = NAMES): string {
  return names.length <= most + 1 ? listWords(names) : `${names.slice(0, most).join(', ')} and ${countWords(names.length - most, 'more', 'more')}`
}

/** What an alert is, by its key; in words where the log has it. */
export function alertTitle(state: OutageState, key: string): string {
  const alert = state.alerts.find(item => item.key === key)
  return alert ? ALERT_WORDS[alert.alert].toLowerCase() : 'one that this record does not hold'
}

/** An alert as a screen shows it. Times in Unix ms. */
export interface AlertLine {
  outage: string
  key: string
  alert: AlertName
  title: string
  words: string
  level: number
  raisedAt: number
  to: string[]
  acknowledged: { name: string, at: number } | null
}

/** An outage's open alerts as a screen shows them: those that nobody has acknowledged first, the latest first. */
export function alertLines(state: OutageState): AlertLine[] {
  return openAlerts(state)
    .map(({ key, alert, words, level, mark, to, acknowledged }): AlertLine => ({ outage: state.id, key, alert, title: ALERT_WORDS[alert], words, level, raisedAt: mark.at, to, acknowledged: acknowledged && { name: acknowledged.name, at: acknowledged.at } }))
    .sort(byUrgency)
}

/** What an alert says, without the site that its line begins with. */
export function withoutSite(state: OutageState, words: string): string {
  const site = `${state.snapshot.site.name}: `
  return words.startsWith(site) ? words.slice(site.length) : words
}

/** Those that nobody has acknowledged first, then the latest first; ties by key. */
export function byUrgency(a: AlertLine, b: AlertLine): number {
  return Number(a.acknowledged !== null) - Number(b.acknowledged !== null) || b.raisedAt - a.raisedAt || a.key.localeCompare(b.key)
}
