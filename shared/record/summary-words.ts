import { clockWords, countWords, dateWords, durationWords, listWords, numberWords, offsetWords, temperatureWords } from '../charts/words'
import type { ExceptionLine } from './record-lines'
import type { ActLine, RecordSummary } from './summary'
import { isoTime } from './entry'

/** A row of the front page; its parts alternate between what is told and what only stands beside it. */
export interface SummaryRow { label: string, parts: { text: string, strong: boolean }[] }

const strong = (text: string | number) => ({ text: String(text), strong: true })
const plain = (text: string) => ({ text, strong: false })

/** "1 200 kg" and the like, without a unit where none was given. */
export const amountWords = (quantity: number | null, unit: string) => quantity === null ? '' : `${quantity} ${unit}`.trim()

/** Product, quantity, place and the rest of an act, the parts that were given. */
export function actDetail({ product, quantity, unit, place, takenBy, left, words }: ActLine): string {
  return [product, amountWords(quantity, unit), place, takenBy && `taken by ${takenBy}`, left ? 'product is left in the case' : '', words].filter(Boolean).join(' · ')
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
    { label: 'Product discarded', parts: [strong(discarded.length === 0 ? 'none' : listWords(discarded.map(act => [amountWords(act.quantity, act.unit), act.product].filter(Boolean).join(' '))))] },
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

/** What an exception said, in words. */
export function exceptionWords({ owner, until, reason, voice }: ExceptionLine, timeZone: string): string {
  return `left by exception${voice === null ? '' : ` (by voice, ${voice})`}: ${reason}; ${owner} until ${fullStampWords(until, timeZone)}`
}

/** That an exception given by voice was denied, by whom and why; empty where it was not. */
export function deniedWords({ voice, denied }: ExceptionLine): string {
  return denied === null ? '' : `denied by ${denied.by}: ${denied.reason}. ${voice ?? 'Nobody'} did not leave it; it never stood`
}
