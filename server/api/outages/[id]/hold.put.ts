import { holdSchema } from '~~/shared/schemas/retention'
import { requireRole } from '~~/server/utils/access'
import { useDatabase } from '~~/server/utils/database'
import { requireOutage } from '~~/server/utils/outages'
import { readBodyAs } from '~~/server/utils/parse'
import { setHold } from '~~/server/utils/retention/holds'

/** Puts a record under legal hold, or lifts the hold, with the reason. */
export default defineEventHandler(async (event) => {
  const { outage } = await requireOutage(event)
  const person = requireRole(event, 'supervisor', 'administrator')
  return setHold(useDatabase(), person, outage, await readBodyAs(event, holdSchema), Date.now())
})
