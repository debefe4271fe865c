import { requirePerson } from '~~/server/utils/access'
import { editableController } from '~~/server/utils/equipment/guards'
import { importPoints, readListText } from '~~/server/utils/equipment/import-points'

/** Lands a point list that was accepted: all of it, or nothing. */
export default defineEventHandler(async (event) => {
  const { siteId, controllerId } = await editableController(event)
  return importPoints(siteId, requirePerson(event), controllerId, await readListText(event))
})
