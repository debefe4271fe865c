import { requirePerson } from '~~/server/utils/access'
import { editableResource } from '~~/server/utils/equipment/guards'
import { createItem, schemaOf } from '~~/server/utils/equipment/store'
import { readBodyAs } from '~~/server/utils/parse'

/** Adds a controller, rack, suction group, circuit, case, point or instrument to a site. */
export default defineEventHandler(async (event) => {
  const { siteId, resource } = await editableResource(event)
  const item = await createItem(siteId, requirePerson(event), resource, await readBodyAs(event, schemaOf(resource).whole))
  setResponseStatus(event, 201)
  return item
})
