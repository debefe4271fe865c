import { eq } from 'drizzle-orm'
import { siteSchema } from '../../../shared/schemas/equipment'
import type { SiteItem, SiteValue } from '../../../shared/schemas/site-view'
import { sites } from '../../database/schema'
import { differences } from '../changes/differences'
import type { Changer } from '../changes/keep'
import { keepChange } from '../changes/keep'
import type { Queries } from '../database'
import { useDatabase } from '../database'
import { conflict } from '../errors'
import { checkSite } from './checks'
import { refuseFault } from './fault'
import { withSite } from './store'
import { isTaken } from './taken'

const codeTaken = (): never => conflict('Another site has this code', 'code')

/** Makes a site. 409: its code is in use. */
export async function createSite(by: Changer, value: SiteValue): Promise<SiteItem> {
  refuseFault(checkSite(value, [])[0])
  return useDatabase().transaction(async (tx) => {
    const [row] = await tx.insert(sites).values(value).onConflictDoNothing({ target: sites.code }).returning({ id: sites.id })
    if (!row) return codeTaken()
    await keepSite(tx, by, row.id, {}, value)
    return { ...value, id: row.id }
  })
}

/** Changes fields of a site. 422: its cases cannot be judged by the new rulebook; 409: its code is in use. */
export async function updateSite(id: string, by: Changer, change: Partial<SiteValue>): Promise<SiteItem> {
  try {
    return await withSite(id, async (tx, site) => {
      const given = Object.fromEntries(Object.entries(change).filter(([, value]) => value !== undefined))
      const value = siteSchema.parse({ ...site, ...given })
      refuseFault(checkSite(value, site.cases, site)[0])
      await tx.update(sites).set(value).where(eq(sites.id, id))
      await keepSite(tx, by, id, siteSchema.parse(site), value)
      return { ...value, id }
    })
  } catch (error) {
    return isTaken(error) ? codeTaken() : Promise.reject(error)
  }
}

async function keepSite(tx: Queries, by: Changer, id: string, before: object, after: SiteValue): Promise<void> {
  const deed = Object.keys(before).length === 0 ? 'added' : 'changed'
  await keepChange(tx, by, { subject: 'site', subjectId: id, subjectName: after.name, siteId: id, deed, fields: differences({ ...before }, { ...after }) })
}
