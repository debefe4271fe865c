import { clockWords, countWords, dateWords, offsetWords } from '../../shared/charts/words'
import { attentionOf, numbered } from '../../shared/record/attention'
import { isoTime } from '../../shared/record/entry'
import { recordDisc } from '../../shared/record/record-charts'
import type { RecordSummary, SignatureLine } from '../../shared/record/summary'
import { spanWords, summaryRows, zoneWords } from '../../shared/record/summary-words'
import { drawDisc } from './charts'
import type { RecordPaper } from './record'
import type { Sheet } from './sheet'
import { COLOURS } from './sheet'

const RIGHT_SHARE = 0.605
const DISC = 184

/** The first page's head: what it was, the disc, the figures and the signatures. */
export function drawFront(sheet: Sheet, paper: RecordPaper): void {
  const { summary } = paper
  sheet.doc.outline.addItem('Summary', { top: 0, left: sheet.doc.page.width } as never)
  drawTitle(sheet, summary)
  const top = sheet.y
  const discInput = recordDisc(paper.state, paper.now)
  const left = sheet.right - sheet.width * RIGHT_SHARE
  if (discInput) drawDisc(sheet, discInput, { x: sheet.left + DISC / 2 - 2, y: top + DISC / 2 }, DISC)
  else drawNoDisc(sheet, top, left - sheet.left)
  drawRows(sheet, summary, left)
  sheet.y += 10
  drawSignatures(sheet, paper, left)
  sheet.y = Math.max(sheet.y, top + DISC) + 2
  drawAttention(sheet, paper)
}

function drawTitle(sheet: Sheet, summary: RecordSummary): void {
  const { type } = sheet
  const { heading } = summary
  const ink = COLOURS.ink
  const aside = 200
  const title = sheet.element('H1')
  sheet.content(title, 'H1', () => type.draw('Record of a controller outage', sheet.left, sheet.y + 17, { face: 'bold', size: 19, colour: ink }))
  title.end()
  const what = `${heading.site}, ${heading.controller} · ${heading.planned ? heading.work : 'unplanned outage'}`
  const subtitle = sheet.element('P')
  const lines = type.wrap(what, sheet.width - aside - 12, { size: 11 }, 2)
  sheet.content(subtitle, 'P', () => lines.forEach((line, index) => type.draw(line, sheet.left, sheet.y + 36 + index * 14, { size: 11, colour: ink })))
  subtitle.end()
  const identity = sheet.element('P')
  sheet.content(identity, 'P', () => {
    type.drawRight(type.fit(heading.code ?? 'not numbered', aside, { face: 'bold', size: 12 }), sheet.right, sheet.y + 12, { face: 'bold', size: 12, colour: ink })
    type.drawRight(type.fit(spanWords(heading), aside, { size: 9 }), sheet.right, sheet.y + 26, { size: 9, colour: ink })
    type.drawRight(type.fit(zoneWords(heading), aside, { size: 9 }), sheet.right, sheet.y + 38, { size: 9, colour: ink })
  })
  identity.end()
  sheet.y += 46 + (lines.length - 1) * 14
  sheet.rule(sheet.y, { colour: ink, width: 2 })
  sheet.y += 12
}

function drawNoDisc(sheet: Sheet, top: number, width: number): void {
  const note = sheet.element('P')
  sheet.content(note, 'P', () => sheet.type.drawCentred('Control was never lost.', sheet.left + width / 2 - 10, top + DISC / 2, { size: 10, colour: COLOURS['ink-2'] }))
  note.end()
}

/** Label to the left, what is told to the right; long values wrap to the right margin. */
function drawRows(sheet: Sheet, summary: RecordSummary, left: number): void {
  const { type } = sheet
  const room = sheet.right - left - 104
  sheet.rule(sheet.y, { from: left })
  const table = sheet.element('Table')
  for (const row of summaryRows(summary)) {
    const text = row.parts.map(part => part.text).join('')
    const simple = row.parts.reduce((sum, part) => sum + type.width(part.text, { size: 9, face: part.strong ? 'bold' : 'plain' }), 0) <= room
    const lines = simple ? [text] : type.wrap(text, room, { size: 9 }, 5)
    const element = sheet.element('TR', {}, table)
    sheet.content(sheet.element('TH', { scope: 'Row' }, element), 'TH', () => type.draw(row.label, left, sheet.y + 13.5, { size: 9, colour: COLOURS.ink }))
    sheet.content(sheet.element('TD', {}, element), 'TD', () => {
      if (!simple) { lines.forEach((line, index) => type.drawRight(line, sheet.right, sheet.y + 13.5 + index * 11.5, { size: 9, colour: COLOURS.ink })); return }
      let x = sheet.right - row.parts.reduce((sum, part) => sum + type.width(part.text, { size: 9, face: part.strong ? 'bold' : 'plain' }), 0)
      for (const part of row.parts) {
        type.draw(part.text, x, sheet.y + 13.5, { size: 9, face: part.strong ? 'bold' : 'plain', colour: COLOURS.ink })
        x += type.width(part.text, { size: 9, face: part.strong ? 'bold' : 'plain' })
      }
    })
    element.end()
    sheet.y += 20 + (lines.length - 1) * 11.5
    sheet.rule(sheet.y, { from: left })
  }
  table.end()
}

