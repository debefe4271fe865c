/**
 * Reads a point list: CSV text into rows and faults, each fault with its row, column and reason. Knows nothing of
 * the equipment that the rows will land in.
 */
import { parse } from 'csv-parse/sync'
import { POINTS_MAX } from '../schemas/equipment'
import type { PointCells, PointColumn } from './columns'
import { POINT_COLUMNS, READ_CELL, REQUIRED_COLUMNS } from './columns'
import { FILE_MAX_BYTES } from './limits'

/** Why something cannot land. Rows count as a spreadsheet counts them: the header is row 1. Null: the whole file. */
export interface ImportFault { row: number | null, column: string | null, reason: string }
export interface PointRow { row: number, cells: PointCells }
export interface PointList { columns: PointColumn[], rows: PointRow[], faults: ImportFault[] }

const nothing = (fault: ImportFault): PointList => ({ columns: [], rows: [], faults: [fault] })
const whole = (reason: string): PointList => nothing({ row: null, column: null, reason })

/** Reads a whole file. Rows with a fault are left out of `rows`. @param text with or without byte order mark */
export function readPointList(text: string): PointList {
  if (new TextEncoder().encode(text).length > FILE_MAX_BYTES) return whole('The file is larger than 2 MB')
  if (text.includes('\uFFFD')) return whole('The file is not UTF-8; save it as "CSV UTF-8"')
  const body = text.replace(/^\uFEFF/, '')
  if (body.trim() === '') return whole('The file is empty')
  const delimiter = delimiterOf(body)
  const table = readTable(body, delimiter)
  if ('fault' in table) return nothing(table.fault)
  const [header = [], ...records] = table.records
  const named = readHeader(header)
  if (named.faults.length > 0) return { columns: named.columns, rows: [], faults: named.faults }
  if (records.every(isBlank)) return { columns: named.columns, rows: [], faults: [{ row: null, column: null, reason: 'The file has a header and no rows' }] }
  if (records.filter(record => !isBlank(record)).length > POINTS_MAX) return whole(`The file has more than ${POINTS_MAX.toLocaleString('en')} rows`)
  return readRows(named.columns, records, delimiter === ';')
}

/** Comma or semicolon: whichever stands more often in the header, outside quotes. */
export function delimiterOf(text: string): ',' | ';' {
  const header = text.trimStart().split(/\r\n|\r|\n/, 1)[0]!.replace(/"[^"]*"/g, '')
  const count = (mark: string) => header.split(mark).length - 1
  return count(';') > count(',') ? ';' : ','
}

function readTable(text: string, delimiter: string): { records: string[][] } | { fault: ImportFault } {
  try {
    const records: string[][] = parse(text, { delimiter, relax_column_count: true, trim: true, skip_empty_lines: false, record_delimiter: ['\r\n', '\n', '\r'] })
    return { records: records.map(record => record.map(cell => cell.trim())) }
  } catch (error) {
    const { lines, code } = error as { lines?: number, code?: string }
    const reason = code === 'CSV_QUOTE_NOT_CLOSED' ? 'A quotation mark opens and never closes' : 'A quotation mark stands where none may; write it twice inside a quoted cell'
    return { fault: { row: lines ?? null, column: null, reason } }
  }
}

const isBlank = (record: string[]) => record.every(cell => cell === '')

function readHeader(header: string[]): { columns: PointColumn[], faults: ImportFault[] } {
  const faults: ImportFault[] = []
  const columns: PointColumn[] = []
  for (const [index, cell] of header.entries()) {
    const column = POINT_COLUMNS.find(known => known === cell.toLowerCase().replace(/[\s-]+/g, '_'))
    if (!column) faults.push({ row: 1, column: cell || `column ${index + 1}`, reason: cell ? `There is no column ${cell}; the columns are ${POINT_COLUMNS.join(', ')}` : 'A column has no name' })
    else if (columns.includes(column)) faults.push({ row: 1, column, reason: 'The column stands twice' })
    else columns.push(column)
  }
  for (const column of REQUIRED_COLUMNS) {
    if (!columns.includes(column)) faults.push({ row: 1, column, reason: `The column ${column} is missing` })
  }
  return { columns, faults }
}

function readRows(columns: PointColumn[], records: string[][], comma: boolean): PointList {
  const rows: PointRow[] = []
  const faults: ImportFault[] = []
  const firstRow = new Map<string, number>()
  for (const [index, record] of records.entries()) {
    if (isBlank(record)) continue
    const row = index + 2
    if (record.length !== columns.length) {
      faults.push({ row, column: null, reason: `The row has ${record.length} cells and the header ${columns.length}; put a cell that holds the separator in quotation marks` })
      continue
    }
    const cells: Record<string, unknown> = {}
    let sound = true
    for (const [at, column] of columns.entries()) {
      const read = READ_CELL[column](record[at]!, comma)
      if ('fault' in read) {
        faults.push({ row, column, reason: read.fault })
        sound = false
      } else {
        cells[column] = read.value
      }
    }
    const tag = record[columns.indexOf('tag')]!
    const earlier = tag === '' ? undefined : firstRow.get(tag.toLowerCase())
    if (earlier !== undefined) faults.push({ row, column: 'tag', reason: `${tag} stands in row ${earlier} already` })
    else firstRow.set(tag.toLowerCase(), row)
    // READ_CELL gives each column's own type, and the header holds the three that are required.
    if (sound && earlier === undefined) rows.push({ row, cells: cells as unknown as PointCells })
  }
  return { columns, rows, faults }
}
