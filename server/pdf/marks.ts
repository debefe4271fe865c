import { COLOURS } from './sheet'

type Document = PDFKit.PDFDocument
/** The marks of points and entries: a shape says the state, a colour only repeats it. */
export type PaperMark = 'auto' | 'hand' | 'proven' | 'excused' | 'questioned'

/** Draws a mark, 7 points across, beside words whose baseline is given. */
export function drawMark(doc: Document, mark: PaperMark, x: number, baseline: number): void {
  const size = 7
  doc.save().translate(x, baseline - size + 0.6).scale(size / 24)
  if (mark === 'hand') {
    doc.rect(2, 2, 20, 20).lineWidth(2).fillAndStroke(COLOURS['hand-fill'], COLOURS.ink)
  } else {
    const colour = mark === 'proven' ? COLOURS.fine : mark === 'auto' ? COLOURS['ink-2'] : COLOURS.ink
    doc.lineWidth(2.5).strokeColor(colour).circle(12, 12, 9.75).stroke()
    if (mark === 'proven') doc.path('M7 12.3l3.6 3.9L17.2 8.4').lineWidth(2.8).stroke()
    if (mark === 'excused') doc.path('M6 12h12').lineWidth(3).stroke()
    if (mark === 'questioned') doc.path('M9 9.4a3 3 0 1 1 4.4 2.7c-1 .5-1.4 1-1.4 2M12 15.9v2').lineWidth(2.4).stroke()
  }
  doc.restore()
}
