import { requireRole } from '~~/server/utils/access'
import { useDatabase } from '~~/server/utils/database'
import { retentionSettings } from '~~/server/utils/retention/settings'

/** How long records are kept: the organisation's years, and each site's own; for administrators. */
export default defineEventHandler(async (event) => {
  requireRole(event, 'administrator')
  return retentionSettings(useDatabase())
})
