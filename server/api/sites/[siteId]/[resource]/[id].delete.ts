import { requirePerson } from '~~/server/utils/access'
import { editableItem } from '~~/server/utils/equipment/guards'
import { deleteItem } from '~~/server/utils/equipment/store'

/** Deletes a thing of a site's equipment, unless something uses it. */
export default defineEventHandler(async (event) => {
  const { siteId, resource, id } = await editableItem(event)
  await deleteItem(siteId, requirePerson(event), resource, id)
  setResponseStatus(event, 204)
  return null
})
