import { and, asc, desc, eq, inArray } from 'drizzle-orm'
import { settingMarks } from '../../../shared/schemas/changes'
import type { SettingMark } from '../../../shared/schemas/changes'
import type { BookSite } from '../../../shared/schemas/site-view'
import { changes, sites } from '../../database/schema'
import type { Person } from '../access'
import { visibleSites } from '../access'
import type { Queries } from '../database'

/** The sites that are judged by a rulebook and that the person may see, by name. */
export async function bookSites(db: Queries, person: Person, rulebook: string): Promise<BookSite[]> {
  const visible = await visibleSites(person, db)
  const rows = await db.select().from(sites)
    .where(and(eq(sites.rulebook, rulebook), visible === null ? undefined : inArray(sites.id, visible)))
    .orderBy(asc(sites.name), asc(sites.id))
  const marks = await marksOf(db, rows.map(({ id }) => id))
  return rows.map(({ id, code, name, timeZone, holding, instrumentCheckDays }) => ({ id, code, name, timeZone, holding, instrumentCheckDays, set: marks.get(id) ?? {} }))
}

/** Who set each setting that stands at a site, and when. */
async function marksOf(db: Queries, siteIds: string[]): Promise<Map<string, Record<string, SettingMark>>> {
  const rows = await db.select().from(changes).where(and(inArray(changes.siteId, siteIds), eq(changes.subject, 'limits'))).orderBy(desc(changes.id))
  return new Map(siteIds.map(id => [id, settingMarks(rows.filter(row => row.siteId === id).map(({ at, personName, fields }) => ({ at: at.toISOString(), by: personName, fields })))]))
}
