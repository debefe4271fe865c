import { clockWords, countWords, minuteWords, numberWords, temperatureWords } from '../../shared/charts/words'
import { isoTime } from '../../shared/record/entry'
import type { ExceptionLine, PointLine } from '../../shared/record/record-lines'
import { celsius, groupName, inUnit, isOver, judgedReadings, nameOf } from '../../shared/record/select'
import { deniedWords, exceptionWords, fullStampWords } from '../../shared/record/summary-words'
import { handWords } from '../../shared/schemas/point-kinds'
import { pressureFigure, pressureUnitWords } from '../../shared/utils/pressure'
import type { PaperMark } from './marks'
import { drawMark } from './marks'
import type { RecordPaper } from './record'
import type { Sheet } from './sheet'
import { COLOURS } from './sheet'
import type { Cell, Row } from './table'
import { drawTable } from './table'

function markOf(line: PointLine): PaperMark {
  if (line.proven) return 'proven'
  if (line.back === null && line.inHand) return 'hand'
  return line.excused && !line.inHand ? 'excused' : 'auto'
}

/** Every point: in hand, seen, back in auto, proven; and those that were excused or left. */
export async function drawPoints(sheet: Sheet, { summary }: RecordPaper): Promise<void> {
  if (summary.pointLines.length === 0) return
  const { timeZone } = summary.heading
  const clock = (line: { at: number } | null) => line ? clockWords(isoTime(line.at), timeZone, true) : ''
  sheet.begin('Points')
  await drawTable(sheet, [
    { label: 'Point', width: 58 }, { label: 'Name', width: 0.4 }, { label: 'Held', width: 52 }, { label: 'Seen', width: 0.32 }, { label: 'In hand', width: 42 }, { label: 'By', width: 0.28 }, { label: 'In auto', width: 42 }, { label: 'Proven', width: 42 },
  ], summary.pointLines.map((line): Row => [
    { text: line.tag, inset: 11, draw: (x, baseline) => drawMark(sheet.doc, markOf(line), x, baseline) },
    line.name,
    line.hand === null ? line.excused ? 'excused' : '' : handWords(line.hand),
    line.seen,
    clock(line.inHand ?? line.excused),
    (line.inHand ?? line.excused)?.by ?? '',
    clock(line.back),
    line.proven ? clock(line.proven) : line.back && line.backSeen !== 'answers' ? 'proof due' : '',
  ]))
  sheet.y += 6
  const notes = summary.pointLines.flatMap(({ tag, excused, exception, inHand }) => [
    ...(excused && !inHand ? [[`${tag}, excused`, `${excused.reason}; instead: ${excused.measure} (${excused.by}, ${clock(excused)})`] as const] : []),
    ...(exception ? [exceptionNote(tag, exception, timeZone)] : []),
  ])
  if (notes.length > 0) sheet.list(() => notes.forEach(([label, words]) => sheet.labelled(label, words)))
  sheet.paragraph('Marks: ring = in auto, filled square = in hand, ring with a tick = back and proven, ring with a bar = excused.', { style: { size: 7.5 } })
}

/** What the paper says of an exception; one given by voice and denied afterwards is struck. */
function exceptionNote(tag: string, exception: ExceptionLine, timeZone: string): readonly [string, string] {
  const { reason, owner, until, voice, by, at, denied } = exception
  const clock = (time: number) => clockWords(isoTime(time), timeZone, true)
  if (denied) return [`${tag}, struck`, `${exceptionWords(exception, timeZone)} (taken down by ${by}, ${clock(at)}). Struck: ${deniedWords(exception)} (${clock(denied.at)})`]
  return [`${tag}, left`, `${reason}; ${owner} until ${fullStampWords(until, timeZone)} (${voice === null ? 'signed' : `by voice of ${voice}, taken down`} by ${by}, ${clock(at)})`]
}

