import { clockWords, countWords, dayClockWords, durationWords, listWords, minuteWords } from '~~/shared/charts/words'
import type { WatchOutage } from '~~/shared/schemas/watch'

const MINUTE = 60_000
/** A hold this short has its mark in red, minutes: then an act opens too. */
export const SHORT_MINUTES = 15

const iso = (at: number) => new Date(at).toISOString()
/** Time of day at the outage's site. @param at Unix ms */
export const siteTime = (row: WatchOutage, at: number, seconds = false) => clockWords(iso(at), row.site.timeZone, seconds)

/** When the first case gets worse: its deadline, else the limit that it meets first. Unix ms; null: none does. */
export function worseAt(row: WatchOutage): { at: number, name: string } | null {
  if (row.phase !== 'dark') return null
  if (row.deadline) return { at: row.deadline.at, name: row.deadline.name }
  const first = row.cases.find(item => item.limitAt !== null)
  return first ? { at: first.limitAt!, name: first.name } : null
}

const LIVE: readonly string[] = ['dark', 'in-hand', 'hand-back', 'settle']
export const isLive = (row: WatchOutage) => LIVE.includes(row.phase)

/** Outages that somebody works on: those without control first, by the shortest hold; then by how far they are. Ties break on id. */
export function inOrderOfHold(rows: Iterable<WatchOutage>): WatchOutage[] {
  const moment = (row: WatchOutage) => worseAt(row)?.at ?? Infinity
  const by = (a: number, b: number) => a === b ? 0 : a - b
  return [...rows].filter(isLive).sort((a, b) => LIVE.indexOf(a.phase) - LIVE.indexOf(b.phase) || by(moment(a), moment(b)) || a.id.localeCompare(b.id))
}

/** "3 sites without control". */
export function headWords(rows: readonly WatchOutage[]): string {
  const sites = new Set(rows.filter(row => row.phase === 'dark').map(row => row.site.id))
  return sites.size === 0 ? 'Every site has control' : `${countWords(sites.size, 'site')} without control`
}

/** Controller and work: "Rack A, software update", "Rack A, unplanned". */
export function workOf(row: WatchOutage): string {
  return `${row.controller}, ${row.planned ? row.workKind.toLowerCase() : 'unplanned'}`
}

/** What stands large beside a strip: the hold that is left, or where the outage is. @param now Unix ms by the server's clock */
export function besideWords(row: WatchOutage, now: number): { large: string, small: string, short: boolean } {
  if (row.phase !== 'dark') return { large: phaseWords(row), small: standWords(row), short: false }
  const worse = worseAt(row)
  if (!worse) return { large: 'holds', small: 'no case comes to its limit', short: false }
  const minutes = (worse.at - now) / MINUTE
  return { large: minutes <= 0 ? 'now' : minuteWords(minutes), small: worse.name, short: minutes < SHORT_MINUTES }
}

function phaseWords(row: WatchOutage): string {
  return ({ 'in-hand': 'In hand', 'hand-back': 'Hand back', 'settle': 'Settle' } as Record<string, string>)[row.phase] ?? ''
}

function standWords(row: WatchOutage): string {
  if (row.phase === 'in-hand') return `${countWords(row.pointsInHand, 'point')} in hand, ${row.pointsWaiting} to go`
  const left = [row.pointsInHand > 0 ? `${countWords(row.pointsInHand, 'point')} in hand` : '', row.proofsDue > 0 ? `${countWords(row.proofsDue, 'proof')} due` : ''].filter(Boolean)
  return left.length > 0 ? left.join(', ') : 'nothing in hand'
}

/** The next round: "round in 2:20", "round late 1:50"; null where none is asked for. @param now Unix ms by the server's clock */
export function roundWords(row: WatchOutage, now: number): { words: string, late: boolean } | null {
  const dues = row.cases.map(item => item.dueAt).filter((at): at is number => at !== null)
  if (dues.length === 0) return null
  const left = Math.min(...dues) - now
  return { words: left >= 0 ? `round in ${countdown(left)}` : `round late ${countdown(-left)}`, late: left < 0 }
}

/** A countdown beside the word that says what comes: 2:20; from an hour on in words. */
function countdown(ms: number): string {
  const seconds = Math.floor(ms / 1000)
  return seconds >= 3600 ? durationWords(seconds) : `${Math.floor(seconds / 60)}:${String(seconds % 60).padStart(2, '0')}`
}

/** When the server last heard a phone of those who work there; null where none has signed. */
export function heardOf(row: WatchOutage): { at: number, name: string, until: number | null } | null {
  const working = row.phones.filter(phone => phone.role === 'technician')
  return (working.length > 0 ? working : row.phones).at(-1) ?? null
}

/** "last heard 02:24:10"; what it means where that is long ago. @param now Unix ms by the server's clock */
export function heardWords(row: WatchOutage, now: number): { words: string, silent: boolean } | null {
  const heard = heardOf(row)
  if (!heard) return null
  const last = `last heard ${siteTime(row, heard.at, true)}`
  if (row.phase !== 'dark' || now - heard.at <= 2 * row.intervalMinutes * MINUTE) return { words: last, silent: false }
  if (heard.until !== null && heard.until > now) return { words: `${last}; no signal until ${siteTime(row, heard.until)}, as ${heard.name} signed`, silent: false }
  return { words: `Not heard for ${minuteWords((now - heard.at) / MINUTE)}: ${heard.name}'s phone was ${last}`, silent: true }
}

