import { requirePerson } from '~~/server/utils/access'
import { listWorkKinds } from '~~/server/utils/equipment/work-kinds'

/** All kinds of work with their steps; they belong to no site. */
export default defineEventHandler(async (event) => {
  requirePerson(event)
  return listWorkKinds()
})
