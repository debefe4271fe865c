import { lessonsAcceptedSchema } from '~~/shared/schemas/lessons'
import { requireRole } from '~~/server/utils/access'
import { useDatabase } from '~~/server/utils/database'
import { acceptLessons } from '~~/server/utils/learn/lessons'
import { requireOutage } from '~~/server/utils/outages'
import { readBodyAs } from '~~/server/utils/parse'

/** Accepts lessons of a sealed outage: they become the cases' own time constants and the work's times. */
export default defineEventHandler(async (event) => {
  const { outage } = await requireOutage(event)
  const person = requireRole(event, 'supervisor', 'administrator')
  return acceptLessons(useDatabase(), person, outage, await readBodyAs(event, lessonsAcceptedSchema), Date.now())
})
