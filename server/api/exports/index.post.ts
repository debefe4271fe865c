import { exportAskedSchema } from '~~/shared/schemas/exports'
import { requireRole } from '~~/server/utils/access'
import { useDatabase } from '~~/server/utils/database'
import { EXPORT_ROLES } from '~~/server/utils/exports/access'
import { askExport } from '~~/server/utils/exports/ask'
import { readBodyAs } from '~~/server/utils/parse'

/** Asks for an export of the records that a search finds; a job makes it. */
export default defineEventHandler(async (event) => {
  const person = requireRole(event, ...EXPORT_ROLES)
  const { kind, filter } = await readBodyAs(event, exportAskedSchema)
  const item = await askExport(useDatabase(), person, kind, filter, Date.now())
  setResponseStatus(event, 201)
  return item
})
