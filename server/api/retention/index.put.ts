import { retentionSchema } from '~~/shared/schemas/retention'
import { requireRole } from '~~/server/utils/access'
import { readBodyAs } from '~~/server/utils/parse'
import { setOrganisationYears } from '~~/server/utils/retention/settings'

/** Sets how long the organisation keeps records. */
export default defineEventHandler(async (event) => {
  const person = requireRole(event, 'administrator')
  const { years } = await readBodyAs(event, retentionSchema)
  return setOrganisationYears(person, years)
})
