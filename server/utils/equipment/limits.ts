import { eq } from 'drizzle-orm'
import type { SiteLimits } from '../../../shared/schemas/equipment'
import { sites } from '../../database/schema'
import type { Changer } from '../changes/keep'
import { keepChange } from '../changes/keep'
import { differences } from '../changes/differences'
import { unprocessable } from '../errors'
import { rulebookById, settingFaults } from '../holding'
import { withSite } from './store'

/**
 * Sets how a site judges more strictly than its rulebook; who and when is kept with it. Outages that are
 * open keep what they were planned with. 422: a setting is laxer than the rulebook, or no class of it.
 */
export async function setLimits(siteId: string, by: Changer, value: SiteLimits): Promise<SiteLimits> {
  return withSite(siteId, async (tx, site) => {
    const rulebook = rulebookById(site.rulebook)
    if (!rulebook) return unprocessable('holding', `This program does not hold the site's rulebook ${site.rulebook}`)
    const [fault] = settingFaults(rulebook, value.holding)
    if (fault) return unprocessable(`holding.${fault.field}`, fault.reason)
    const order = (foodClass: string) => rulebook.classes.findIndex(({ id }) => id === foodClass)
    const classes = [...value.holding.classes].sort((a, b) => order(a.foodClass) - order(b.foodClass))
    const settled = { ...value, holding: { ...value.holding, classes } }
    await tx.update(sites).set(settled).where(eq(sites.id, siteId))
    await keepChange(tx, by, { subject: 'limits', subjectId: siteId, subjectName: site.name, siteId, deed: 'changed', fields: differences(flat(site), flat(settled)) })
    return settled
  })
}

/** One field a setting, so that a history says of each who set it and when. */
function flat({ holding, instrumentCheckDays }: SiteLimits): Record<string, unknown> {
  return {
    instrumentCheckDays,
    addAccuracy: holding.addAccuracy,
    allowsMinus12: holding.allowsMinus12,
    ...Object.fromEntries(holding.classes.map(({ foodClass, limit, minutes }) => [`class:${foodClass}`, { limit, minutes }])),
  }
}
