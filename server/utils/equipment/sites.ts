import { eq } from 'drizzle-orm'
import { siteSchema } from '../../../shared/schemas/equipment'
import type { SiteItem, SiteValue } from '../../../shared/schemas/site-view'
import { sites } from '../../database/schema'
import { useDatabase } from '../database'
import { conflict } from '../errors'
import { checkSite } from './checks'
import { refuseFault } from './fault'
import { withSite } from './store'
import { isTaken } from './taken'

const codeTaken = (): never => conflict('Another site has this code', 'code')

/** Makes a site. 409: its code is in use. */
export async function createSite(value: SiteValue): Promise<SiteItem> {
  refuseFault(checkSite(value, [])[0])
  const [row] = await useDatabase().insert(sites).values(value).onConflictDoNothing({ target: sites.code }).returning({ id: sites.id })
  return row ? { ...value, id: row.id } : codeTaken()
}

/** Changes fields of a site. 422: its cases cannot be judged by the new rulebook; 409: its code is in use. */
export async function updateSite(id: string, change: Partial<SiteValue>): Promise<SiteItem> {
  try {
    return await withSite(id, async (tx, site) => {
      const given = Object.fromEntries(Object.entries(change).filter(([, value]) => value !== undefined))
      const value = siteSchema.parse({ ...site, ...given })
      refuseFault(checkSite(value, site.cases, site)[0])
      await tx.update(sites).set(value).where(eq(sites.id, id))
      return { ...value, id }
    })
  } catch (error) {
    return isTaken(error) ? codeTaken() : Promise.reject(error)
  }
}
