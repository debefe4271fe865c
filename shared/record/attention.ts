import { clockWords, countWords, durationWords, minuteWords, numberWords } from '../charts/words'
import { handWords } from '../schemas/point-kinds'
import { toldWords } from './alerts'
import { isoTime } from './entry'
import { readingDoubt } from './instruments'
import { doubtWords } from './instrument-words'
import { ALERT_WORDS } from './kinds/alerts'
import { VERDICT_WORDS } from './kinds/server'
import { acceptedWords } from './margin'
import { nameOf, pointName, pointsInHand, proofsDue } from './select'
import type { OutageState } from './state'
import type { RecordSummary } from './summary'
import { amountWords, deniedWords, fullStampWords } from './summary-words'

/** One thing to look at: in words, and the place in the log of the entry that it comes from (null where none does). */
export interface AttentionItem { words: string, seq: number | null, /** it stands in the way of the seal */ open: boolean }

/** Something that whoever reviews a record should look at. */
export interface Attention { what: string, items: AttentionItem[] }

const item = (words: string, seq: number | null, open = false): AttentionItem => ({ words, seq, open })

/** What the product points out, most pressing first; empty where there is nothing. */
export function attentionOf(state: OutageState, summary: RecordSummary): Attention[] {
  return [...unsettled(state, summary), ...leftBehind(state, summary), ...product(state, summary), ...keeping(state, summary)].filter(({ items }) => items.length > 0)
}

/** "No. 12: words", for paper. */
export function numbered({ words, seq }: AttentionItem): string {
  return seq === null ? words : `No. ${seq}: ${words}`
}

/** How many things of a record to look at stand in the way of its seal. */
export function openCount(attention: readonly Attention[]): number {
  return attention.reduce((sum, { items }) => sum + items.filter(({ open }) => open).length, 0)
}

/** What somebody must still answer, settle or sign, and how hands and phases changed. */
function unsettled(state: OutageState, summary: RecordSummary): Attention[] {
  return [
    { what: 'Questioned entries', items: summary.questioned.map(({ seq, why, settled }) => item(`${why.join('; ')}${settled ? `. Dealt with by ${settled.by}: ${settled.words}` : '. Not dealt with'}`, seq, settled === null)) },
    { what: 'Questions without an answer', items: summary.questions.filter(({ answer }) => answer === null).map(({ seq, by, words }) => item(`${by}: ${words}`, seq, true)) },
    { what: 'Decisions by voice', items: summary.voices.map(({ seq, words, open }) => item(words, seq, open)) },
    { what: 'Changed hands', items: summary.hands.map(({ seq, words }) => item(words, seq)) },
    { what: 'Margin accepted', items: state.marginAccepted ? [item(`${nameOf(state, state.marginAccepted.mark.by)} accepted ${acceptedWords(state.marginAccepted)}: ${state.marginAccepted.reason}`, state.marginAccepted.mark.seq)] : [] },
    { what: 'Control lost past a gate', items: state.darks.flatMap(dark => dark.breach.map(words => item(words, dark.mark.seq))) },
    { what: 'Ordered to turn back', items: state.turnBackOrdered ? [item(`${nameOf(state, state.turnBackOrdered.mark.by)}: ${state.turnBackOrdered.reason}`, state.turnBackOrdered.mark.seq)] : [] },
    { what: 'Turned back', items: state.turnedBack ? [item(state.turnedBack.reason, state.turnedBack.mark.seq)] : [] },
    { what: 'Returned before', items: state.returned.map(({ reason, mark }) => item(`${nameOf(state, mark.by)}: ${reason}`, mark.seq)) },
  ]
}

/** Points that are not back in auto and proven as planned. */
function leftBehind(state: OutageState, summary: RecordSummary): Attention[] {
  const { timeZone } = summary.heading
  const named = (tag: string) => [tag, pointName(state, tag)].filter(Boolean).join(' ')
  return [
    { what: 'Still in hand', items: pointsInHand(state).map(point => item(`${named(point.tag)}${point.hand === null ? '' : `, ${handWords(point.hand)}`}`, point.mark?.seq ?? null)) },
    { what: 'Proofs due', items: proofsDue(state).map(point => item(`${named(point.tag)}, back in auto and not seen to answer`, point.mark?.seq ?? null)) },
    { what: 'Left by exception', items: summary.pointLines.flatMap(({ tag, exception }) => exception && !exception.denied ? [item(`${tag}: ${exception.owner}, by ${fullStampWords(exception.until, timeZone)}: ${exception.reason}`, exception.seq)] : []) },
    { what: 'Exceptions denied', items: summary.pointLines.flatMap(({ tag, exception }) => exception?.denied ? [item(`${tag}: ${deniedWords(exception)}`, exception.denied.seq)] : []) },
    { what: 'Excused points', items: summary.pointLines.flatMap(({ tag, excused, inHand }) => excused && !inHand ? [item(`${tag}: ${excused.reason}; instead: ${excused.measure}`, excused.seq)] : []) },
  ]
}

