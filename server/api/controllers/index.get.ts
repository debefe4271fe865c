import { asc, eq, inArray } from 'drizzle-orm'
import { controllers, sites } from '~~/server/database/schema'
import { requirePerson, visibleSites } from '~~/server/utils/access'
import { useDatabase } from '~~/server/utils/database'

/** Every controller at the person's sites: what an outage can be of. */
export default defineEventHandler(async (event) => {
  const person = requirePerson(event)
  const visible = await visibleSites(person)
  if (visible?.length === 0) return []
  return useDatabase().select({
    id: controllers.id, name: controllers.name, place: controllers.place,
    site: { id: sites.id, code: sites.code, name: sites.name, timeZone: sites.timeZone },
  }).from(controllers).innerJoin(sites, eq(sites.id, controllers.siteId))
    .where(visible ? inArray(sites.id, visible) : undefined)
    .orderBy(asc(sites.name), asc(controllers.name), asc(controllers.id))
})
