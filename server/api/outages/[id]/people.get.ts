import { and, asc, eq, inArray, isNull } from 'drizzle-orm'
import { people, siteAccess } from '~~/server/database/schema'
import { useDatabase } from '~~/server/utils/database'
import { requireOutage } from '~~/server/utils/outages'

/** Technicians and supervisors of the outage's site, by name: to whom work may pass, and who decides by voice. */
export default defineEventHandler(async (event) => {
  const { outage } = await requireOutage(event)
  return useDatabase().select({ id: people.id, name: people.name, role: people.role }).from(people).innerJoin(siteAccess, eq(siteAccess.personId, people.id))
    .where(and(eq(siteAccess.siteId, outage.siteId), isNull(people.disabledAt), inArray(people.role, ['technician', 'supervisor'])))
    .orderBy(asc(people.name), asc(people.id))
})