/** What came of the product. */
function product(state: OutageState, summary: RecordSummary): Attention[] {
  const clock = (at: number) => clockWords(isoTime(at), summary.heading.timeZone)
  return [
    { what: 'Acts still open', items: summary.openings.filter(({ ended }) => ended === null).map(({ name, cause, ends, seq }) => item(`${name}: ${cause}; ${ends}`, seq)) },
    { what: 'Verdicts', items: summary.verdicts.filter(({ verdict }) => verdict !== 'within' && verdict !== 'unknown').map(({ at, name, verdict, clause, seq }) => item(`${clock(at)} ${name} ${VERDICT_WORDS[verdict]}${clause ? ` (${clause})` : ''}`, seq)) },
    { what: 'Acts', items: summary.acts.map(act => item(`${clock(act.at)} ${act.name}: ${act.act.toLowerCase()}${[act.product, amountWords(act.quantity, act.unit), act.place].filter(Boolean).map(part => `, ${part}`).join('')}`, act.seq)) },
    { what: 'Decided otherwise', items: summary.decidedOtherwise.map(({ name, clause, reason, seq }) => item(`${name}: ${[clause, reason].filter(Boolean).join(', ')}`, seq)) },
    { what: 'Alerts', items: state.alerts.map(({ alert, to, acknowledged, mark }) => item(`${ALERT_WORDS[alert]} at ${clock(mark.at)}, sent ${toldWords(to)}; ${acknowledged ? `acknowledged by ${acknowledged.name} at ${clock(acknowledged.at)}` : 'acknowledged by nobody'}`, mark.seq)) },
    { what: 'Plant warnings not over', items: state.plant.map(({ words, seq }) => item(words, seq)) },
  ]
}

/** How the record was kept: readings, instruments, times, clocks, corrections. */
function keeping(state: OutageState, summary: RecordSummary): Attention[] {
  const { rounds, forecasts } = summary
  const doubtful = (id: string) => Object.values(state.cases).flatMap(({ readings }) => readings).filter(reading => !reading.struck && reading.instrumentId === id && readingDoubt(state, reading) !== null).sort((a, b) => a.seq - b.seq)[0]?.seq
  return [
    { what: 'Thermometers', items: summary.instruments.flatMap((line) => {
      const words = doubtWords(line)
      return words === null ? [] : [item(words, doubtful(line.id) ?? line.checks.find(({ within }) => !within)?.mark.seq ?? null)]
    }) },
    { what: 'Late rounds', items: [
      ...rounds.lines.filter(({ late }) => late > 0).map(({ round, late, latestBy, latestSeq }) => item(`Round ${round}: ${countWords(late, 'reading')} late, by ${minuteWords(latestBy)} at most`, latestSeq)),
      ...rounds.never > 0 ? [item(`${countWords(rounds.never, 'case')} not read when due`, null)] : [],
    ] },
    { what: 'No reading in time', items: unreadCases(summary).map(({ words, seq }) => item(words, seq)) },
    { what: 'Warmer than foretold', items: forecasts.cases.flatMap(({ name, lines }) => {
      const early = lines.find(line => line.early)
      return early ? [item(`${name} came to its limit before the careful forecast had it there: ${numberWords(early.came)} °${forecasts.unit} where ${numberWords(early.foretold)} was foretold`, early.seq)] : []
    }) },
    { what: 'Longer than planned', items: longerWords(summary).map(words => item(words, state.darks[0]?.mark.seq ?? null)) },
    { what: 'Clock differences', items: summary.clocks.map(({ deviceName, name, ms, entries, seq }) => item(`${deviceName} of ${name}: ${durationWords(Math.abs(ms) / 1000)} ${ms > 0 ? 'ahead' : 'behind'}, ${countWords(entries, 'entry', 'entries')}`, seq)) },
    { what: 'Corrections', items: summary.corrections.map(({ seq, of, now, reason }) => item(`${of ? `corrects No. ${of.seq}: ` : ''}${[now, reason].filter(Boolean).join(', ')}`, seq)) },
    { what: 'Refused entries', items: summary.refusals.map(({ seq, reason }) => item(reason, seq)) },
  ]
}

/** Cases whose verdict was not known for want of a reading, each with how often, and with the first such entry. */
export function unreadCases({ verdicts }: RecordSummary): { words: string, seq: number }[] {
  const cases = new Map<string, { name: string, count: number, seq: number }>()
  for (const { caseId, name, verdict, seq } of verdicts) {
    if (verdict !== 'unknown') continue
    const known = cases.get(caseId)
    if (known) known.count += 1
    else cases.set(caseId, { name, count: 1, seq })
  }
  return [...cases.values()].map(({ name, count, seq }) => ({ words: count === 1 ? name : `${name} (${count} times)`, seq }))
}

function longerWords({ dark }: RecordSummary): string[] {
  if (dark.plannedMinutes === null || dark.times === 0) return []
  const over = dark.ms / 60_000 - dark.plannedMinutes
  return over > 1 ? [`${minuteWords(over)} more without control than the ${dark.plannedMinutes} min planned`] : []
}
