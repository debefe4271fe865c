import { timesAcceptedSchema } from '~~/shared/schemas/insights'
import { requireRole } from '~~/server/utils/access'
import { useDatabase } from '~~/server/utils/database'
import { acceptTimes } from '~~/server/utils/insights/offers'
import { readBodyAs } from '~~/server/utils/parse'

/** Takes offered corrections over into a kind of work, with their line in the history. */
export default defineEventHandler(async (event) => {
  const person = requireRole(event, 'supervisor', 'administrator')
  await acceptTimes(useDatabase(), person, await readBodyAs(event, timesAcceptedSchema), Date.now())
  return { done: true }
})
