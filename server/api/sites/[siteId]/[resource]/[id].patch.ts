import { requirePerson } from '~~/server/utils/access'
import { editableItem } from '~~/server/utils/equipment/guards'
import { schemaOf, updateItem } from '~~/server/utils/equipment/store'
import { readBodyAs } from '~~/server/utils/parse'

/** Changes fields of a thing of a site's equipment. */
export default defineEventHandler(async (event) => {
  const { siteId, resource, id } = await editableItem(event)
  return updateItem(siteId, requirePerson(event), resource, id, await readBodyAs(event, schemaOf(resource).change))
})
