import { siteLimitsSchema } from '~~/shared/schemas/equipment'
import { requirePerson } from '~~/server/utils/access'
import { editableSite } from '~~/server/utils/equipment/guards'
import { setLimits } from '~~/server/utils/equipment/limits'
import { readBodyAs } from '~~/server/utils/parse'

/** Sets how the site judges more strictly than its rulebook. */
export default defineEventHandler(async (event) => {
  const { id } = await editableSite(event)
  return setLimits(id, requirePerson(event), await readBodyAs(event, siteLimitsSchema))
})
