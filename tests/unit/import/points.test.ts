// The file format is this project's own; no published source.
import { describe, expect, it } from 'vitest'
import { delimiterOf, readPointList } from '~~/shared/import/points'
import { POINT_KINDS } from '~~/shared/schemas/point-kinds'

const HEADER = 'tag,kind,name,address,place,means,guards,rack,suction_group,circuit,cases,rated_a,capacity_kw,min_off_min,hand,on_loss,through_off'
const ROW = 'C-1,compressor,Compressor 1,B1.R1,"Panel A, selector 3",selector,low cut-out; oil failure,Rack A,A medium,,Dairy 1; Dairy 2,42,36.5,5,on,off,yes'
const CELLS = {
  tag: 'C-1', kind: 'compressor', name: 'Compressor 1', address: 'B1.R1', place: 'Panel A, selector 3', means: 'selector', guards: ['low cut-out', 'oil failure'],
  rack: 'Rack A', suction_group: 'A medium', circuit: null, cases: ['Dairy 1', 'Dairy 2'], rated_a: 42, capacity_kw: 36.5, min_off_min: 5, hand: 'on', on_loss: 'off', through_off: true,
}
const faultsOf = (text: string) => readPointList(text).faults

describe('a good list', () => {
  it('is read with every column', () => {
    expect(readPointList(`${HEADER}\n${ROW}\n`)).toMatchObject({ rows: [{ row: 2, cells: CELLS }], faults: [] })
  })

  it.each([
    ['with a byte order mark', `\uFEFF${HEADER}\n${ROW}`],
    ['with carriage returns', `${HEADER}\r\n${ROW}\r\n`],
    ['with blank lines and a header in capitals with blanks', `${HEADER.toUpperCase().replaceAll('_', ' ')}\n${ROW}\n\n`],
    ['with semicolons, decimal commas and its own semicolons in quotes', `${HEADER.replaceAll(',', ';')}\nC-1;compressor;Compressor 1;B1.R1;Panel A, selector 3;selector;"low cut-out; oil failure";Rack A;A medium;;"Dairy 1; Dairy 2";42;36,5;5;on;off;yes`],
    ['with its mark, semicolons and every cell in quotes', `\uFEFF${[HEADER, ...[ROW.replace('"Panel A, selector 3"', 'Panel A| selector 3')]].map(line => line.split(',').map(cell => `"${cell.replace('|', ',')}"`).join(';')).join('\r\n')}`],
  ])('is read the same %s', (_how, text) => {
    expect(readPointList(text)).toMatchObject({ rows: [{ row: 2, cells: CELLS }], faults: [] })
  })

  it('may have its columns in any order and only the three that are needed', () => {
    expect(readPointList('name,tag,kind\nFan,F-1,Evaporator fan\n')).toEqual({ columns: ['name', 'tag', 'kind'], rows: [{ row: 2, cells: { tag: 'F-1', kind: 'evaporator-fan', name: 'Fan' } }], faults: [] })
  })

  it('takes an empty cell as nothing, off the list of guards and cases alike', () => {
    const { rows } = readPointList(`${HEADER}\nX-1,other,X,,,,,,,,,,,,,,\n`)
    expect(rows[0]!.cells).toEqual({
      tag: 'X-1', kind: 'other', name: 'X', address: '', place: '', means: '', guards: [], rack: null, suction_group: null, circuit: null, cases: [],
      rated_a: null, capacity_kw: null, min_off_min: null, hand: null, on_loss: 'unknown', through_off: false,
    })
  })

  it('keeps quotation marks, separators and line ends of a quoted cell', () => {
    const { rows } = readPointList('tag,kind,name\nX-1,other,"The ""old"" fan, left\nof the door"\nX-2,other,Y')
    expect(rows.map(({ row, cells }) => [row, cells.name])).toEqual([[2, 'The "old" fan, left\nof the door'], [3, 'Y']])
  })

  it.each([
    ['on', 'on'], ['OFF', 'off'], ['open', 'open'], ['closed', 'closed'], ['as-found', 'as-found'], ['As found', 'as-found'],
    ['45 Hz', { hz: 45 }], ['45.5hz', { hz: 45.5 }], ['60 %', { percent: 60 }], ['0%', { percent: 0 }],
  ])('reads the hand position %s', (text, hand) => {
    expect(readPointList(`tag,kind,name,hand\nX-1,other,X,${text}`).rows[0]!.cells.hand).toEqual(hand)
  })

  it.each(POINT_KINDS)('knows the kind %s', (kind) => {
    expect(readPointList(`tag,kind,name\nX-1,${kind},X`).rows[0]!.cells.kind).toBe(kind)
  })

  it('reads 2,000 rows', () => {
    const text = `tag,kind,name\n${Array.from({ length: 2000 }, (_, index) => `X-${index},other,X`).join('\n')}`
    expect(readPointList(text)).toMatchObject({ faults: [], rows: { length: 2000 } })
  })
})

