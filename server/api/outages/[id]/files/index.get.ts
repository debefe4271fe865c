import { useDatabase } from '~~/server/utils/database'
import { heldFiles } from '~~/server/utils/files/keep'
import { requireOutage } from '~~/server/utils/outages'

/** Which photos and drawings of an outage are held, by their SHA-256; others that its entries name are awaited. */
export default defineEventHandler(async (event) => {
  const { outage } = await requireOutage(event)
  return { held: [...await heldFiles(useDatabase(), outage.id)].sort() }
})
