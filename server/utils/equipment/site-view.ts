import { asc, count, eq, inArray } from 'drizzle-orm'
import type { SiteLine, SiteView } from '../../../shared/schemas/site-view'
import { cases, circuits, controllers, instruments, points, racks, sites, suctionGroups } from '../../database/schema'
import type { Person } from '../access'
import { visibleSites } from '../access'
import type { Queries } from '../database'

type Bare<T> = Omit<T, 'createdAt' | 'updatedAt' | 'outageCount' | 'siteId'>

/** A row without what is the database's own affair. */
function bare<T extends { createdAt: Date, updatedAt: Date }>(row: T): Bare<T> {
  const { createdAt: _created, updatedAt: _updated, outageCount: _count, siteId: _site, ...rest } = row as T & { outageCount?: number, siteId?: string }
  return rest as Bare<T>
}

/** A site with all its equipment, sorted as people look for it; the row itself has been found before. */
export async function viewSite(db: Queries, site: typeof sites.$inferSelect): Promise<SiteView> {
  const controllerRows = await db.select().from(controllers).where(eq(controllers.siteId, site.id)).orderBy(asc(controllers.name), asc(controllers.id))
  const controllerIds = controllerRows.map(row => row.id)
  const rackRows = await db.select().from(racks).where(inArray(racks.controllerId, controllerIds)).orderBy(asc(racks.name), asc(racks.id))
  const rackIds = rackRows.map(row => row.id)
  const groupRows = await db.select().from(suctionGroups).where(inArray(suctionGroups.rackId, rackIds)).orderBy(asc(suctionGroups.name), asc(suctionGroups.id))
  const circuitRows = await db.select().from(circuits).where(inArray(circuits.rackId, rackIds)).orderBy(asc(circuits.name), asc(circuits.id))
  const caseRows = await db.select().from(cases).where(inArray(cases.controllerId, controllerIds)).orderBy(asc(cases.name), asc(cases.id))
  const pointRows = await db.select().from(points).where(inArray(points.controllerId, controllerIds))
  const instrumentRows = await db.select().from(instruments).where(eq(instruments.siteId, site.id)).orderBy(asc(instruments.name), asc(instruments.id))
  return {
    ...bare(site),
    controllers: controllerRows.map(bare),
    racks: rackRows.map(bare),
    suctionGroups: groupRows.map(bare),
    circuits: circuitRows.map(bare),
    cases: caseRows.map(bare),
    points: pointRows.map(bare).sort((a, b) => TAGS.compare(a.tag, b.tag) || (a.id < b.id ? -1 : 1)),
    instruments: instrumentRows.map(bare),
  }
}

/** C-2 stands before C-10. */
const TAGS = new Intl.Collator('en', { numeric: true })

/** The sites that a person may see, with what stands in them counted. */
export async function listSites(db: Queries, person: Person): Promise<SiteLine[]> {
  const visible = await visibleSites(person, db)
  const rows = await db.select().from(sites).where(visible === null ? undefined : inArray(sites.id, visible)).orderBy(asc(sites.name), asc(sites.id))
  const ids = rows.map(row => row.id)
  const controllerCounts = await db.select({ siteId: controllers.siteId, size: count() }).from(controllers).where(inArray(controllers.siteId, ids)).groupBy(controllers.siteId)
  const caseCounts = await db.select({ siteId: controllers.siteId, size: count() }).from(cases).innerJoin(controllers, eq(controllers.id, cases.controllerId)).where(inArray(controllers.siteId, ids)).groupBy(controllers.siteId)
  const pointCounts = await db.select({ siteId: controllers.siteId, size: count() }).from(points).innerJoin(controllers, eq(controllers.id, points.controllerId)).where(inArray(controllers.siteId, ids)).groupBy(controllers.siteId)
  const of = (counts: { siteId: string, size: number }[], id: string) => counts.find(item => item.siteId === id)?.size ?? 0
  return rows.map(({ id, code, name, address, timeZone, rulebook }) => ({
    id, code, name, address, timeZone, rulebook, controllers: of(controllerCounts, id), cases: of(caseCounts, id), points: of(pointCounts, id),
  }))
}
