import { palette } from '../../shared/look/palette'
import { Pace } from './pace'
import type { Style, Typesetter } from './typesetter'

type Document = PDFKit.PDFDocument
export type Element = ReturnType<Document['struct']>
/** A bookmark; pdfkit's types leave out what it is written from. */
interface Bookmark { addItem: (title: string, options: object) => Bookmark, children: Bookmark[], outlineData: { Count?: number } }

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
  readonly pace: Pace
  private readonly root: Element
  private section: Element
  private openList: Element | null = null
  private bookmark: Bookmark | null = null

  /** @param foot draws the foot of the page that was begun just now */
  constructor(readonly doc: Document, readonly type: Typesetter, paper: Paper, private readonly foot: { draw: (left: number, right: number, bottom: number) => void }) {
    const [width, height] = PAPERS[paper]
    this.right = width - MARGIN.side
    this.width = this.right - this.left
    this.bottom = height - MARGIN.foot
    this.pace = new Pace(doc)
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

  /** A structure element in the present section, or in one that is given. @param columns that a cell of a table spans */
  element(kind: string, { columns, ...options }: { alt?: string, scope?: 'Row' | 'Column', columns?: number, bbox?: [number, number, number, number] } = {}, parent: Element = this.section): Element {
    const element = this.doc.struct(kind as never, options as never)
    if (columns !== undefined) (element as unknown as { dictionary: { data: Record<string, unknown> } }).dictionary.data.A = { O: 'Table', ColSpan: columns }
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
    this.bookmark = this.mark(this.doc.outline as unknown as Bookmark, bookmark)
    this.y += 12
    const heading = this.element('H2')
    this.content(heading, 'H2', () => this.type.draw(title, this.left, this.y, { face: 'bold', size: 12.5, colour: COLOURS.ink }))
    heading.end()
    this.y += 9
  }

  /** A bookmark to this place below another: parts are open, what is below a part stays folded, which its count says by its sign (ISO 32000-1, 12.3.3). */
  private mark(above: Bookmark, title: string): Bookmark {
    const item = above.addItem(title, { top: this.y - 6, left: this.doc.page.width })
    above.outlineData.Count = above.children.length * (above === this.bookmark ? -1 : 1)
    return item
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

  /** All that is drawn meanwhile by `paragraph` and `labelled` is an item of one list. */
  list(draw: () => void): void {
    const list = this.element('L')
    this.openList = list
    draw()
    this.openList = null
    list.end()
  }

  /** Elements of a paragraph: by itself, or as an item of the open list with its label. */
  private block(labelled: boolean): { label: Element, labelKind: string, body: Element, bodyKind: string, end: () => void } {
    if (!this.openList) {
      const element = this.element('P')
      return { label: element, labelKind: 'P', body: element, bodyKind: 'P', end: () => element.end() }
    }
    const item = this.element('LI', {}, this.openList)
    const label = labelled ? this.element('Lbl', {}, item) : item
    return { label, labelKind: 'Lbl', body: this.element('LBody', {}, item), bodyKind: 'LBody', end: () => item.end() }
  }

  /** Words in lines, over as many pages as they need. */
  paragraph(text: string, { style = {}, left = this.left, width = this.right - left, after = 4 }: { style?: Style, left?: number, width?: number, after?: number } = {}): void {
    const look = { size: 9, colour: COLOURS.ink, ...style }
    const height = look.size * 1.38
    const { body, bodyKind, end } = this.block(false)
    let rest = this.type.wrap(text, width, look)
    // A short paragraph is not divided: one line by itself at the top of a page reads as a mistake.
    if (rest.length <= 4) this.need(rest.length * height)
    while (rest.length > 0) {
      this.need(height)
      const now = rest.slice(0, Math.max(1, Math.floor(this.room / height)))
      rest = rest.slice(now.length)
      this.content(body, bodyKind, () => now.forEach((line, index) => this.type.draw(line, left, this.y + height * index + look.size, look)))
      this.y += height * now.length
    }
    end()
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
    const block = this.block(true)
    for (let from = 0; from < rows;) {
      const count = Math.max(1, Math.min(rows - from, Math.floor(this.room / height)))
      const [heads, words] = [head.slice(from, from + count), lines.slice(from, from + count)]
      if (heads.length > 0) this.content(block.label, block.labelKind, () => heads.forEach((line, index) => this.type.draw(line, this.left, this.y + height * index + look.size, { ...look, face: 'semibold' })))
      if (words.length > 0) this.content(block.body, block.bodyKind, () => words.forEach((line, index) => this.type.draw(line, this.left + column, this.y + height * index + look.size, look)))
      this.y += height * count
      from += count
      if (from < rows) this.newPage()
    }
    block.end()
    this.y += 3.5
  }

  /** A smaller heading inside a part, with a bookmark below the part's. */
  heading(title: string, keep = 84): void {
    this.y += 8
    this.need(keep + 16)
    if (this.bookmark) this.mark(this.bookmark, title)
    const element = this.element('H3')
    this.content(element, 'H3', () => this.type.draw(title, this.left, this.y + 9, { face: 'semibold', size: 10, colour: COLOURS.ink }))
    element.end()
    this.y += 15
  }
}
