import { watchPullSchema } from '~~/shared/schemas/watch'
import { requirePerson } from '~~/server/utils/access'
import { useDatabase } from '~~/server/utils/database'
import { readBodyAs } from '~~/server/utils/parse'
import { pullWatch } from '~~/server/utils/watch/pull'

/** What the watch shows: a question with a body, for a list of what is known is longer than an address may be. */
export default defineEventHandler(async (event) => {
  const person = requirePerson(event)
  return pullWatch(useDatabase(), person, await readBodyAs(event, watchPullSchema), Date.now())
})
