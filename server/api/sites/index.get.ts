import { requirePerson } from '~~/server/utils/access'
import { useDatabase } from '~~/server/utils/database'
import { listSites } from '~~/server/utils/equipment/site-view'

/** The sites that the person may see. */
export default defineEventHandler(async (event) => {
  const person = requirePerson(event)
  return listSites(useDatabase(), person)
})
