import { eq, inArray } from 'drizzle-orm'
import type { Role } from '../../../shared/schemas/people'
import { outages, people } from '../../database/schema'
import type { Person } from '../access'
import { visibleSites } from '../access'
import type { Queries } from '../database'
import type { ExportRow } from './work'

/** Roles that export a selection. */
export const EXPORT_ROLES = ['supervisor', 'auditor', 'administrator'] as const satisfies readonly Role[]

/**
 * Why an export's owner may not have it, in words; null: they may. It is asked when the export is made and again at
 * each download, since sites may be taken from somebody, and records deleted, in between.
 */
export async function accessFault(db: Queries, { personId, outageIds }: Pick<ExportRow, 'personId' | 'outageIds'>): Promise<string | null> {
  const [row] = await db.select().from(people).where(eq(people.id, personId))
  if (!row || row.disabledAt) return 'The account that asked for it is switched off'
  if (!(EXPORT_ROLES as readonly Role[]).includes(row.role)) return 'Its owner no longer has a role that exports records'
  const sites = await db.select({ siteId: outages.siteId }).from(outages).where(inArray(outages.id, outageIds))
  if (sites.length < outageIds.length) return 'A record of the selection is not there any more; ask for the export again'
  const visible = await visibleSites(row, db)
  return visible === null || sites.every(({ siteId }) => visible.includes(siteId)) ? null : 'It holds records of a site that is no longer yours to see; ask for the export again'
}

/** Outages among these that a person may see, with their sites. */
export async function seenOutages(db: Queries, person: Person, ids: readonly string[]): Promise<{ id: string, code: string, siteId: string }[]> {
  const rows = await db.select({ id: outages.id, code: outages.code, siteId: outages.siteId }).from(outages).where(inArray(outages.id, [...ids]))
  const visible = await visibleSites(person, db)
  return rows.filter(({ siteId }) => visible === null || visible.includes(siteId))
}
