import { useDatabase } from '~~/server/utils/database'
import { requireOutage } from '~~/server/utils/outages'
import { recordRetention } from '~~/server/utils/retention/holds'

/** How a record stands to its retention, with its legal holds. */
export default defineEventHandler(async (event) => {
  const { outage } = await requireOutage(event)
  return recordRetention(useDatabase(), outage)
})
