import { asc, eq, isNull, sql } from 'drizzle-orm'
import { retentionYears } from '../../../shared/record/retention'
import type { RetentionSettings, SiteRetention } from '../../../shared/schemas/retention'
import { RETENTION_YEARS } from '../../../shared/schemas/retention'
import { retention, sites } from '../../database/schema'
import type { Changer } from '../changes/keep'
import { keepChange } from '../changes/keep'
import type { Queries } from '../database'
import { useDatabase } from '../database'
import { unprocessable } from '../errors'

/** The organisation has no id of its own; in the history it stands under this one. */
const ORGANISATION = '00000000-0000-0000-0000-000000000000'

/** Years for which the organisation keeps records. */
export async function organisationYears(db: Queries): Promise<number> {
  const [row] = await db.select({ years: retention.years }).from(retention).where(isNull(retention.siteId))
  return row?.years ?? RETENTION_YEARS
}

/** Years for which a site's records are kept. */
export async function siteYears(db: Queries, siteId: string): Promise<number> {
  const [row] = await db.select({ years: retention.years }).from(retention).where(eq(retention.siteId, siteId))
  return retentionYears(await organisationYears(db), row?.years ?? null)
}

/** What is set for the organisation, and for each site by name. */
export async function retentionSettings(db: Queries): Promise<RetentionSettings> {
  const rows: SiteRetention[] = await db.select({ id: sites.id, code: sites.code, name: sites.name, years: retention.years })
    .from(sites).leftJoin(retention, eq(retention.siteId, sites.id)).orderBy(asc(sites.name), asc(sites.id))
  return { years: await organisationYears(db), sites: rows }
}

/** Sets how long the organisation keeps records, and who did. Sites with longer years of their own keep them. */
export async function setOrganisationYears(by: Changer, years: number): Promise<RetentionSettings> {
  return useDatabase().transaction(async (tx) => {
    await lockSettings(tx)
    const before = await organisationYears(tx)
    await setYears(tx, null, years)
    if (before !== years) await keepChange(tx, by, { subject: 'retention', subjectId: ORGANISATION, subjectName: 'All sites', siteId: null, deed: 'changed', fields: [{ field: 'years', before, after: years }] })
    return retentionSettings(tx)
  })
}

/** Sets how long one site keeps its records. 422: not longer than the organisation. @param years null: as the organisation */
export async function setSiteYears(by: Changer, site: { id: string, name: string }, years: number | null): Promise<RetentionSettings> {
  return useDatabase().transaction(async (tx) => {
    await lockSettings(tx)
    const organisation = await organisationYears(tx)
    if (years !== null && years <= organisation) return unprocessable('years', `A site can only keep longer than all: more than ${organisation} years`)
    const [known] = await tx.select({ years: retention.years }).from(retention).where(eq(retention.siteId, site.id))
    const before = known?.years ?? null
    if (years === null) await tx.delete(retention).where(eq(retention.siteId, site.id))
    else await setYears(tx, site.id, years)
    if (before !== years) await keepChange(tx, by, { subject: 'retention', subjectId: site.id, subjectName: site.name, siteId: site.id, deed: 'changed', fields: [{ field: 'years', before, after: years }] })
    return retentionSettings(tx)
  })
}

async function setYears(tx: Queries, siteId: string | null, years: number): Promise<void> {
  const own = siteId === null ? isNull(retention.siteId) : eq(retention.siteId, siteId)
  const changed = await tx.update(retention).set({ years }).where(own).returning({ id: retention.id })
  if (changed.length === 0) await tx.insert(retention).values({ siteId, years })
}

/** One change of retention at a time, so that the history's "before" is what was there. */
async function lockSettings(tx: Queries): Promise<void> {
  await tx.execute(sql`select pg_advisory_xact_lock(hashtextextended('retention', 0))`)
}
