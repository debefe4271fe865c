import { requirePerson } from '~~/server/utils/access'
import { listAlerts } from '~~/server/utils/alerts/list'
import { useDatabase } from '~~/server/utils/database'

/** Open alerts of the outages that one may see. */
export default defineEventHandler(async event => listAlerts(useDatabase(), requirePerson(event)))
