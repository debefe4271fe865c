import { and, desc, eq, lt } from 'drizzle-orm'
import type { ChangeItem, ChangePage, ChangeSubject } from '../../../shared/schemas/changes'
import { changes } from '../../database/schema'
import type { Queries } from '../database'

export interface ChangeFilter { siteId?: string, subject?: ChangeSubject, subjectId?: string, before?: string }

/** Changes, the latest first. @param most how many at once; `before` is the id of the last one seen */
export async function listChanges(db: Queries, { siteId, subject, subjectId, before }: ChangeFilter, most: number): Promise<ChangeItem[]> {
  const rows = await db.select().from(changes).where(and(
    siteId === undefined ? undefined : eq(changes.siteId, siteId),
    subject === undefined ? undefined : eq(changes.subject, subject),
    subjectId === undefined ? undefined : eq(changes.subjectId, subjectId),
    before === undefined ? undefined : lt(changes.id, before),
  )).orderBy(desc(changes.id)).limit(most)
  return rows.map(({ id, at, personName, subject, subjectId, subjectName, deed, fields }) => ({ id, at: at.toISOString(), by: personName, subject, subjectId, subjectName, deed, fields }))
}

/** Changes that one page holds. */
const PAGE = 50

/** One page of changes; `next` is what to ask for as `before`, null at the end. */
export async function pageOfChanges(db: Queries, filter: ChangeFilter): Promise<ChangePage> {
  const items = await listChanges(db, filter, PAGE + 1)
  return { items: items.slice(0, PAGE), next: items.length > PAGE ? items[PAGE - 1]!.id : null }
}
