import { acknowledgeSchema } from '~~/shared/schemas/alerts'
import { requireRole } from '~~/server/utils/access'
import { acknowledgeAlert } from '~~/server/utils/alerts/acknowledge'
import { useDatabase } from '~~/server/utils/database'
import { requireOutage } from '~~/server/utils/outages'
import { readBodyAs } from '~~/server/utils/parse'

/** Says that one has seen an alert: it goes on to nobody else. */
export default defineEventHandler(async (event) => {
  const { outage } = await requireOutage(event)
  const person = requireRole(event, 'technician', 'supervisor', 'administrator')
  const { key } = await readBodyAs(event, acknowledgeSchema)
  return acknowledgeAlert(useDatabase(), person, outage.id, key, Date.now())
})
