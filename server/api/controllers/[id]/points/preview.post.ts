import { editableController } from '~~/server/utils/equipment/guards'
import { previewPoints, readListText } from '~~/server/utils/equipment/import-points'

/** What a point list would do to a controller; nothing lands. */
export default defineEventHandler(async (event) => {
  const { siteId, controllerId } = await editableController(event)
  return previewPoints(siteId, controllerId, await readListText(event))
})
