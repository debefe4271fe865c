/** What is to be alerted of an outage at a moment: pure, by its folded log and the time alone. */
import { ALERT_LEVELS, ALERT_WORDS_MAX, ALERTS } from '~~/shared/record/kinds/alerts'
import type { AlertName } from '~~/shared/record/kinds/alerts'
import type { Phase } from '~~/shared/record/phases'
import type { AlertState, OutageState } from '~~/shared/record/state'
import { MINUTE } from '../hold/evidence'
import type { AlertFinding } from './finding'
import { isAbout } from './finding'
import { ALERT_RULES } from './rules'
import { alertView } from './view'
import type { AlertView } from './view'

/** Phases in which an outage may raise alerts. Before, nothing depends on anybody; after the seal it is quiet. */
export const ALERT_PHASES: readonly Phase[] = ['in-hand', 'dark', 'hand-back', 'settle', 'submitted']

/** Somebody who is told. */
export interface Recipient { id: string, name: string, email: string }

/** Who is told at each level, and after how many minutes an alert goes on: a site's rules with their people found. */
export interface AlertSettings {
  levels: Recipient[][]
  /** minutes from level 1 to 2, and from 2 to 3 */
  passOnAfter: number[]
}

export interface DueAlert { key: string, alert: AlertName, about: string[], level: number, words: string, until: number | null, to: Recipient[] }
export interface DuePassing { key: string, level: number, to: Recipient[] }

export interface AlertsDue {
  raise: DueAlert[]
  /** not acknowledged in time: the next ones are told */
  passOn: DuePassing[]
  /** keys of alerts whose cause is there no more */
  over: string[]
}

/**
 * What changes in an outage's alerts at a moment. What an earlier look has raised stands in the log, so that a second
 * look at the same log and time, once its answer is entered, finds nothing to do.
 * @param now Unix ms
 */
export function alertsDue(state: OutageState, now: number, settings: AlertSettings): AlertsDue {
  const open = state.alerts.filter(alert => alert.over === null)
  // Nothing more is entered in a record that is closed; its alerts end with it.
  if (!ALERT_PHASES.includes(state.phase)) return { raise: [], passOn: [], over: state.phase === 'sealed' || state.phase === 'called-off' ? [] : open.map(alert => alert.key) }
  const view = alertView(state, now)
  const due: AlertsDue = { raise: [], passOn: [], over: [] }
  for (const alert of ALERTS) {
    const findings = ALERT_RULES[alert].find(view)
    const mine = open.filter(item => item.alert === alert)
    const held = mine.filter(item => findings.some(finding => covers(item, finding)))
    due.over.push(...mine.filter(item => !held.includes(item)).map(item => item.key))
    const yields = open.some(item => item.alert === ALERT_RULES[alert].yieldsTo)
    if (!yields) due.passOn.push(...held.flatMap(item => passOn(item, now, settings)))
    if (ALERT_RULES[alert].oneAtATime && held.some(item => item.acknowledged === null)) continue
    due.raise.push(...raise(view, alert, findings.filter(finding => !held.some(item => covers(item, finding))), settings))
  }
  return due
}

const covers = (alert: AlertState, finding: AlertFinding) => isAbout({ about: alert.about, raisedAt: alert.mark.at }, finding)

function raise(view: AlertView, alert: AlertName, findings: AlertFinding[], settings: AlertSettings): DueAlert[] {
  const rule = ALERT_RULES[alert]
  const groups = rule.together ? [findings] : findings.map(finding => [finding])
  let before = view.state.alerts.filter(item => item.alert === alert).length
  return groups.filter(group => group.some(finding => finding.begins)).map((group): DueAlert => {
    // The finding that begins it names it; the count tells one time of it from the next.
    const first = group.find(finding => finding.begins)!
    const about = group.map(finding => finding.about)
    const { level, to } = toldFirst(settings, rule.start)
    const words = `${view.state.snapshot.site.name}: ${rule.words(view, about)}`
    return { key: `${alert} ${first.about} ${++before}`, alert, about, level, words: words.length > ALERT_WORDS_MAX ? `${words.slice(0, ALERT_WORDS_MAX - 1)}…` : words, until: rule.until(view, about), to }
  })
}

/** Everybody down to a level; where that is nobody, down to the first level that has somebody. */
function toldFirst({ levels }: AlertSettings, start: number): { level: number, to: Recipient[] } {
  for (let level = start; level <= ALERT_LEVELS; level++) {
    const to = eachOnce(levels.slice(0, level).flat())
    if (to.length > 0) return { level, to }
  }
  return { level: start, to: [] }
}

/** Where nobody has acknowledged an alert in time: the next level that has somebody who was not told yet. */
function passOn(alert: AlertState, now: number, { levels, passOnAfter }: AlertSettings): DuePassing[] {
  if (alert.acknowledged !== null || now < nextPassing(alert, passOnAfter)) return []
  const told = new Set(levels.slice(0, alert.level).flat().map(person => person.id))
  for (let level = alert.level + 1; level <= ALERT_LEVELS; level++) {
    const to = eachOnce(levels[level - 1] ?? []).filter(person => !told.has(person.id))
    if (to.length > 0) return [{ key: alert.key, level, to }]
  }
  return []
}

/** When an alert goes on to the next level unless it is acknowledged, Unix ms; infinite at the last one. */
export function nextPassing({ level, toldAt }: Pick<AlertState, 'level' | 'toldAt'>, passOnAfter: readonly number[]): number {
  const minutes = passOnAfter[level - 1]
  return minutes === undefined ? Infinity : toldAt + minutes * MINUTE
}

function eachOnce(people: readonly Recipient[]): Recipient[] {
  return [...new Map(people.map(person => [person.id, person])).values()]
}