/** The signatures that stand: the technician's under the record, the supervisor's over it. */
function drawSignatures(sheet: Sheet, paper: RecordPaper, left: number): void {
  const gap = 10
  const width = (sheet.right - left - gap) / 2
  const last = (what: SignatureLine['what']) => paper.summary.signatures.filter(line => line.what === what && line.stands).at(-1)
  const boxes = [
    { signature: last('submitted'), did: 'Signed', none: 'Not yet submitted' },
    { signature: last('sealed'), did: 'Countersigned', none: 'Not yet countersigned' },
  ]
  const meanings = boxes.map(({ signature }) => signature ? sheet.type.wrap(`“${signature.meaning}”`, width - 16, { size: 6.5 }, 4) : [])
  const height = 78 + Math.max(...meanings.map(lines => lines.length)) * 8
  boxes.forEach((box, index) => drawSignature(sheet, paper, { ...box, meaning: meanings[index]! }, { x: left + index * (width + gap), y: sheet.y, width, height }))
  sheet.y += height
}

function drawSignature(sheet: Sheet, paper: RecordPaper, { signature, did, none, meaning }: { signature: SignatureLine | undefined, did: string, none: string, meaning: string[] }, box: { x: number, y: number, width: number, height: number }): void {
  const { type, doc } = sheet
  const { timeZone } = paper.summary.heading
  sheet.artifact(() => doc.rect(box.x, box.y, box.width, box.height).lineWidth(0.9).stroke(COLOURS.ink))
  const inner = { x: box.x + 8, width: box.width - 16 }
  const faint = { size: 8, colour: COLOURS['ink-2'] }
  if (!signature) {
    const element = sheet.element('P')
    sheet.content(element, 'P', () => type.draw(none, inner.x, box.y + 45, faint))
    element.end()
    return
  }
  const drawing = paper.drawings.get(signature.drawing)
  if (drawing) {
    const figure = sheet.element('Figure', { bbox: [inner.x, box.y + 4, inner.x + inner.width, box.y + 42], alt: `Drawn signature of ${signature.by}` })
    sheet.content(figure, 'Figure', () => doc.image(Buffer.from(drawing), inner.x, box.y + 4, { fit: [inner.width, 38], valign: 'center' } as never))
    figure.end()
  }
  const at = isoTime(signature.at)
  const element = sheet.element('P')
  sheet.content(element, 'P', () => {
    if (!drawing) type.draw('drawing awaited', inner.x, box.y + 28, faint)
    type.draw(type.fit(signature.by, inner.width, { size: 9, face: 'semibold' }), inner.x, box.y + 51, { size: 9, face: 'semibold', colour: COLOURS.ink })
    type.draw(type.fit(`${did}, ${signature.role} · ${clockWords(at, timeZone, true)}`, inner.width, faint), inner.x, box.y + 62, faint)
    type.draw(type.fit(`${dateWords(at, timeZone)}, ${offsetWords(at, timeZone)}`, inner.width, faint), inner.x, box.y + 72, faint)
    meaning.forEach((line, index) => type.draw(line, inner.x, box.y + 81 + index * 8, { size: 6.5, colour: COLOURS['ink-2'] }))
  })
  element.end()
}

/** What a reviewer must not miss, on the first page. */
function drawAttention(sheet: Sheet, { state, summary }: RecordPaper): void {
  const points = attentionOf(state, summary)
  sheet.begin('What to look at', 40)
  if (points.length === 0) { sheet.paragraph('Nothing out of the ordinary: no late round, no verdict, no point excused or left, no entry questioned, no clock more than five minutes off.', { style: { colour: COLOURS['ink-2'] } }); return }
  sheet.list(() => points.forEach(({ what, items }) => {
    const shown = items.slice(0, 8)
    const more = items.length > shown.length ? `; and ${countWords(items.length - shown.length, 'more', 'more')}, further on` : ''
    sheet.labelled(what, `${shown.map(numbered).join(' · ')}${more}`)
  }))
}
