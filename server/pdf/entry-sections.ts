import { clockWords, countWords, dateWords, durationWords, offsetWords } from '../../shared/charts/words'
import { standstillWords } from '../utils/cover/standstill-words'
import { DISCLAIMER, outageCautions } from '../../shared/record/cautions'
import { happenedAt, isoTime } from '../../shared/record/entry'
import { filesOf } from '../../shared/record/fold'
import { nameOf } from '../../shared/record/select'
import { fullStampWords, signatureDigits } from '../../shared/record/summary-words'
import { told } from '../../shared/record/words'
import { drawMark } from './marks'
import type { RecordPaper } from './record'
import type { Sheet } from './sheet'
import { COLOURS } from './sheet'
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
      summary.questions.map((line): Row => [String(line.seq), `${line.by}, ${clock(line.at)}: ${line.words}`, line.answer ? `${line.answer.by}, ${clock(line.answer.at)}: ${line.answer.words}` : 'none yet']))
  }
}

/** Every entry of the log, in its order, with what was done, what was seen, by whom, and its signature. */
export async function drawEntries(sheet: Sheet, { state, entries, summary, verified }: RecordPaper): Promise<void> {
  const { timeZone } = summary.heading
  sheet.begin('Every signed entry', 90)
  const rows: Row[] = []
  let day = ''
  for (const stored of entries) {
    const at = happenedAt(stored.entry)
    const today = `${dateWords(isoTime(at), timeZone)}, ${offsetWords(isoTime(at), timeZone)}`
    if (today !== day) rows.push({ across: today })
    day = today
    const { did, seen } = told(state, stored.entry)
    const good = verified.get(stored.seq) === true
    const questioned = stored.standing === 'questioned'
    rows.push([
      String(stored.seq),
      clockWords(isoTime(at), timeZone, true),
      questioned ? { text: did, inset: 11, draw: (x, baseline) => drawMark(sheet.doc, 'questioned', x, baseline) } : did,
      questioned ? [seen, `questioned: ${stored.why.join('; ')}`].filter(Boolean).join(' · ') : seen,
      nameOf(state, stored.entry.by),
      { text: `${good ? 'ok' : 'WRONG'} ${signatureDigits(stored.signature)}`, style: good ? {} : { colour: COLOURS.ink } },
    ])
  }
  await drawTable(sheet, [
    { label: 'No.', width: 26 }, { label: 'Time', width: 44 }, { label: 'What was done', width: 0.58 }, { label: 'Seen', width: 0.42 }, { label: 'By', width: 74 }, { label: 'Signature', width: 68, style: { face: 'mono', size: 7 } },
  ], rows)
}

/** Who signed, with which key; files; and what this paper does and does not show. */
export async function drawProof(sheet: Sheet, paper: RecordPaper): Promise<void> {
  const { state, entries, verified, summary, held, sealHolds } = paper
  const { timeZone } = summary.heading
  sheet.begin('Signers')
  await drawTable(sheet, [{ label: 'Name', width: 0.4 }, { label: 'Role', width: 66 }, { label: 'Device', width: 0.3 }, { label: 'Entries', width: 42, align: 'right' }, { label: 'Public key (Ed25519)', width: 192, style: { face: 'mono', size: 7 } }],
    Object.entries(state.signers).map(([device, signer]): Row => [signer.name, signer.role, signer.deviceName, String(entries.filter(stored => stored.entry.device === device).length), signer.publicKey]))
  const files = entries.flatMap(stored => filesOf(stored.entry).map(file => ({ file, seq: stored.seq, drawing: 'drawing' in stored.entry.body })))
  if (files.length > 0) {
    sheet.begin('Photos and drawings')
    await drawTable(sheet, [{ label: 'No.', width: 30 }, { label: 'What', width: 56 }, { label: 'SHA-256', width: 1, style: { face: 'mono', size: 7 } }, { label: '', width: 60 }],
      files.map(({ file, seq, drawing }): Row => [String(seq), drawing ? 'drawing' : 'photo', file, held.has(file) ? 'held' : 'awaited']))
  }
  sheet.begin('What this paper shows')
  const bad = entries.filter(stored => verified.get(stored.seq) !== true)
  sheet.paragraph(bad.length === 0
    ? `The signature of each of the ${countWords(entries.length, 'entry', 'entries')} was verified against its signer's key while this paper was made. “ok” and the first four and last two digits stand beside each entry.`
    : `The signatures of ${countWords(bad.length, 'entry', 'entries')} do not fit their signer's key: No. ${bad.map(stored => stored.seq).join(', ')}.`)
  const { sealed } = state
  if (sealed) {
    sheet.paragraph(`Sealed ${fullStampWords(sealed.mark.at, timeZone)} by ${nameOf(state, sealed.mark.by)} over ${countWords(sealed.size, 'entry', 'entries')}. ${sealHolds ? 'The root of those entries, worked out anew for this paper, is the one that was sealed.' : 'The root of those entries, worked out anew for this paper, is NOT the one that was sealed.'} Root (RFC 9162):`)
    sheet.paragraph(sealed.root, { style: { face: 'mono', size: 7.5 } })
    sheet.paragraph('A change by anyone without the devices\' private keys would show in the record itself. Whoever owns the database and signs everything anew makes another record with another root: compare this one with the root that was sent out when it was sealed.')
  } else {
    sheet.paragraph('This record is not sealed: it may still grow.')
  }
  if (state.largestSkew && state.largestSkew.ms > 1000) sheet.paragraph(`Times are the devices' own, less their last measured difference from the server; the largest was ${durationWords(state.largestSkew.ms / 1000)}.`)
  sheet.begin('Cautions')
  for (const words of standstillWords(state.snapshot)) sheet.paragraph(words, { after: 3 })
  for (const caution of outageCautions(state)) sheet.paragraph(`${caution.hazard.toUpperCase()}: ${caution.words}`, { after: 3 })
  sheet.paragraph(DISCLAIMER, { style: { face: 'semibold' } })
}
