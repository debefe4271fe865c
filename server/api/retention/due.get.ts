import { z } from 'zod'
import { requireRole } from '~~/server/utils/access'
import { readQueryAs } from '~~/server/utils/parse'
import { listDue } from '~~/server/utils/retention/lists'

const query = z.object({ after: z.string().max(200).optional() })

/** Records whose retention is over, by keyset pages; for administrators. Nothing happens to them by itself. */
export default defineEventHandler(async (event) => {
  requireRole(event, 'administrator')
  return listDue(Date.now(), readQueryAs(event, query).after)
})
