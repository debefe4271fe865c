import { clockWords, countWords, dateWords, durationWords, listWords, minuteWords, numberWords, offsetWords, temperatureWords } from '../charts/words'
import { doubtWords } from './instrument-words'
import { VERDICT_WORDS } from './kinds/server'
import type { ActLine, RecordSummary } from './summary'
import { isoTime } from './entry'

/** A row of the front page; its parts alternate between what is told and what only stands beside it. */
export interface SummaryRow { label: string, parts: { text: string, strong: boolean }[] }

const strong = (text: string | number) => ({ text: String(text), strong: true })
const plain = (text: string) => ({ text, strong: false })

/** "1 200 kg" and the like, without a unit where none was given. */
const amount = (quantity: number | null, unit: string) => quantity === null ? '' : `${quantity} ${unit}`.trim()

/** Product, quantity, place and the rest of an act, the parts that were given. */
export function actDetail({ product, quantity, unit, place, takenBy, left, words }: ActLine): string {
  return [product, amount(quantity, unit), place, takenBy && `taken by ${takenBy}`, left ? 'product is left in the case' : '', words].filter(Boolean).join(' · ')
}

/** The rows beside the disc, in their order. */
export function summaryRows(summary: RecordSummary): SummaryRow[] {
  const { dark, points, rounds, highest, above, acts, limits } = summary
  const discarded = acts.filter(act => act.discarded)
  const late = rounds.late === 0 && rounds.never === 0 ? ', none late' : `, ${rounds.late} late${rounds.never > 0 ? `, ${countWords(rounds.never, 'case')} overdue` : ''}`
  return [
    { label: dark.running ? 'Without control so far' : 'Without control', parts: dark.times === 0
      ? [plain('control was never lost')]
      : [strong(durationWords(dark.ms / 1000)), plain(dark.plannedMinutes === null ? ', unplanned' : ` of ${dark.plannedMinutes} min planned`), ...(dark.times > 1 ? [plain(`, ${dark.times} times`)] : [])] },
    { label: 'Points in hand', parts: [strong(points.set), plain(' set, '), strong(points.back), plain(' back in auto, '), strong(points.proven), plain(' proven'), ...(points.excused > 0 ? [plain(', '), strong(points.excused), plain(' excused')] : [])] },
    { label: 'Rounds', parts: rounds.taken === 0 ? [plain('none yet')] : [strong(rounds.taken), plain(` taken${late}`)] },
    ...(summary.forecasts.readings === 0 ? [] : [{ label: 'Forecasts', parts: forecastParts(summary.forecasts) }]),
    { label: 'Highest product', parts: highest ? [strong(temperatureWords(highest.value, highest.unit)), plain(`, ${highest.name}`)] : [plain('no reading yet')] },
    { label: 'Above a limit', parts: [strong(above.cases.length), plain(` of ${countWords(above.watched, 'case')}`)] },
    { label: 'Product discarded', parts: [strong(discarded.length === 0 ? 'none' : listWords(discarded.map(act => [amount(act.quantity, act.unit), act.product].filter(Boolean).join(' '))))] },
    { label: 'Limits', parts: [plain(limits.join('; ') || 'none')] },
  ]
}

/** "0.4 °F off in the median of 24 readings, no case came early". */
function forecastParts({ median, unit, readings, early }: RecordSummary['forecasts']): SummaryRow['parts'] {
  return [
    strong(`${numberWords(median)} °${unit}`), plain(` off in the median of ${countWords(readings, 'reading')}, `),
    plain(early.length === 0 ? 'no case came early' : `came early: ${listWords(early)}`),
  ]
}

/** "Tue 3 Mar 2026, 01:58 to 03:41", in the site's time. */
export function spanWords({ from, to, timeZone }: RecordSummary['heading']): string {
  const start = isoTime(from)
  const opening = `${dateWords(start, timeZone)}, ${clockWords(start, timeZone)}`
  if (to === null) return `${opening}, still open`
  const end = isoTime(to)
  const sameDay = dateWords(start, timeZone) === dateWords(end, timeZone)
  return `${opening} to ${sameDay ? '' : `${dateWords(end, timeZone)}, `}${clockWords(end, timeZone)}`
}

/** "America/Chicago (UTC−6)". */
export function zoneWords({ from, timeZone }: RecordSummary['heading']): string {
  return `${timeZone} (${offsetWords(isoTime(from), timeZone)})`
}

/** "03:41:09 UTC−6": a time of day at the site that can be read in any place. */
export function stampWords(at: number, timeZone: string): string {
  return `${clockWords(isoTime(at), timeZone, true)} ${offsetWords(isoTime(at), timeZone)}`
}

/** "Tue 3 Mar 2026, 03:41:09 UTC−6". */
export function fullStampWords(at: number, timeZone: string): string {
  return `${dateWords(isoTime(at), timeZone)}, ${stampWords(at, timeZone)}`
}

/** Signature digits as they stand on paper: the first four and last two hexadecimal digits of its 64 bytes. */
export function signatureDigits(signature: string): string {
  const hex = Array.from(atob(signature.replaceAll('-', '+').replaceAll('_', '/')), char => char.charCodeAt(0).toString(16).padStart(2, '0')).join('')
  return `${hex.slice(0, 4)}…${hex.slice(-2)}`
}

