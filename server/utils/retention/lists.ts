import { and, asc, desc, eq, inArray, lte, sql } from 'drizzle-orm'
import { z } from 'zod'
import type { DeletionStatement } from '../../../shared/record/deletion'
import { time } from '../../../shared/record/kinds/common'
import { retentionOver, retentionYears } from '../../../shared/record/retention'
import type { DeletedPage, DuePage } from '../../../shared/schemas/retention'
import { controllers, deletions, legalHolds, outages, retention, sites } from '../../database/schema'
import type { Person } from '../access'
import { visibleSites } from '../access'
import { useDatabase } from '../database'
import { unprocessable } from '../errors'
import { ENDED } from './holds'
import { organisationYears } from './settings'

/** Lines that one page holds. */
const PAGE = 50
const DAY_MS = 24 * 3_600_000
const placeSchema = z.tuple([time, z.string().uuid()])

/** Records whose retention is over, the longest over first; those under hold are among them and say so. @param now Unix ms */
export async function listDue(now: number, after?: string): Promise<DuePage> {
  const db = useDatabase()
  const years = await organisationYears(db)
  const over = sql`${outages.updatedAt} + make_interval(years => greatest(${years}::int, coalesce(${retention.years}, 0)))`
  const rows = await db.select({
    id: outages.id, code: outages.code, site: { id: sites.id, name: sites.name, timeZone: sites.timeZone }, controller: controllers.name,
    phase: outages.phase, size: outages.size, endedAt: outages.endedAt, lastAt: outages.updatedAt, own: retention.years,
    held: sql<boolean>`exists (select 1 from ${legalHolds} where ${legalHolds.outageId} = ${outages.id} and ${legalHolds.liftedAt} is null)`,
  }).from(outages).innerJoin(sites, eq(sites.id, outages.siteId)).innerJoin(controllers, eq(controllers.id, outages.controllerId)).leftJoin(retention, eq(retention.siteId, outages.siteId))
    .where(and(
      inArray(outages.phase, [...ENDED]),
      // By the time of the end and the organisation's years the index finds them; the rest only leaves some out. A clock may have run ahead by a day.
      lte(outages.endedAt, sql`${new Date(now + DAY_MS).toISOString()}::timestamptz - make_interval(years => ${years}::int)`),
      sql`${over} <= ${new Date(now).toISOString()}::timestamptz`,
      after ? sql`(${outages.endedAt}, ${outages.id}) > ${placeOf(after)}` : undefined,
    )).orderBy(asc(outages.endedAt), asc(outages.id)).limit(PAGE + 1)
  const page = rows.slice(0, PAGE)
  return {
    items: page.map(({ own, endedAt, lastAt, phase, ...row }) => ({ ...row, phase: phase as DuePage['items'][number]['phase'], endedAt: endedAt!.toISOString(), over: new Date(retentionOver(lastAt.getTime(), retentionYears(years, own))).toISOString() })),
    next: rows.length > PAGE ? `${page.at(-1)!.endedAt!.toISOString()}_${page.at(-1)!.id}` : null,
  }
}

/** Records that were deleted, the latest first, of the sites that the person may see. */
export async function listDeleted(person: Person, after?: string): Promise<DeletedPage> {
  const visible = await visibleSites(person)
  if (visible?.length === 0) return { items: [], next: null }
  const rows = await useDatabase().select({
    id: deletions.outageId, code: deletions.code, site: { id: sites.id, name: sites.name, timeZone: sites.timeZone }, controller: deletions.controllerName,
    size: deletions.size, deletedAt: deletions.deletedAt, statement: deletions.statement,
  }).from(deletions).innerJoin(sites, eq(sites.id, deletions.siteId))
    .where(and(visible ? inArray(deletions.siteId, visible) : undefined, after ? sql`(${deletions.deletedAt}, ${deletions.outageId}) < ${placeOf(after)}` : undefined))
    .orderBy(desc(deletions.deletedAt), desc(deletions.outageId)).limit(PAGE + 1)
  const page = rows.slice(0, PAGE)
  return {
    items: page.map(({ statement, deletedAt, ...row }) => ({ ...row, deletedAt: deletedAt.toISOString(), ...signedWords(statement) })),
    next: rows.length > PAGE ? `${page.at(-1)!.deletedAt.toISOString()}_${page.at(-1)!.id}` : null,
  }
}

/** Who deleted it, as printed when it was signed, and why. */
function signedWords(statement: string): { by: string, reason: string } {
  const { name, reason } = JSON.parse(statement) as DeletionStatement
  return { by: name, reason }
}

function placeOf(place: string) {
  const parsed = placeSchema.safeParse(place.split('_'))
  if (!parsed.success) return unprocessable('after', 'Give the "next" of an earlier page')
  return sql`(${parsed.data[0]}::timestamptz, ${parsed.data[1]}::uuid)`
}