/** The rounds, then every product temperature by case and round. */
export async function drawRounds(sheet: Sheet, paper: RecordPaper): Promise<void> {
  const { summary, state } = paper
  const { lines } = summary.rounds
  if (lines.length === 0) return
  const { timeZone } = summary.heading
  const clock = (at: number) => clockWords(isoTime(at), timeZone, true)
  sheet.begin('Rounds')
  await drawTable(sheet, [
    { label: 'Round', width: 38, align: 'right' }, { label: 'From', width: 50 }, { label: 'To', width: 50 }, { label: 'Cases', width: 38, align: 'right' }, { label: 'Racks', width: 38, align: 'right' }, { label: 'Nearest to its limit', width: 1 }, { label: 'Late', width: 110 },
  ], lines.map(line => [
    String(line.round), clock(line.from), clock(line.to), String(line.cases), String(line.racks),
    line.nearest ? `${temperatureWords(line.nearest.value, line.nearest.unit)}, ${line.nearest.name}` : '',
    line.late > 0 ? `${countWords(line.late, 'reading')}, by ${minuteWords(line.latestBy)}` : 'no',
  ]))
  await drawMatrix(sheet, paper)
  if (state.pressures.length > 0) {
    sheet.heading('Pressures')
    const unit = state.snapshot.site.pressureUnit
    await drawTable(sheet, [{ label: 'Round', width: 38, align: 'right' }, { label: 'Time', width: 50 }, { label: 'Suction group', width: 1 }, { label: `Suction, ${pressureUnitWords(unit)}`, width: 96, align: 'right' }, { label: `Discharge, ${pressureUnitWords(unit)}`, width: 104, align: 'right' }, { label: 'By', width: 90 }],
      state.pressures.map(reading => [String(reading.round), clock(reading.at), groupName(state, reading.suctionGroupId), pressureFigure(reading.suctionPsig, unit), reading.dischargePsig === null ? '–' : pressureFigure(reading.dischargePsig, unit), nameOf(state, reading.by)]))
  }
}

/** Rounds that stand side by side. */
const ROUNDS_ACROSS = 9

/** Product temperatures in the site's unit, cases down, rounds across; over the limit in heavy type. */
async function drawMatrix(sheet: Sheet, { state, summary }: RecordPaper): Promise<void> {
  const unit = state.snapshot.site.temperatureUnit
  const rounds = summary.rounds.lines.filter(line => line.cases > 0).map(line => line.round)
  const known = state.snapshot.cases.filter(item => (state.cases[item.id]?.readings.length ?? 0) > 0)
  const each = Math.ceil(rounds.length / Math.ceil(rounds.length / ROUNDS_ACROSS))
  for (let from = 0; from < rounds.length; from += each) {
    const across = rounds.slice(from, from + each)
    sheet.heading(`Temperatures, °${unit}, ${across.length === 1 ? `round ${across[0]}` : `rounds ${across[0]} to ${across.at(-1)}`}`)
    await drawTable(sheet, [{ label: 'Case', width: 1 }, { label: 'Limit', width: 38, align: 'right' }, ...across.map(round => ({ label: String(round), width: 36, align: 'right' as const }))],
      known.map((item): Cell[] => [item.name, numberWords(inUnit(celsius(item.limit.value, item.limit.unit), unit)), ...across.map((round): Cell => {
        const reading = judgedReadings(state.cases[item.id]!).filter(taken => taken.round === round).at(-1)
        if (!reading) return ''
        const text = `${reading.method === 'product' ? '' : `${reading.method} `}${numberWords(inUnit(celsius(reading.value, reading.unit), unit))}${reading.correctedBy ? '*' : ''}`
        return isOver(reading, item.limit) ? { text, style: { face: 'bold', colour: COLOURS.limit } } : text
      })]))
  }
  sheet.y += 3
  sheet.paragraph('Heavy and red: over the limit. *: corrected by a later entry. Readings without a word are product temperatures. Where a case was read twice in a round, the later reading stands here; both stand among the entries.', { style: { size: 7.5 } })
}