/** What needs an eye now, the most pressing first, each a sentence. @param now Unix ms by the server's clock */
export function troublesOf(row: WatchOutage, now: number): string[] {
  if (!isLive(row)) return []
  const late = row.cases.filter(item => item.dueAt !== null && item.dueAt < now - 2 * MINUTE).map(item => item.name)
  const heard = heardWords(row, now)
  const unseen = [...new Set(row.alerts.filter(alert => alert.acknowledged === null).map(alert => alert.title.toLowerCase()))]
  return [
    unseen.length > 0 ? `${unseen.length === 1 ? 'An alert' : countWords(unseen.length, 'alert')} that nobody has acknowledged: ${listWords(unseen)}` : '',
    row.turnBack === 'ordered' ? 'Turning back is ordered and not begun' : row.turnBack === 'begun' ? 'Turning back' : '',
    ...row.acts.map(act => `${act.name}: ${act.words}${act.deadline === null ? '' : `, by ${siteTime(row, act.deadline)}`}`),
    row.deadline && row.deadline.turnBackAt < now && row.turnBack === null ? `Latest turn-back was ${siteTime(row, row.deadline.turnBackAt)}` : '',
    row.phase === 'dark' && row.plannedEndAt !== null && row.plannedEndAt < now ? `Over the time within which the work is done 19 times in 20, since ${siteTime(row, row.plannedEndAt)}` : '',
    late.length > 0 ? `Not read in time: ${listWords(late.slice(0, 3))}${late.length > 3 ? ` and ${late.length - 3} more` : ''}` : '',
    ...row.plant,
    heard?.silent ? heard.words : '',
    row.firstUntil !== null && row.firstUntil < now ? `Past the time by which an override must be off: ${siteTime(row, row.firstUntil)}` : '',
    row.phase === 'dark' && row.pointsWaiting > 0 ? `${countWords(row.pointsWaiting, 'point')} not in hand` : '',
    row.margin && !row.margin.accepted ? `${row.margin.faults[0]!}, and nobody has accepted it` : '',
    row.questioned > 0 ? countWords(row.questioned, 'questioned entry', 'questioned entries') : '',
    row.questions > 0 ? `${countWords(row.questions, 'question')} without an answer` : '',
  ].filter(line => line !== '').map(line => line[0]!.toUpperCase() + line.slice(1))
}

/** A line of a list below the strips. */
export interface WatchLine { key: string, to: string, code: string, where: string, what: string, aside: string }

const lineOf = (row: WatchOutage, to: string, what: string, aside = ''): WatchLine => ({ key: `${row.id} ${to} ${what}`, to, code: row.code ?? 'no number yet', where: `${row.site.name}, ${row.controller}`, what, aside })

const marginTold = (row: WatchOutage) => row.margin?.minutes == null ? '' : `: margin ${minuteWords(row.margin.minutes)}`

const startWords = (row: WatchOutage) => row.startsAt === null ? '' : `starts ${dayClockWords(iso(row.startsAt), row.site.timeZone)}`

const dueWords = (at: number, row: WatchOutage, now: number) => at < now ? 'the 12 hours are over' : `by ${dayClockWords(iso(at), row.site.timeZone)}`

/** What waits for a supervisor, what ends first first. Nobody is asked about what they planned or submitted themselves (I10). @param now Unix ms */
export function waitingFor(rows: Iterable<WatchOutage>, person: string, now: number): WatchLine[] {
  return [...rows].sort((a, b) => (a.startsAt ?? 0) - (b.startsAt ?? 0) || a.id.localeCompare(b.id)).flatMap((row) => {
    const run = `/outages/${row.id}`
    const own = row.authors.includes(person)
    const voices = row.voices.filter(voice => voice.supervisor === person)
    return [
      ...row.offers.filter(offer => offer.to === person).map(offer => lineOf(row, `${run}/hands`, `${offer.fromName} offers you this outage`)),
      ...voices.length > 0 ? [lineOf(row, `${run}/voice`, `${countWords(voices.length, 'decision')} by voice in your name: sign or deny`, dueWords(Math.min(...voices.map(voice => voice.dueAt)), row, now))] : [],
      ...row.phase !== 'plan' && row.margin && !row.margin.accepted && !own ? [lineOf(row, `/watch/${row.id}`, 'The margin is to be accepted before control is taken away')] : [],
      ...row.phase === 'plan' && row.planSubmitted && !own ? [lineOf(row, run, `Plan asks for approval${marginTold(row)}`, startWords(row))] : [],
      ...row.phase === 'submitted' && !own && !row.submitters.includes(person) ? [lineOf(row, `${run}/review`, `Record submitted: ${countWords(row.seq, 'entry', 'entries')}${row.discarded > 0 ? `, ${countWords(row.discarded, 'case')} discarded` : ''}`, row.endedAt === null ? '' : `ended ${dayClockWords(iso(row.endedAt), row.site.timeZone)}`)] : [],
    ]
  })
}

/** Outages that nobody works on yet or any more, and that do not wait for this person. */
export function alsoOpen(rows: Iterable<WatchOutage>, waiting: readonly WatchLine[]): WatchLine[] {
  const asked = new Set(waiting.map(line => line.key.split(' ')[0]))
  return [...rows].filter(row => !isLive(row) && !asked.has(row.id)).sort((a, b) => (a.startsAt ?? 0) - (b.startsAt ?? 0) || a.id.localeCompare(b.id)).map((row) => {
    const what = row.phase === 'approved' ? 'Approved' : row.phase === 'submitted' ? 'Record submitted, waits for another supervisor' : row.planSubmitted ? `Plan asks another supervisor for approval${marginTold(row)}` : 'Plan being made'
    return lineOf(row, row.phase === 'submitted' ? `/records/${row.id}` : `/outages/${row.id}`, what, row.phase === 'submitted' ? '' : startWords(row))
  })
}
