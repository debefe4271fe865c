import { insightQuerySchema } from '~~/shared/schemas/insights'
import { requireRole } from '~~/server/utils/access'
import { useDatabase } from '~~/server/utils/database'
import { readInsights } from '~~/server/utils/insights/counted'
import { readQueryAs } from '~~/server/utils/parse'

/** What the finished outages of a choice say together, and the corrections that they offer. */
export default defineEventHandler(async (event) => {
  const person = requireRole(event, 'supervisor', 'auditor', 'administrator')
  return readInsights(useDatabase(), person, readQueryAs(event, insightQuerySchema))
})