/** A hash in groups of four: "8f1c 52ab 90de 417c … 2b6e". */
export function hashWords(hash: string): string {
  return `${(hash.slice(0, 16).match(/.{4}/g) ?? []).join(' ')} … ${hash.slice(-4)}`
}

/** Something that whoever reviews a record should look at. */
export interface Attention { what: string, items: string[] }

/** What the product points out, most pressing first; empty where there is nothing. */
export function attentionOf(summary: RecordSummary, breaches: readonly string[] = [], turnedBack: string | null = null): Attention[] {
  const { heading: { timeZone } } = summary
  const clock = (at: number) => clockWords(isoTime(at), timeZone)
  const list: Attention[] = [
    { what: 'Questioned entries', items: summary.questioned.map(item => `No. ${item.seq}: ${item.why.join('; ')}${item.settled ? `. Dealt with by ${item.settled.by}: ${item.settled.words}` : '. Not dealt with'}`) },
    { what: 'Questions without an answer', items: summary.questions.filter(item => item.answer === null).map(item => `No. ${item.seq}, ${item.by}: ${item.words}`) },
    { what: 'Decisions by voice', items: summary.voices },
    { what: 'Changed hands', items: summary.hands },
    { what: 'Control lost past a gate', items: [...breaches] },
    { what: 'Turned back', items: turnedBack === null ? [] : [turnedBack] },
    { what: 'Still in hand', items: summary.points.inHand > 0 ? [countWords(summary.points.inHand, 'point')] : [] },
    { what: 'Proofs due', items: summary.points.proofsDue > 0 ? [countWords(summary.points.proofsDue, 'point')] : [] },
    { what: 'Left by exception', items: summary.pointLines.filter(line => line.exception).map(line => `${line.tag}: ${line.exception!.owner}, by ${fullStampWords(line.exception!.until, timeZone)}: ${line.exception!.reason}`) },
    { what: 'Excused points', items: summary.pointLines.filter(line => line.excused && !line.inHand).map(line => `${line.tag}: ${line.excused!.reason}; instead: ${line.excused!.measure}`) },
    { what: 'Acts still open', items: summary.openings.filter(line => line.ended === null).map(line => `${line.name}: ${line.cause}; ${line.ends}`) },
    { what: 'Verdicts', items: summary.verdicts.filter(line => line.verdict !== 'within' && line.verdict !== 'unknown').map(line => `${clock(line.at)} ${line.name} ${VERDICT_WORDS[line.verdict]}${line.clause ? ` (${line.clause})` : ''}`) },
    { what: 'Acts', items: summary.acts.map(act => `${clock(act.at)} ${act.name}: ${act.act.toLowerCase()}${[act.product, amount(act.quantity, act.unit), act.place].filter(Boolean).map(part => `, ${part}`).join('')}`) },
    { what: 'Decided otherwise', items: summary.decidedOtherwise.map(line => `${line.name}: ${[line.clause, line.reason].filter(Boolean).join(', ')}`) },
    { what: 'Thermometers', items: summary.instruments.flatMap(line => doubtWords(line) ?? []) },
    { what: 'Late rounds', items: [...summary.rounds.lines.filter(line => line.late > 0).map(line => `Round ${line.round}: ${countWords(line.late, 'reading')} late, by ${minuteWords(line.latestBy)} at most`), ...(summary.rounds.never > 0 ? [`${countWords(summary.rounds.never, 'case')} not read when due`] : [])] },
    { what: 'No reading in time', items: unreadWords(summary) },
    { what: 'Longer than planned', items: longerWords(summary) },
    { what: 'Clock differences', items: summary.clocks.map(line => `${line.deviceName} of ${line.name}: ${durationWords(Math.abs(line.ms) / 1000)} ${line.ms > 0 ? 'ahead' : 'behind'}, ${countWords(line.entries, 'entry', 'entries')}`) },
    { what: 'Corrections', items: summary.corrections.map(line => `No. ${line.seq}${line.of ? ` corrects No. ${line.of.seq}` : ''}: ${[line.now, line.reason].filter(Boolean).join(', ')}`) },
    { what: 'Refused entries', items: summary.refusals.map(line => `No. ${line.seq}: ${line.reason}`) },
  ]
  return list.filter(item => item.items.length > 0)
}

/** Cases whose verdict was not known for want of a reading, each with how often. */
export function unreadWords({ verdicts }: RecordSummary): string[] {
  const times = new Map<string, number>()
  for (const line of verdicts) if (line.verdict === 'unknown') times.set(line.name, (times.get(line.name) ?? 0) + 1)
  return [...times].map(([name, count]) => count === 1 ? name : `${name} (${count} times)`)
}

function longerWords({ dark }: RecordSummary): string[] {
  if (dark.plannedMinutes === null || dark.times === 0) return []
  const over = dark.ms / 60_000 - dark.plannedMinutes
  return over > 1 ? [`${minuteWords(over)} more without control than the ${dark.plannedMinutes} min planned`] : []
}
