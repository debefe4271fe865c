import { changePageSchema } from '~~/shared/schemas/changes'
import { pageOfChanges } from '~~/server/utils/changes/list'
import { useDatabase } from '~~/server/utils/database'
import { siteOf } from '~~/server/utils/equipment/guards'
import { readQueryAs } from '~~/server/utils/parse'

/** Who changed what at the site and its equipment, the latest first, a page at a time. */
export default defineEventHandler(async (event) => {
  const { id } = await siteOf(event)
  const { before } = readQueryAs(event, changePageSchema)
  return pageOfChanges(useDatabase(), { siteId: id, before })
})
