import { requirePerson } from '~~/server/utils/access'
import { useDatabase } from '~~/server/utils/database'
import { pullWatch } from '~~/server/utils/watch/pull'

/** All that the person's watch shows. */
export default defineEventHandler(async (event) => {
  const person = requirePerson(event)
  return pullWatch(useDatabase(), person, { known: {} }, Date.now())
})
