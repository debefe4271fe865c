import { happenedAt, isoTime } from './entry'
import type { StoredEntry } from './entry'
import { VERDICT_WORDS } from './kinds/server'
import type { Verdict } from './kinds/server'
import { checkStanding, readingDoubt } from './instruments'
import { acceptedOf } from './record-lines'
import { caseName, nameOf } from './select'
import type { OutageState, ReadingState } from './state'

/** Excel reads UTF-8 only behind this mark. */
export const BYTE_ORDER_MARK = '\uFEFF'
export const READINGS_HEAD = ['seq', 'round', 'case', 'time', 'time_utc', 'value', 'unit', 'value_signed', 'limit', 'limit_unit', 'method', 'instrument', 'instrument_check', 'by', 'verdict', 'standing', 'corrected', 'struck', 'words'] as const

/**
 * One cell by RFC 4180. Words that a spreadsheet would take for a formula get an apostrophe before
 * them; numbers stay numbers, below zero too.
 */
export function csvCell(value: string | number | null): string {
  if (value === null) return ''
  if (typeof value === 'number') return String(value)
  const safe = /^[=+\-@\t\r]/.test(value) ? `'${value}` : value
  return /[",\r\n]/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe
}

export function csvRow(cells: readonly (string | number | null)[]): string {
  return `${cells.map(csvCell).join(',')}\r\n`
}

/** A time at the site with its offset: 2026-03-03T02:24:00-06:00. @param at Unix ms, cut to seconds */
export function localTime(at: number, timeZone: string): string {
  return localTimes(timeZone)(at)
}

/** The same for many times of one zone; a formatter is made once. */
export function localTimes(timeZone: string): (at: number) => string {
  const format = new Intl.DateTimeFormat('en-GB', { timeZone, timeZoneName: 'longOffset', year: 'numeric' })
  return at => withOffset(Math.floor(at / 1000) * 1000, format)
}

function withOffset(second: number, format: Intl.DateTimeFormat): string {
  const name = (format.formatToParts(new Date(second)).find(part => part.type === 'timeZoneName')?.value ?? 'GMT').replace('GMT', '')
  const [, sign = '+', hours = '00', minutes = '00'] = /^([+-])(\d{2}):(\d{2})/.exec(name) ?? []
  const offset = (sign === '-' ? -1 : 1) * (Number(hours) * 60 + Number(minutes))
  return `${isoTime(second + offset * 60_000).slice(0, 19)}${sign}${hours}:${minutes}`
}

type Cells = (string | number | null)[]

/** Every reading of a record, in the order of the log, as CSV with a head. */
export function readingsCsv(state: OutageState, entries: readonly StoredEntry[]): string {
  return BYTE_ORDER_MARK + csvRow(READINGS_HEAD) + readingCells(state, entries).map(csvRow).join('')
}

/** The cells of every reading, under READINGS_HEAD. */
export function readingCells(state: OutageState, entries: readonly StoredEntry[]): Cells[] {
  const folded = new Map<string, ReadingState>(Object.values(state.cases).flatMap(item => item.readings.map(reading => [reading.entry, reading])))
  const verdictThen = verdictsThen(state, entries)
  const local = localTimes(state.snapshot.site.timeZone)
  return entries.flatMap((stored): Cells[] => {
    const { entry } = stored
    if (entry.kind !== 'reading-taken') return []
    const { body } = entry
    const reading = folded.get(entry.id)
    const limit = state.snapshot.cases.find(item => item.id === body.caseId)?.limit ?? null
    const instrument = state.snapshot.instruments.find(item => item.id === body.instrumentId)?.name ?? null
    return [[
      stored.seq, body.round, caseName(state, body.caseId), local(happenedAt(entry)), isoTime(happenedAt(entry)),
      reading?.struck ? null : reading?.value ?? body.value, body.unit, body.value, limit?.value ?? null, limit?.unit ?? null, body.method, instrument, checkWords(state, body.instrumentId, happenedAt(entry)), nameOf(state, entry.by),
      verdictThen(body.caseId, stored), stored.standing, reading?.correctedBy ? 'yes' : 'no', reading?.struck ? 'yes' : 'no', body.words,
    ]]
  })
}

/** Gives the verdict in force once a reading had been judged: the last one entered by the time it was received; null before control was lost. */
function verdictsThen(state: OutageState, entries: readonly StoredEntry[]): (caseId: string, reading: StoredEntry) => string | null {
  const byCase = new Map<string, { receivedAt: string, verdict: Verdict }[]>()
  for (const { stored: { receivedAt }, entry: { body } } of acceptedOf(entries, 'verdict-changed')) byCase.set(body.caseId, [...byCase.get(body.caseId) ?? [], { receivedAt, verdict: body.verdict }])
  const darkAt = state.darks[0]?.from ?? Infinity
  return (caseId, reading) => {
    const last = byCase.get(caseId)?.findLast(line => line.receivedAt <= reading.receivedAt)
    if (last) return VERDICT_WORDS[last.verdict]
    return happenedAt(reading.entry) >= darkAt ? VERDICT_WORDS.within : null
  }
}

/** How the check of a reading's instrument stood; null where it names none. */
function checkWords(state: OutageState, instrumentId: string | null, at: number): string | null {
  if (instrumentId === null) return null
  const doubt = readingDoubt(state, { instrumentId, at })
  if (doubt === null) return 'in time'
  if (doubt === 'out') return 'out of tolerance'
  return checkStanding(state, instrumentId, at).lastOn === null ? 'never checked' : 'overdue'
}
