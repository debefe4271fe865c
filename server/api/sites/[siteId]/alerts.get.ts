import type { SiteAlerts } from '~~/shared/schemas/alerts'
import { siteAlerts } from '~~/server/utils/alerts/site-rules'
import { useDatabase } from '~~/server/utils/database'
import { siteOf } from '~~/server/utils/equipment/guards'

/** Who is told of the site's alerts, who may be, and who changed that when, the latest first. */
export default defineEventHandler(async (event): Promise<SiteAlerts> => siteAlerts(useDatabase(), (await siteOf(event)).id))
