import { requireRole } from '~~/server/utils/access'
import { useDatabase } from '~~/server/utils/database'
import { EXPORT_ROLES } from '~~/server/utils/exports/access'
import { listExports } from '~~/server/utils/exports/ask'

/** One's own exports, the latest first, with how far they are. */
export default defineEventHandler(async (event) => {
  const person = requireRole(event, ...EXPORT_ROLES)
  return { items: await listExports(useDatabase(), person) }
})
