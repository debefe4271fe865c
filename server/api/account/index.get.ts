import { asc, inArray } from 'drizzle-orm'
import type { Account } from '~~/shared/schemas/people'
import { sites } from '~~/server/database/schema'
import { requirePerson, visibleSites } from '~~/server/utils/access'
import { useDatabase } from '~~/server/utils/database'

/** Who is signed in, and the sites that are theirs. */
export default defineEventHandler(async (event): Promise<Account> => {
  const { id, name, email, role, mustChangePassword } = requirePerson(event)
  const visible = await visibleSites({ id, name, email, role, mustChangePassword })
  const rows = visible?.length === 0
    ? []
    : await useDatabase().select({ id: sites.id, code: sites.code, name: sites.name }).from(sites).where(visible ? inArray(sites.id, visible) : undefined).orderBy(asc(sites.name), asc(sites.id))
  return { id, name, email, role, mustChangePassword, sites: rows }
})
