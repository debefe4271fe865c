import { useDatabase } from '~~/server/utils/database'
import { requireOutage } from '~~/server/utils/outages'
import { readState } from '~~/server/utils/record/log'

/** The folded state of an outage. */
export default defineEventHandler(async (event) => {
  const { outage } = await requireOutage(event)
  return readState(useDatabase(), outage)
})
