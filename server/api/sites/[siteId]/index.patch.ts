import { siteSchema } from '~~/shared/schemas/equipment'
import { requirePerson } from '~~/server/utils/access'
import { editableSite } from '~~/server/utils/equipment/guards'
import { updateSite } from '~~/server/utils/equipment/sites'
import { readBodyAs } from '~~/server/utils/parse'

/** Changes a site's own fields. */
export default defineEventHandler(async (event) => {
  const { id } = await editableSite(event)
  return updateSite(id, requirePerson(event), await readBodyAs(event, siteSchema.partial()))
})
