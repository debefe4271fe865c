import { createHash } from 'node:crypto'
import { eq } from 'drizzle-orm'
import { BYTE_ORDER_MARK, csvRow, readingCells, READINGS_HEAD } from '../../../shared/record/readings-csv'
import type { ExportKind } from '../../../shared/schemas/exports'
import { openRecordPdf } from '../../pdf/record'
import { outages } from '../../database/schema'
import type { Queries } from '../database'
import { gone } from '../errors'
import type { OutageRow } from '../record/log'
import { paperFonts, readPaper, readRecord, readRecordText, recordFileName } from '../record/paper'
import { zipOf } from './zip'

/** What an export is made of: ids of outages in their order, and what is called before each, with how many are done. */
export interface Order { db: Queries, outageIds: readonly string[], before: (done: number) => Promise<void> }

/** The bytes of an export as they come to be: one record is in memory at a time. */
export const CONTENTS: Record<ExportKind, (order: Order) => AsyncIterable<Uint8Array>> = { 'pdf': pdfZip, 'readings': readings, 'json-lines': jsonLines }

async function* readings(order: Order): AsyncGenerator<Uint8Array> {
  yield Buffer.from(BYTE_ORDER_MARK + csvRow(['outage', 'site', ...READINGS_HEAD]))
  for await (const outage of rows(order)) {
    const { state, entries } = await readRecord(order.db, outage)
    yield Buffer.from(readingCells(state, entries).map(cells => csvRow([outage.code, state.snapshot.site.name, ...cells])).join(''))
  }
}

/** Line breaks stand between the parts of a record's text alone, never within a word of it. */
async function* jsonLines(order: Order): AsyncGenerator<Uint8Array> {
  for await (const outage of rows(order)) yield Buffer.from(`${(await readRecordText(order.db, outage)).replaceAll('\n', '')}\n`)
}

async function* rows({ db, outageIds, before }: Order): AsyncGenerator<OutageRow> {
  for (const [index, id] of outageIds.entries()) {
    await before(index)
    yield await outageRow(db, id)
  }
}

const INDEX_HEAD = ['file', 'outage', 'site', 'controller', 'kind_of_work', 'phase', 'opened_utc', 'control_lost_utc', 'ended_utc', 'entries', 'sealed_root', 'bytes', 'sha256']

/** Files are named before any is made, by codes, which are each outage's own. */
async function* pdfZip({ db, outageIds, before }: Order): AsyncGenerator<Uint8Array> {
  const names: { id: string, name: string, at: Date }[] = []
  for (const id of outageIds) {
    const outage = await outageRow(db, id)
    names.push({ id, name: recordFileName(outage, 'pdf'), at: outage.updatedAt })
  }
  const lines: string[] = []
  yield* zipOf([
    ...names.map(({ id, name, at }, index) => ({
      name, at,
      make: async () => {
        await before(index)
        const { bytes, line } = await pdfOf(db, await outageRow(db, id))
        lines.push(line)
        return bytes
      },
    })),
    { name: 'index.csv', at: names.reduce((latest, { at }) => at > latest ? at : latest, new Date(0)), make: async () => Buffer.from(BYTE_ORDER_MARK + csvRow(INDEX_HEAD) + lines.join('')) },
  ])
}

async function pdfOf(db: Queries, outage: OutageRow): Promise<{ bytes: Uint8Array, line: string }> {
  const paper = await readPaper(db, outage)
  const { doc } = openRecordPdf(paper, await paperFonts())
  const chunks: Uint8Array[] = []
  for await (const chunk of doc as AsyncIterable<Uint8Array>) chunks.push(chunk)
  const bytes = Buffer.concat(chunks)
  const { site, controller } = paper.state.snapshot
  const utc = (date: Date | null) => date?.toISOString() ?? null
  return {
    bytes,
    line: csvRow([
      recordFileName(outage, 'pdf'), outage.code, site.name, controller.name, outage.workKind, outage.phase, utc(outage.openedAt), utc(outage.darkAt), utc(outage.endedAt),
      paper.entries.length, paper.state.sealed?.root ?? null, bytes.length, createHash('sha256').update(bytes).digest('hex'),
    ]),
  }
}

async function outageRow(db: Queries, id: string): Promise<OutageRow> {
  const [row] = await db.select().from(outages).where(eq(outages.id, id))
  return row ?? gone('A record of the selection is not there any more; ask for the export again')
}
