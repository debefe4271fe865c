import { clockWords, dateWords, offsetWords } from '../../shared/charts/words'
import { happenedAt, isoTime } from '../../shared/record/entry'
import { nameOf } from '../../shared/record/select'
import { signatureDigits } from '../../shared/record/summary-words'
import { told } from '../../shared/record/words'
import { drawMark } from './marks'
import type { RecordPaper } from './record'
import type { Sheet } from './sheet'
import type { Row } from './table'
import { drawTable } from './table'

/** What was put right, asked or did not fit; nothing where all of it is empty. */
export async function drawLooseEnds(sheet: Sheet, { summary }: RecordPaper): Promise<void> {
  const { timeZone } = summary.heading
  const clock = (at: number) => clockWords(isoTime(at), timeZone, true)
  if (summary.questioned.length + summary.refusals.length > 0) {
    sheet.begin('Questioned and refused entries')
    await drawTable(sheet, [{ label: 'No.', width: 30 }, { label: 'Stands', width: 58 }, { label: 'Why', width: 0.5 }, { label: 'Dealt with', width: 0.5 }], [
      ...summary.questioned.map((item): Row => [String(item.seq), 'questioned', item.why.join('; '), item.settled ? `${item.settled.by}, ${clock(item.settled.at)}: ${item.settled.words}` : 'not yet']),
      ...summary.refusals.map((item): Row => [String(item.seq), 'refused', item.reason, 'never entered']),
    ])
  }
  if (summary.corrections.length > 0) {
    sheet.begin('Corrections')
    await drawTable(sheet, [{ label: 'No.', width: 30 }, { label: 'Time', width: 46 }, { label: 'Corrects', width: 0.4 }, { label: 'Now', width: 66 }, { label: 'Reason', width: 0.5 }, { label: 'By', width: 78 }],
      summary.corrections.map((line): Row => [String(line.seq), clock(line.at), line.of ? `No. ${line.of.seq}: ${[line.of.did, line.of.seen].filter(Boolean).join(', ')}` : 'an entry not in this record', line.now, line.reason, line.by]))
  }
  if (summary.questions.length > 0) {
    sheet.begin('Questions')
    await drawTable(sheet, [{ label: 'No.', width: 30 }, { label: 'Question', width: 0.5 }, { label: 'Answer', width: 0.5 }],
      summary.questions.map((line): Row => [String(line.seq), `${line.by}, ${clock(line.at)}${line.about ? `, about No. ${line.about.seq} (${line.about.did})` : ''}: ${line.words}`, line.answer ? `${line.answer.by}, ${clock(line.answer.at)}: ${line.answer.words}` : 'none yet']))
  }
}

/** Every entry of the log, in its order, with what was done, what was seen, by whom, and its signature. */
export async function drawEntries(sheet: Sheet, paper: RecordPaper): Promise<void> {
  sheet.begin('Every signed entry', 90)
  await drawTable(sheet, [
    { label: 'No.', width: 26 }, { label: 'Time', width: 44 }, { label: 'What was done', width: 0.58 }, { label: 'Seen', width: 0.42 }, { label: 'By', width: 74 }, { label: 'Signature', width: 68, style: { face: 'mono', size: 7 } },
  ], entryRows(sheet, paper))
}

function* entryRows(sheet: Sheet, { state, entries, summary, verified }: RecordPaper): Generator<Row> {
  const { timeZone } = summary.heading
  let day = ''
  for (const stored of entries) {
    const at = happenedAt(stored.entry)
    const today = `${dateWords(isoTime(at), timeZone)}, ${offsetWords(isoTime(at), timeZone)}`
    if (today !== day) yield { across: today }
    day = today
    const { did, seen } = told(state, stored.entry)
    const good = verified.get(stored.seq) === true
    const questioned = stored.standing === 'questioned'
    yield [
      String(stored.seq),
      clockWords(isoTime(at), timeZone, true),
      questioned ? { text: did, inset: 11, draw: (x, baseline) => drawMark(sheet.doc, 'questioned', x, baseline) } : did,
      questioned ? [seen, `questioned: ${stored.why.join('; ')}`].filter(Boolean).join(' · ') : seen,
      nameOf(state, stored.entry.by),
      `${good ? 'ok' : 'WRONG'} ${signatureDigits(stored.signature)}`,
    ]
  }
}
