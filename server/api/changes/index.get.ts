import { changeListSchema } from '~~/shared/schemas/changes'
import { requireRole } from '~~/server/utils/access'
import { pageOfChanges } from '~~/server/utils/changes/list'
import { useDatabase } from '~~/server/utils/database'
import { readQueryAs } from '~~/server/utils/parse'

/** Who changed what about people or kinds of work, the latest first, a page at a time; for administrators. */
export default defineEventHandler(async (event) => {
  requireRole(event, 'administrator')
  return pageOfChanges(useDatabase(), readQueryAs(event, changeListSchema))
})
