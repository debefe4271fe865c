import { and, asc, eq, inArray, ne } from 'drizzle-orm'
import type { RecordChoices } from '../../../shared/schemas/record-filter'
import { controllers, people, siteAccess, sites, workKinds } from '../../database/schema'
import type { Person } from '../access'
import { visibleSites } from '../access'
import type { Queries } from '../database'
import { useDatabase } from '../database'

/** What a person may choose from when they look for records: of their own sites, by name. */
export async function recordChoices(person: Person, db: Queries = useDatabase()): Promise<RecordChoices> {
  const visible = await visibleSites(person, db)
  const ofSites = <T extends typeof sites.id | typeof controllers.siteId | typeof siteAccess.siteId>(column: T) => visible === null ? undefined : inArray(column, visible)
  if (visible?.length === 0) return { sites: [], controllers: [], people: [], workKinds: [] }
  const [ofSite, ofController, ofPeople, ofWork] = await Promise.all([
    db.select({ id: sites.id, code: sites.code, name: sites.name }).from(sites).where(ofSites(sites.id)).orderBy(asc(sites.name), asc(sites.id)),
    db.select({ id: controllers.id, name: controllers.name, siteId: controllers.siteId }).from(controllers).where(ofSites(controllers.siteId)).orderBy(asc(controllers.name), asc(controllers.id)),
    // Auditors and administrators sign nothing.
    db.selectDistinct({ id: people.id, name: people.name, role: people.role }).from(people).innerJoin(siteAccess, eq(siteAccess.personId, people.id)).where(and(ofSites(siteAccess.siteId), ne(people.role, 'auditor'))).orderBy(asc(people.name), asc(people.id)),
    db.select({ name: workKinds.name }).from(workKinds).orderBy(asc(workKinds.name)),
  ])
  return { sites: ofSite, controllers: ofController, people: ofPeople, workKinds: ofWork.map(kind => kind.name) }
}
