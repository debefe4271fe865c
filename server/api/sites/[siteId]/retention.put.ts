import { siteRetentionSchema } from '~~/shared/schemas/retention'
import { requirePerson } from '~~/server/utils/access'
import { editableSite } from '~~/server/utils/equipment/guards'
import { readBodyAs } from '~~/server/utils/parse'
import { setSiteYears } from '~~/server/utils/retention/settings'

/** Sets how long a site keeps its records where that is longer than the organisation does. */
export default defineEventHandler(async (event) => {
  const site = await editableSite(event)
  const { years } = await readBodyAs(event, siteRetentionSchema)
  return setSiteYears(requirePerson(event), site, years)
})
