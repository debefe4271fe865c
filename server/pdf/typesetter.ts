import type { Face, FontBytes } from './fonts'
import { FACES, fontFiles } from './fonts'

type Document = PDFKit.PDFDocument
interface Glyphs { hasGlyphForCodePoint: (point: number) => boolean }

export interface Style { face?: Face, size?: number, colour?: string }

const ELLIPSIS = '…'

/** Measures, wraps and draws words: every letter in a font that has it, no line wider than its room. */
export class Typesetter {
  private readonly glyphs = new Map<string, Glyphs>()
  private readonly widths = new Map<string, number>()

  constructor(private readonly doc: Document, fonts: FontBytes) {
    for (const face of Object.keys(FACES) as Face[]) {
      for (const name of fontFiles(face)) {
        const bytes = fonts.get(name)!
        doc.registerFont(name, Buffer.from(bytes.buffer, bytes.byteOffset, bytes.byteLength))
      }
    }
  }

  /** Width of words on one line, in points. */
  width(text: string, { face = 'plain', size = 9 }: Style = {}): number {
    const parts = text.split(/(?<= )/)
    return parts.reduce((sum, part) => sum + this.partWidth(part, face), 0) * size / 1000
  }

  /** Lines no wider than `width`; a word longer than a line is broken, and what `most` lines cannot hold ends with an ellipsis. */
  wrap(text: string, width: number, style: Style = {}, most = Infinity): string[] {
    const lines: string[] = []
    for (const paragraph of text.replaceAll('\r\n', '\n').split('\n')) lines.push(...this.wrapParagraph(clean(paragraph), width, style))
    if (lines.length <= most) return lines
    return [...lines.slice(0, most - 1), this.cut(`${lines[most - 1]} ${ELLIPSIS}`, width, style)]
  }

  /** The words, or as many letters of them as fit with an ellipsis. */
  fit(text: string, width: number, style: Style = {}): string {
    const line = clean(text)
    return this.width(line, style) <= width ? line : this.cut(`${line}${ELLIPSIS}`, width, style)
  }

  /** Draws one line with its baseline at `y`. */
  draw(text: string, x: number, y: number, { face = 'plain', size = 9, colour = '#000000' }: Style = {}): void {
    let at = x
    const runs = this.runs(text, face)
    for (const run of runs) {
      this.doc.font(run.font).fontSize(size).fillColor(colour).text(run.text, at, y, { lineBreak: false, baseline: 'alphabetic' })
      if (runs.length > 1) at += this.runWidth(run) * size / 1000
    }
  }

  drawRight(text: string, right: number, y: number, style: Style = {}): void {
    this.draw(text, right - this.width(text, style), y, style)
  }

  drawCentred(text: string, centre: number, y: number, style: Style = {}): void {
    this.draw(text, centre - this.width(text, style) / 2, y, style)
  }

  private wrapParagraph(text: string, width: number, style: Style): string[] {
    const lines: string[] = []
    let line = ''
    for (const word of text.split(' ')) {
      const longer = line === '' ? word : `${line} ${word}`
      if (this.width(longer, style) <= width) { line = longer; continue }
      if (line !== '') lines.push(line)
      line = word
      while (this.width(line, style) > width) {
        const part = this.longestStart(line, width, style)
        lines.push(part)
        line = line.slice(part.length)
      }
    }
    return [...lines, line]
  }

  /** As many whole letters as fit, at least one. */
  private longestStart(word: string, width: number, style: Style): string {
    let part = ''
    for (const letter of word) {
      if (part !== '' && this.width(part + letter, style) > width) break
      part += letter
    }
    return part
  }

  private cut(text: string, width: number, style: Style): string {
    const letters = [...text.slice(0, -1).trimEnd()]
    while (letters.length > 0 && this.width(`${letters.join('').trimEnd()}${ELLIPSIS}`, style) > width) letters.pop()
    return `${letters.join('').trimEnd()}${ELLIPSIS}`
  }

  private partWidth(part: string, face: Face): number {
    const key = `${face} ${part}`
    const known = this.widths.get(key)
    if (known !== undefined) return known
    const width = this.runs(part, face).reduce((sum, run) => sum + this.runWidth(run), 0)
    this.widths.set(key, width)
    return width
  }

  /** In thousandths of the type size. */
  private runWidth({ font, text }: { font: string, text: string }): number {
    return this.doc.font(font).fontSize(1000).widthOfString(text)
  }

  /** Stretches of letters that one font file holds; a letter that none holds is written as a question mark. */
  private runs(text: string, face: Face): { font: string, text: string }[] {
    const files = fontFiles(face)
    const runs: { font: string, text: string }[] = []
    for (const letter of text) {
      const font = files.find(name => this.has(name, letter.codePointAt(0)!))
      const last = runs.at(-1)
      const written = font ? letter : '?'
      const name = font ?? files[0]!
      if (last?.font === name) last.text += written
      else runs.push({ font: name, text: written })
    }
    return runs
  }

  private has(name: string, point: number): boolean {
    let glyphs = this.glyphs.get(name)
    if (!glyphs) {
      glyphs = (this.doc.font(name) as unknown as { _font: { font: Glyphs } })._font.font
      this.glyphs.set(name, glyphs)
    }
    return glyphs.hasGlyphForCodePoint(point)
  }
}

/** Control characters have no place on paper; a tab is a space. */
function clean(text: string): string {
  // eslint-disable-next-line no-control-regex -- finding control characters is what this is for
  return text.replaceAll('\t', ' ').replace(/[\u0000-\u001F\u007F-\u009F\u200B-\u200F\u202A-\u202E\u2060-\u2069\uFEFF]/gu, '')
}
