import { useDatabase } from '~~/server/utils/database'
import { siteOf } from '~~/server/utils/equipment/guards'
import { viewSite } from '~~/server/utils/equipment/site-view'

/** A site with all its equipment. */
export default defineEventHandler(async event => viewSite(useDatabase(), await siteOf(event)))
