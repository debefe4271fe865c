import { useDatabase } from '~~/server/utils/database'
import { listChanges } from '~~/server/utils/changes/list'
import { siteOf } from '~~/server/utils/equipment/guards'

/** As many changes of limits as one page tells. */
const MOST = 100

/** How the site judges more strictly than its rulebook, and who changed that when, the latest first. */
export default defineEventHandler(async (event) => {
  const { id, holding, instrumentCheckDays } = await siteOf(event)
  return { holding, instrumentCheckDays, changes: await listChanges(useDatabase(), { siteId: id, subject: 'limits' }, MOST) }
})
