import { and, count, desc, eq, inArray } from 'drizzle-orm'
import { countWords } from '../../../shared/charts/words'
import { uuidv7 } from '../../../shared/record/uuid'
import { EXPORT_KIND_WORDS, EXPORT_RECORDS_MAX, EXPORTS_OPEN_MAX } from '../../../shared/schemas/exports'
import type { ExportItem, ExportKind } from '../../../shared/schemas/exports'
import type { RecordFilter } from '../../../shared/schemas/record-filter'
import { outageSearch, people, recordExports } from '../../database/schema'
import { MAKE_EXPORTS } from '../../jobs/names'
import { hasten } from '../../jobs/queue'
import type { Person } from '../access'
import { keepChange } from '../changes/keep'
import type { Database, Queries } from '../database'
import { conflict, notFound, unprocessable } from '../errors'
import { recordsWhere } from '../records/filter'
import type { ExportRow } from './work'

const EXTENSIONS: Record<ExportKind, string> = { 'pdf': 'zip', 'readings': 'csv', 'json-lines': 'jsonl' }
/** Exports that a list shows. */
const LISTED = 50
/** Codes that the history of changes names. */
const NAMED = 100

/**
 * Asks for an export of the records that a search finds, the newest first. It is made by a job; who asked for
 * what stands in the history. 409: too many are not finished; 422: the search finds nothing, or too much.
 * @param now Unix ms
 */
export async function askExport(db: Database, person: Person, kind: ExportKind, filter: RecordFilter, now: number): Promise<ExportItem> {
  return db.transaction(async (tx) => {
    const found = await tx.select({ id: outageSearch.outageId, code: outageSearch.code, siteId: outageSearch.siteId }).from(outageSearch)
      .where(await recordsWhere(person, filter, tx)).orderBy(desc(outageSearch.openedAt), desc(outageSearch.outageId)).limit(EXPORT_RECORDS_MAX[kind] + 1)
    if (found.length === 0) unprocessable('filter', 'The search finds no record')
    if (found.length > EXPORT_RECORDS_MAX[kind]) unprocessable('filter', `More than ${EXPORT_RECORDS_MAX[kind].toLocaleString('en-GB')} records; narrow the search, for example by days, and export it piece by piece`)
    // One who asks twice at once is counted once after the other.
    await tx.select({ id: people.id }).from(people).where(eq(people.id, person.id)).for('no key update')
    const [open] = await tx.select({ count: count() }).from(recordExports).where(and(eq(recordExports.personId, person.id), inArray(recordExports.state, ['waiting', 'working'])))
    if (open!.count >= EXPORTS_OPEN_MAX) conflict(`${EXPORTS_OPEN_MAX} of your exports are still being made; wait for one, or cancel one`)
    const [row] = await tx.insert(recordExports).values({ id: uuidv7(now), personId: person.id, kind, state: 'waiting', fileName: fileNameOf(kind, now), outageIds: found.map(({ id }) => id), total: found.length, askedAt: new Date(now) }).returning()
    await keepExport(tx, person, row!, 'exported', found, now)
    await hasten(tx, MAKE_EXPORTS)
    return itemOf(row!)
  })
}

/** 'holdover-2026-12-01-1803.zip', by UTC. */
function fileNameOf(kind: ExportKind, now: number): string {
  const [day, time] = new Date(now).toISOString().split('T') as [string, string]
  return `holdover-${day}-${time.slice(0, 5).replace(':', '')}.${EXTENSIONS[kind]}`
}

/** Writes to the history who took what away; a site's own history has it where all is of that site. */
export async function keepExport(tx: Queries, person: Person, row: ExportRow, deed: 'exported' | 'downloaded', outages: readonly { code: string, siteId: string }[], now: number): Promise<void> {
  const sites = new Set(outages.map(({ siteId }) => siteId))
  const codes = outages.map(({ code }) => code).sort()
  const records = codes.length > NAMED ? [...codes.slice(0, NAMED), `and ${codes.length - NAMED} more`] : codes
  await keepChange(tx, person, {
    subject: 'export', subjectId: row.id, subjectName: `${countWords(row.total, 'record')}, ${EXPORT_KIND_WORDS[row.kind]},`, siteId: sites.size === 1 ? [...sites][0]! : null, deed,
    fields: [{ field: 'records', before: null, after: records }, ...(row.bytes === null ? [] : [{ field: 'bytes', before: null, after: row.bytes }])],
  }, now)
}

/** A person's own exports, the latest first. */
export async function listExports(db: Queries, person: Person): Promise<ExportItem[]> {
  const rows = await db.select().from(recordExports).where(eq(recordExports.personId, person.id)).orderBy(desc(recordExports.id)).limit(LISTED)
  return rows.map(itemOf)
}

/** An export, if it is the person's own; else 404. */
export async function ownExport(db: Queries, person: Person, id: string): Promise<ExportRow> {
  const [row] = await db.select().from(recordExports).where(and(eq(recordExports.id, id), eq(recordExports.personId, person.id)))
  return row ?? notFound('export')
}

export function itemOf(row: ExportRow): ExportItem {
  const { id, kind, state, fileName, total, done, bytes, fault } = row
  return { id, kind, state, fileName, total, done, bytes, fault, askedAt: row.askedAt.toISOString(), doneAt: row.doneAt?.toISOString() ?? null, expiresAt: row.expiresAt?.toISOString() ?? null }
}
