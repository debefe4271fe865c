import { createHash } from 'node:crypto'
import { asc, inArray } from 'drizzle-orm'
import type { Snapshot } from '~~/shared/record/snapshot'
import { controllers } from '~~/server/database/schema'
import { requireRole, visibleSites } from '~~/server/utils/access'
import { useDatabase } from '~~/server/utils/database'
import { snapshotOf } from '~~/server/utils/record/snapshot'

/**
 * The equipment of every controller at the person's sites, as an opening entry carries it: what a phone
 * keeps to begin an outage without a network. 304 where the phone has it already, by its tag.
 */
export default defineEventHandler(async (event) => {
  const person = requireRole(event, 'technician', 'supervisor')
  const sites = await visibleSites(person)
  const rows = sites?.length === 0 ? [] : await useDatabase().select({ id: controllers.id }).from(controllers).where(sites ? inArray(controllers.siteId, sites) : undefined).orderBy(asc(controllers.id))
  const items: Snapshot[] = []
  for (const { id } of rows) {
    const snapshot = await snapshotOf(useDatabase(), id)
    if (snapshot) items.push(snapshot)
  }
  const tag = `"${createHash('sha256').update(JSON.stringify(items)).digest('base64url').slice(0, 22)}"`
  setResponseHeader(event, 'etag', tag)
  if (getRequestHeader(event, 'if-none-match') === tag) return sendNoContent(event, 304)
  return { items }
})
