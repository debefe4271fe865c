import { useDatabase } from '~~/server/utils/database'
import { lessonsOf } from '~~/server/utils/learn/lessons'
import { requireOutage } from '~~/server/utils/outages'

/** What a sealed outage teaches of its cases and of its work, and what of it was accepted. */
export default defineEventHandler(async (event) => {
  const { outage } = await requireOutage(event)
  return lessonsOf(useDatabase(), outage)
})
