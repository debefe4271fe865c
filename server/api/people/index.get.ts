import { requireRole } from '~~/server/utils/access'
import { listPeople } from '~~/server/utils/people/manage'

/** Everybody who has an account, for administrators. */
export default defineEventHandler(async (event) => {
  requireRole(event, 'administrator')
  return { items: await listPeople() }
})
