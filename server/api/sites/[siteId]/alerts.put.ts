import { alertRulesSchema } from '~~/shared/schemas/alert-rules'
import { requirePerson } from '~~/server/utils/access'
import { setAlertRules } from '~~/server/utils/alerts/site-rules'
import { editableSite } from '~~/server/utils/equipment/guards'
import { readBodyAs } from '~~/server/utils/parse'

/** Sets who is told of the site's alerts; it counts from the next look on. */
export default defineEventHandler(async (event) => {
  const { id } = await editableSite(event)
  return setAlertRules(id, requirePerson(event), await readBodyAs(event, alertRulesSchema))
})