describe('a bad list', () => {
  it.each([
    ['empty', '', 'The file is empty'],
    ['only blank', '\uFEFF \n\n', 'The file is empty'],
    ['a header alone', `${HEADER}\n`, 'The file has a header and no rows'],
    ['not UTF-8', 'tag,kind,name\nX-1,other,Caf\uFFFD', 'The file is not UTF-8; save it as "CSV UTF-8"'],
    ['too many rows', `tag,kind,name\n${'X,other,X\n'.repeat(2001)}`, 'The file has more than 2,000 rows'],
    ['too large', `tag,kind,name\nX-1,other,${'é'.repeat(1_000_000)}`, 'The file is larger than 2 MB'],
  ])('is refused whole when it is %s', (_what, text, reason) => {
    expect(readPointList(text)).toEqual({ columns: expect.any(Array), rows: [], faults: [{ row: null, column: null, reason }] })
  })

  it('names an unknown column, a double one and a missing one', () => {
    const faults = faultsOf('tag,colour,name,name,\nX-1,red,X,X,')
    expect(faults.map(({ row, column }) => [row, column])).toEqual([[1, 'colour'], [1, 'name'], [1, 'column 5'], [1, 'kind']])
    expect(faults[0]!.reason).toContain('There is no column colour; the columns are tag, kind, name')
    expect(faults[3]!.reason).toBe('The column kind is missing')
  })

  it.each([
    ['tag', ',other,X,,,,,,,,,,,,,,', 'Write a tag'],
    ['name', 'X-1,other,,,,,,,,,,,,,,,', 'Write a name'],
    ['kind', 'X-1,,X,,,,,,,,,,,,,,', 'Write a kind'],
    ['kind', 'X-1,toaster,X,,,,,,,,,,,,,,', 'There is no kind toaster; write one of compressor, drive'],
    ['rated_a', 'X-1,other,X,,,,,,,,,lots,,,,,', 'lots is not a number'],
    ['rated_a', 'X-1,other,X,,,,,,,,,"18,4",,,,,', '18,4 is not a number'],
    ['capacity_kw', 'X-1,other,X,,,,,,,,,,12 kW,,,,', '12 kW is not a number'],
    ['min_off_min', 'X-1,other,X,,,,,,,,,,,5 min,,,', '5 min is not a number'],
    ['hand', 'X-1,other,X,,,,,,,,,,,,halfway,,', 'halfway is no hand position; write on, off, open, closed, as-found, 45 Hz or 60 %'],
    ['hand', 'X-1,other,X,,,,,,,,,,,,-5 Hz,,', '-5 Hz is no hand position'],
    ['hand', 'X-1,other,X,,,,,,,,,,,,101 %,,', '101 % is out of range'],
    ['on_loss', 'X-1,other,X,,,,,,,,,,,,,perhaps,', 'perhaps is none of on, off, holds, unknown'],
    ['through_off', 'X-1,other,X,,,,,,,,,,,,,,maybe', 'maybe is neither yes nor no'],
  ])('names the column %s of a row with %s', (column, row, reason) => {
    const { rows, faults } = readPointList(`${HEADER}\n${ROW}\n${row}`)
    expect(faults).toEqual([{ row: 3, column, reason: expect.stringContaining(reason) }])
    expect(rows.map(item => item.cells.tag)).toEqual(['C-1'])
  })

  it('gives every fault of a row, and counts rows as a spreadsheet does', () => {
    const faults = faultsOf(`${HEADER}\n\n${ROW}\nX-1,toaster,,,,,,,,,,,,,,,`)
    expect(faults.map(({ row, column }) => [row, column])).toEqual([[4, 'kind'], [4, 'name']])
  })

  it('finds a tag that stands twice, in whatever letters', () => {
    const { rows, faults } = readPointList('tag,kind,name\nX-1,other,One\nx-1,other,Two')
    expect(faults).toEqual([{ row: 3, column: 'tag', reason: 'x-1 stands in row 2 already' }])
    expect(rows).toHaveLength(1)
  })

  it.each([['too few', 'X-1,other'], ['too many', 'X-1,other,Fan, left']])('finds a row with %s cells', (_what, row) => {
    expect(faultsOf(`tag,kind,name\n${row}`)).toEqual([{ row: 2, column: null, reason: expect.stringMatching(/^The row has \d cells and the header 3/) }])
  })

  it('finds a quotation mark that never closes, and one where none may stand', () => {
    expect(faultsOf('tag,kind,name\nX-1,other,"Fan')).toEqual([{ row: expect.any(Number), column: null, reason: 'A quotation mark opens and never closes' }])
    expect(faultsOf('tag,kind,name\nX-1,other,"Fan"x')).toEqual([{ row: 2, column: null, reason: expect.stringContaining('A quotation mark stands where none may') }])
  })
})

describe('delimiterOf', () => {
  it.each([['tag,kind,name\na;b;c;d;e', ','], ['tag;kind;name\na,b,c,d,e', ';'], ['"a,b,c,d";kind;name', ';'], ['tag', ',']])('of %j is %s', (text, delimiter) => {
    expect(delimiterOf(text)).toBe(delimiter)
  })
})
