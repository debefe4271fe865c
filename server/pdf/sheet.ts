import { palette } from '../../shared/look/palette'
import type { Style, Typesetter } from './typesetter'

type Document = PDFKit.PDFDocument
type Element = ReturnType<Document['struct']>

export const COLOURS = palette.paper
/** Margins of the sheet, points; the foot holds page number and root. */
export const MARGIN = { side: 40, top: 44, foot: 58 } as const
const PAPERS = { A4: [595.28, 841.89], Letter: [612, 792] } as const
export type Paper = keyof typeof PAPERS

export function paperSize(paper: Paper): [number, number] {
  return [...PAPERS[paper]]
}

/** A column of pages: where the next thing goes, and which structure element it belongs to. */
export class Sheet {
  readonly left: number = MARGIN.side
  readonly right: number
  readonly width: number
  readonly bottom: number
  /** the next free place, from the top of the page */
  y: number = MARGIN.top
  private readonly root: Element
  private section: Element

  /** @param foot draws the foot of the page that was begun just now */
  constructor(readonly doc: Document, readonly type: Typesetter, paper: Paper, private readonly foot: { draw: (left: number, right: number, bottom: number) => void }) {
    const [width, height] = PAPERS[paper]
    this.right = width - MARGIN.side
    this.width = this.right - this.left
    this.bottom = height - MARGIN.foot
    this.root = doc.struct('Document')
    doc.addStructure(this.root)
    this.section = this.root
    this.newPage()
  }

  /** Room left on this page. */
  get room(): number {
    return this.bottom - this.y
  }

  newPage(): void {
    this.doc.addPage()
    this.foot.draw(this.left, this.right, this.bottom)
    this.y = MARGIN.top
  }

  /** Goes to a new page unless `height` still fits on this one. Gives true when it did. */
  need(height: number): boolean {
    if (this.room >= height) return false
    this.newPage()
    return true
  }

  /** A structure element in the present section, or in one that is given. */
  element(kind: string, options: { alt?: string, scope?: string } = {}, parent: Element = this.section): Element {
    const element = this.doc.struct(kind as never, options as never)
    parent.add(element)
    return element
  }

  /** Draws what belongs to an element. */
  content(element: Element, kind: string, draw: () => void): void {
    element.add(this.doc.markStructureContent(kind as never) as never)
    draw()
    this.doc.endMarkedContent()
  }

  /** Draws what only decorates, so that it is not read aloud. */
  artifact(draw: () => void, type: 'Layout' | 'Pagination' = 'Layout'): void {
    this.doc.markContent('Artifact', { type })
    draw()
    this.doc.endMarkedContent()
  }

  /** A part with a heading of its own and a bookmark. @param keep points that must follow the heading on the same page */
  begin(title: string, keep = 60, bookmark = title): void {
    this.closeSection()
    this.section = this.doc.struct('Sect')
    this.root.add(this.section)
    if (this.y > MARGIN.top) this.y += 20
    this.need(keep + 24)
    this.doc.outline.addItem(bookmark, { top: this.y - 6, left: this.doc.page.width } as never)
    this.y += 12
    const heading = this.element('H2')
    this.content(heading, 'H2', () => this.type.draw(title, this.left, this.y, { face: 'bold', size: 12.5, colour: COLOURS.ink }))
    heading.end()
    this.y += 9
  }

  closeSection(): void {
    if (this.section !== this.root) this.section.end()
    this.section = this.root
  }

  end(): void {
    this.closeSection()
    this.root.end()
  }

  rule(y: number, { from = this.left, to = this.right, colour = COLOURS.rule as string, width = 0.75 } = {}): void {
    this.artifact(() => this.doc.moveTo(from, y).lineTo(to, y).lineWidth(width).strokeColor(colour).stroke())
  }

  /** Words in lines, over as many pages as they need. */
  paragraph(text: string, { style = {}, kind = 'P', left = this.left, width = this.right - left, after = 4 }: { style?: Style, kind?: string, left?: number, width?: number, after?: number } = {}): void {
    const look = { size: 9, colour: COLOURS.ink, ...style }
    const height = look.size * 1.38
    const element = this.element(kind)
    let rest = this.type.wrap(text, width, look)
    while (rest.length > 0) {
      this.need(height)
      const now = rest.slice(0, Math.max(1, Math.floor(this.room / height)))
      rest = rest.slice(now.length)
      this.content(element, kind, () => now.forEach((line, index) => this.type.draw(line, left, this.y + height * index + look.size, look)))
      this.y += height * now.length
    }
    element.end()
    this.y += after
  }

  /** A label in the left column and words beside it, kept together on a page. */
  labelled(label: string, text: string, column = 116): void {
    const look = { size: 9, colour: COLOURS.ink }
    const height = look.size * 1.38
    const head = this.type.wrap(label, column - 8, { ...look, face: 'semibold' })
    const lines = this.type.wrap(text, this.width - column, look)
    const rows = Math.max(head.length, lines.length)
    this.need(Math.min(rows, 40) * height)
    const element = this.element('P')
    for (let from = 0; from < rows;) {
      const count = Math.max(1, Math.min(rows - from, Math.floor(this.room / height)))
      this.content(element, 'P', () => {
        head.slice(from, from + count).forEach((line, index) => this.type.draw(line, this.left, this.y + height * index + look.size, { ...look, face: 'semibold' }))
        lines.slice(from, from + count).forEach((line, index) => this.type.draw(line, this.left + column, this.y + height * index + look.size, look))
      })
      this.y += height * count
      from += count
      if (from < rows) this.newPage()
    }
    element.end()
    this.y += 3.5
  }

  /** A smaller heading inside a part. */
  heading(title: string, keep = 84): void {
    this.y += 8
    this.need(keep + 16)
    const element = this.element('H3')
    this.content(element, 'H3', () => this.type.draw(title, this.left, this.y + 9, { face: 'semibold', size: 10, colour: COLOURS.ink }))
    element.end()
    this.y += 15
  }
}
