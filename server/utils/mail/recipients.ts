import { and, asc, eq, inArray, isNull } from 'drizzle-orm'
import { people, siteAccess, sites } from '../../database/schema'
import type { Queries } from '../database'

/** Somebody with an account to whom mail goes. */
export interface Recipient { id: string, name: string, email: string }
const asRecipient = { id: people.id, name: people.name, email: people.email }

/** Supervisors who see a site and may sign in, by id. */
export async function supervisorsOf(db: Queries, siteId: string): Promise<Recipient[]> {
  return db.select(asRecipient).from(people).innerJoin(siteAccess, eq(siteAccess.personId, people.id))
    .where(and(eq(siteAccess.siteId, siteId), eq(people.role, 'supervisor'), isNull(people.disabledAt))).orderBy(asc(people.id))
}

/** People by their ids, without those who are switched off. */
export async function peopleBy(db: Queries, ids: readonly string[]): Promise<Recipient[]> {
  if (ids.length === 0) return []
  return db.select(asRecipient).from(people).where(and(inArray(people.id, [...new Set(ids)]), isNull(people.disabledAt))).orderBy(asc(people.id))
}

/** Whom to tell at a site without an account; an empty address: nobody. */
export interface SiteContacts { contactName: string, contactEmail: string, monitoringEmail: string }

export async function contactsOf(db: Queries, siteId: string): Promise<SiteContacts> {
  const [site] = await db.select({ contactName: sites.contactName, contactEmail: sites.contactEmail, monitoringEmail: sites.monitoringEmail }).from(sites).where(eq(sites.id, siteId))
  return site ?? { contactName: '', contactEmail: '', monitoringEmail: '' }
}
