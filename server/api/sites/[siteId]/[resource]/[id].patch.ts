import { editableItem } from '~~/server/utils/equipment/guards'
import { schemaOf, updateItem } from '~~/server/utils/equipment/store'
import { readBodyAs } from '~~/server/utils/parse'

/** Changes fields of a thing of a site's equipment. */
export default defineEventHandler(async (event) => {
  const { siteId, resource, id } = await editableItem(event)
  return updateItem(siteId, resource, id, await readBodyAs(event, schemaOf(resource).change))
})
