import { personFilterSchema } from '~~/shared/schemas/people'
import { requireRole } from '~~/server/utils/access'
import { useDatabase } from '~~/server/utils/database'
import { readQueryAs } from '~~/server/utils/parse'
import { listPeople } from '~~/server/utils/people/list'

/** Accounts by name, by keyset pages; for administrators. */
export default defineEventHandler(async (event) => {
  requireRole(event, 'administrator')
  return listPeople(useDatabase(), readQueryAs(event, personFilterSchema))
})
