import { and, asc, eq, isNull, ne, or, sql } from 'drizzle-orm'
import type { AlertRules } from '../../../shared/schemas/alert-rules'
import type { Role } from '../../../shared/schemas/people'
import { people, siteAccess, sites } from '../../database/schema'
import type { Queries } from '../database'
import type { AlertSettings, Recipient } from './due'

/** Somebody who may be told of a site's alerts. */
export interface Candidate extends Recipient { role: Role }

/** What a site says of alerts, and everybody who may be told of them there: those who see the site and may sign in, by name. Auditors read, and nothing is asked of them. */
export async function alertingOf(db: Queries, siteId: string): Promise<{ rules: AlertRules, people: Candidate[] }> {
  const [site] = await db.select({ rules: sites.alertRules }).from(sites).where(eq(sites.id, siteId))
  const seesIt = sql`exists (select 1 from ${siteAccess} where ${siteAccess.personId} = ${people.id} and ${siteAccess.siteId} = ${siteId})`
  const rows = await db.select({ id: people.id, name: people.name, email: people.email, role: people.role }).from(people)
    .where(and(isNull(people.disabledAt), ne(people.role, 'auditor'), or(eq(people.role, 'administrator'), seesIt))).orderBy(asc(people.name), asc(people.id))
  return { rules: site!.rules, people: rows }
}

/**
 * A site's rules with their people found. Who is switched off or no longer sees the site is left out.
 * @param answerable ids of those who answer for the outage
 */
export function alertSettings({ levels, passOnAfter }: AlertRules, people: readonly Candidate[], answerable: readonly string[]): AlertSettings {
  return {
    passOnAfter,
    levels: levels.map(level => people
      .filter(({ id, role }) => (level.answerable && answerable.includes(id)) || (level.supervisors && role === 'supervisor') || level.people.includes(id))
      .map(({ id, name, email }) => ({ id, name, email }))),
  }
}
