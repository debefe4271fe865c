import { and, eq, inArray, isNull } from 'drizzle-orm'
import type { RecordFilter, RecordItem, RecordPage, RecordQuery } from '../../../shared/schemas/record-filter'
import { MOST_COUNTED } from '../../../shared/schemas/record-filter'
import { controllers, legalHolds, NO_HOLD, sites as sitesTable } from '../../database/schema'
import type { Person } from '../access'
import { visibleSites } from '../access'
import type { Queries } from '../database'
import { useDatabase } from '../database'
import { sitesSought } from './filter'
import type { Scope } from './queries'
import { countQuery, pageQuery, pageEnd } from './queries'

type Row = Awaited<ReturnType<typeof pageQuery>>[number]

/** A page of the records that a person looks for, among those of their sites. */
export async function listRecords(person: Person, query: RecordQuery, db: Queries = useDatabase()): Promise<RecordPage> {
  const scope = await scopeOf(person, query, db)
  const isFirst = query.after === undefined
  if (scope?.sites.length === 0) return { items: [], next: null, count: isFirst ? { found: 0, more: false } : null }
  const [rows, counted] = await Promise.all([pageQuery(db, scope, query), isFirst ? countQuery(db, scope, query) : null])
  const page = rows.slice(0, query.limit)
  const found = counted?.[0]!.found
  return {
    items: await withNames(db, page),
    next: rows.length > query.limit ? pageEnd(query.sort, page.at(-1)!) : null,
    count: found === undefined ? null : { found: Math.min(found, MOST_COUNTED), more: found > MOST_COUNTED },
  }
}

/** The sites that a search looks at; a controller names its own. */
export async function scopeOf(person: Person, filter: RecordFilter, db: Queries): Promise<Scope> {
  const sites = sitesSought(await visibleSites(person, db), filter)
  if (filter.controller !== undefined) {
    const [controller] = await db.select({ siteId: controllers.siteId }).from(controllers).where(eq(controllers.id, filter.controller))
    const theirs = controller !== undefined && (sites === null || sites.includes(controller.siteId))
    return { sites: theirs ? [controller.siteId] : [], ofAll: 1 }
  }
  return sites === null ? null : { sites, ofAll: sites.length < 2 ? 1 : await db.$count(sitesTable) }
}

/** Names are the present ones, though a site or a controller may have been renamed since. */
async function withNames(db: Queries, rows: Row[]): Promise<RecordItem[]> {
  if (rows.length === 0) return []
  const [sites, ofControllers, holds] = await Promise.all([
    db.select({ id: sitesTable.id, code: sitesTable.code, name: sitesTable.name, timeZone: sitesTable.timeZone }).from(sitesTable).where(inArray(sitesTable.id, [...new Set(rows.map(row => row.siteId))])),
    db.select({ id: controllers.id, name: controllers.name }).from(controllers).where(inArray(controllers.id, [...new Set(rows.map(row => row.controllerId))])),
    db.select({ outageId: legalHolds.outageId }).from(legalHolds).where(and(inArray(legalHolds.outageId, rows.map(row => row.outageId)), isNull(legalHolds.liftedAt))),
  ])
  const held = new Set(holds.map(hold => hold.outageId))
  const siteOf = new Map(sites.map(site => [site.id, site]))
  const controllerOf = new Map(ofControllers.map(controller => [controller.id, controller]))
  return rows.map(({ outageId, siteId, controllerId, holdSeconds, openedAt, endedAt, darkSince, ...row }) => ({
    id: outageId, ...row, site: siteOf.get(siteId)!, controller: controllerOf.get(controllerId)!,
    held: held.has(outageId), openedAt: openedAt.toISOString(), endedAt: endedAt?.toISOString() ?? null, darkSince: darkSince?.toISOString() ?? null, holdSeconds: holdSeconds === NO_HOLD ? null : holdSeconds,
  }))
}
