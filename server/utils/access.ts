import { and, eq } from 'drizzle-orm'
import type { H3Event } from 'h3'
import type { Role } from '../../shared/schemas/people'
import { siteAccess, sites } from '../database/schema'
import type { Queries } from './database'
import { useDatabase } from './database'
import { forbidden, notFound, unauthenticated } from './errors'

/** The person of this request, read from the database a moment ago. */
export interface Person { id: string, name: string, email: string, role: Role, mustChangePassword: boolean }

declare module 'h3' {
  interface H3EventContext {
    person?: Person | null
    /** of the session that the request came with */
    sessionVersion?: unknown
  }
}

/** Who is signed in. 401 when nobody is. */
export function requirePerson(event: H3Event): Person {
  return event.context.person ?? unauthenticated()
}

/** Who is signed in, if they hold one of these roles; else 403. */
export function requireRole(event: H3Event, ...roles: Role[]): Person {
  const person = requirePerson(event)
  return roles.includes(person.role) ? person : forbidden(`This is for a ${roles.join(' or a ')}`)
}

/** Sites that a person may see; null: all. */
export async function visibleSites(person: Person, db: Queries = useDatabase()): Promise<string[] | null> {
  if (person.role === 'administrator') return null
  const rows = await db.select({ siteId: siteAccess.siteId }).from(siteAccess).where(eq(siteAccess.personId, person.id))
  return rows.map(row => row.siteId)
}

/** Whether a person may see a site. */
export async function maySeeSite(person: Person, siteId: string, db: Queries = useDatabase()): Promise<boolean> {
  if (person.role === 'administrator') return true
  const [row] = await db.select({ siteId: siteAccess.siteId }).from(siteAccess).where(and(eq(siteAccess.personId, person.id), eq(siteAccess.siteId, siteId)))
  return row !== undefined
}

/** A site that the person may see; else 404. */
export async function requireSite(person: Person, siteId: string, db: Queries = useDatabase()): Promise<typeof sites.$inferSelect> {
  const [site] = await db.select().from(sites).where(eq(sites.id, siteId))
  return site && await maySeeSite(person, siteId, db) ? site : notFound('site')
}
