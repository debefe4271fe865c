import { desc, eq } from 'drizzle-orm'
import type { SQL } from 'drizzle-orm'
import { INSIGHT_OUTAGES_MAX } from '../../../shared/schemas/insights'
import type { CountedOutage, InsightAnswer, InsightQuery } from '../../../shared/schemas/insights'
import { controllers, outageFacts, outageSearch, sites } from '../../database/schema'
import type { Person } from '../access'
import type { Queries } from '../database'
import { recordsWhere } from '../records/filter'
import { FACTS_VERSION } from './facts'
import { COUNTED_PHASES } from './keep'
import { readOffers } from './offers'
import { insightsOf } from './tell'

/** The finished outages of a choice that the person may see, the newest first, with their facts; no log is read. */
export async function readCounted(db: Queries, person: Person, query: InsightQuery): Promise<{ counted: CountedOutage[], more: boolean, uncounted: number }> {
  const rows = await countedQuery(db, await recordsWhere(person, { ...query, phase: [...COUNTED_PHASES] }, db))
  const page = rows.slice(0, INSIGHT_OUTAGES_MAX)
  const counted = page.flatMap(({ id, code, site, controller, phase, version, facts }): CountedOutage[] =>
    facts === null || version !== FACTS_VERSION ? [] : [{ id, code, site, controller, sealed: phase === 'sealed', facts }])
  return { counted, more: rows.length > page.length, uncounted: page.length - counted.length }
}

/** @param where as `recordsWhere` gives it @returns a query whose SQL tests look at */
export function countedQuery(db: Queries, where: SQL) {
  return db.select({
    id: outageSearch.outageId, code: outageSearch.code, phase: outageSearch.phase,
    site: { id: sites.id, name: sites.name }, controller: { id: controllers.id, name: controllers.name },
    version: outageFacts.version, facts: outageFacts.facts,
  }).from(outageSearch).innerJoin(sites, eq(sites.id, outageSearch.siteId)).innerJoin(controllers, eq(controllers.id, outageSearch.controllerId)).leftJoin(outageFacts, eq(outageFacts.outageId, outageSearch.outageId))
    .where(where).orderBy(desc(outageSearch.openedAt), desc(outageSearch.outageId)).limit(INSIGHT_OUTAGES_MAX + 1)
}

/** The insights of a choice, with what its sealed outages offer to correct. */
export async function readInsights(db: Queries, person: Person, query: InsightQuery): Promise<InsightAnswer> {
  const { counted, more, uncounted } = await readCounted(db, person, query)
  return { ...insightsOf(counted), more, uncounted, offers: await readOffers(db, counted) }
}
