import type { Sheet } from './sheet'
import { COLOURS } from './sheet'
import type { Style } from './typesetter'

export interface Column {
  label: string
  /** points, or a share of what the others leave when it is below 1 */
  width: number
  align?: 'left' | 'right'
  style?: Style
}

/** A cell: words, or words in another style, or a drawing before them that takes `inset` points. */
export type Cell = string | { text: string, style?: Style, inset?: number, draw?: (x: number, baseline: number) => void }

/** A row of cells, or words across all columns (a change of date). */
export type Row = Cell[] | { across: string }

const SIZE = 8.5
const LEADING = 11.4
const PAD = 4.2
const GAP = 8

/** Others have their turn, and the reader catches up, after so many rows. */
const ROWS_AT_ONCE = 20

interface Placed { x: number, width: number, column: Column }

/** A table over as many pages as it needs: the head again on each, no row drawn over another, long rows carried on. @param rows each is asked for when it is drawn */
export async function drawTable(sheet: Sheet, columns: readonly Column[], rows: Iterable<Row>): Promise<void> {
  const placed = place(sheet, columns)
  const table = sheet.element('Table')
  sheet.need(64)
  drawHead(sheet, placed, sheet.element('TR', {}, table))
  let drawn = 0
  for (const row of rows) {
    drawRow(sheet, placed, row, sheet.element('TR', {}, table))
    drawn += 1
    if (drawn % ROWS_AT_ONCE === 0) await sheet.pace.rest()
  }
  table.end()
}

function place(sheet: Sheet, columns: readonly Column[]): Placed[] {
  const fixed = columns.reduce((sum, column) => sum + (column.width > 1 ? column.width : 0), 0)
  const shared = sheet.width - fixed - GAP * (columns.length - 1)
  const shares = columns.reduce((sum, column) => sum + (column.width <= 1 ? column.width : 0), 0)
  let x = sheet.left
  return columns.map((column) => {
    const width = column.width > 1 ? column.width : shared * column.width / shares
    // Figures to the right keep clear of the words that follow them.
    const cell = { x, width: column.align === 'right' ? width - 5 : width, column }
    x += width + GAP
    return cell
  })
}

const HEAD: Style = { size: SIZE, face: 'semibold', colour: COLOURS['ink-2'] }

/** @param row its structure element; null where the head is only repeated */
function drawHead(sheet: Sheet, placed: readonly Placed[], row: ReturnType<Sheet['element']> | null): void {
  sheet.rule(sheet.y)
  const baseline = sheet.y + PAD + SIZE
  const words = ({ x, width, column }: Placed) => {
    const text = sheet.type.fit(column.label, width, HEAD)
    if (column.align === 'right') sheet.type.drawRight(text, x + width, baseline, HEAD)
    else sheet.type.draw(text, x, baseline, HEAD)
  }
  for (const cell of placed) {
    if (row === null) { sheet.artifact(() => words(cell), 'Pagination'); continue }
    const element = sheet.element('TH', { scope: 'Column' }, row)
    sheet.content(element, 'TH', () => words(cell))
    element.end()
  }
  row?.end()
  sheet.y += PAD + LEADING + PAD - 1
  sheet.rule(sheet.y)
}

interface Laid { placed: Placed, lines: string[], style: Style, inset: number, draw?: (x: number, baseline: number) => void }

function lay(sheet: Sheet, placed: Placed, cell: Cell): Laid {
  const { text, style = {}, inset = 0, draw } = typeof cell === 'string' ? { text: cell } : cell
  const look: Style = { size: SIZE, colour: COLOURS.ink, ...placed.column.style, ...style }
  return { placed, lines: text === '' ? [] : sheet.type.wrap(text, placed.width - inset, look), style: look, inset, draw }
}

function drawRow(sheet: Sheet, placed: readonly Placed[], row: Row, element: ReturnType<Sheet['element']>): void {
  const cells = Array.isArray(row)
    ? placed.map((cell, index) => lay(sheet, cell, row[index] ?? ''))
    : [lay(sheet, { x: sheet.left, width: sheet.width, column: placed[0]!.column }, { text: row.across, style: { face: 'semibold', colour: COLOURS['ink-2'] } })]
  const elements = cells.map(() => sheet.element('TD', Array.isArray(row) ? {} : { columns: placed.length }, element))
  const most = Math.max(1, ...cells.map(cell => cell.lines.length))
  const pageHolds = Math.floor((sheet.bottom - 100) / LEADING)
  // A row goes to the next page whole, unless no page could hold it.
  if (heightOf(Math.min(most, pageHolds)) > sheet.room) breakPage(sheet, placed)
  for (let from = 0; from < most;) {
    if (from > 0) breakPage(sheet, placed)
    const count = Math.max(1, Math.min(most - from, Math.floor((sheet.room - 2 * PAD) / LEADING)))
    cells.forEach((cell, index) => drawPart(sheet, cell, elements[index]!, from, count))
    sheet.y += heightOf(count)
    from += count
  }
  for (const cell of elements) cell.end()
  element.end()
  sheet.rule(sheet.y)
}

const heightOf = (lines: number) => PAD + lines * LEADING + PAD - 1.4

function breakPage(sheet: Sheet, placed: readonly Placed[]): void {
  sheet.newPage()
  drawHead(sheet, placed, null)
}

function drawPart(sheet: Sheet, { placed: { x, width, column }, lines, style, inset, draw }: Laid, element: ReturnType<Sheet['element']>, from: number, count: number): void {
  const top = sheet.y + PAD + SIZE - 0.6
  if (from === 0 && draw) sheet.artifact(() => draw(x, top))
  const part = lines.slice(from, from + count)
  if (part.length === 0) return
  sheet.content(element, 'TD', () => part.forEach((line, index) => {
    if (column.align === 'right') sheet.type.drawRight(line, x + width, top + index * LEADING, style)
    else sheet.type.draw(line, x + inset, top + index * LEADING, style)
  }))
}
