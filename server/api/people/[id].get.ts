import { z } from 'zod'
import { requireRole } from '~~/server/utils/access'
import { useDatabase } from '~~/server/utils/database'
import { readParamsAs } from '~~/server/utils/parse'
import { personById } from '~~/server/utils/people/list'

const params = z.object({ id: z.string().uuid() })

/** One account; for administrators. */
export default defineEventHandler(async (event) => {
  requireRole(event, 'administrator')
  return personById(useDatabase(), readParamsAs(event, params, 'person').id)
})
