import { siteSchema } from '~~/shared/schemas/equipment'
import { requirePerson } from '~~/server/utils/access'
import { requireEditor } from '~~/server/utils/equipment/guards'
import { createSite } from '~~/server/utils/equipment/sites'
import { readBodyAs } from '~~/server/utils/parse'

/** Makes a site, still without equipment. */
export default defineEventHandler(async (event) => {
  const person = requirePerson(event)
  requireEditor(person)
  const site = await createSite(person, await readBodyAs(event, siteSchema))
  setResponseStatus(event, 201)
  return site
})
