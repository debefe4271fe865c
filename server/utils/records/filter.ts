import { and, eq, gte, inArray, lte, sql } from 'drizzle-orm'
import type { SQL } from 'drizzle-orm'
import type { RecordFilter } from '../../../shared/schemas/record-filter'
import { outageSearch } from '../../database/schema'
import type { Person } from '../access'
import { visibleSites } from '../access'
import type { Queries } from '../database'
import { useDatabase } from '../database'
import { wordsSought } from './words'

/** Days of different sites begin at most so many hours from that of UTC. */
const DAY_EDGE_HOURS = 14

/**
 * Which rows of `outage_search` a search finds, among those that the person may see. Where nothing is theirs
 * to see the condition is never true.
 */
export async function recordsWhere(person: Person, filter: RecordFilter, db: Queries = useDatabase()): Promise<SQL> {
  const sites = sitesSought(await visibleSites(person, db), filter)
  return and(sites === null ? undefined : sites.length === 0 ? sql`false` : inArray(outageSearch.siteId, sites), fits(filter)) ?? sql`true`
}

/** The sites that a search looks at; null: all of them. @param visible as `visibleSites` gives them */
export function sitesSought(visible: string[] | null, { site }: RecordFilter): string[] | null {
  if (site === undefined) return visible
  return visible === null || visible.includes(site) ? [site] : []
}

/** Everything that a search asks for but the site. */
export function fits({ words, controller, from, to, person, work, phase, outcome, tag }: RecordFilter): SQL | undefined {
  const sought = words === undefined ? null : wordsSought(words)
  return and(
    sought === null ? undefined : sql`${outageSearch.words} @@ ${sought}`,
    controller === undefined ? undefined : eq(outageSearch.controllerId, controller),
    // The day is the site's; the moment beside it is what the index is sorted by.
    from === undefined ? undefined : and(gte(outageSearch.openedOn, from), gte(outageSearch.openedAt, edge(from, -DAY_EDGE_HOURS))),
    to === undefined ? undefined : and(lte(outageSearch.openedOn, to), lte(outageSearch.openedAt, edge(to, 24 + DAY_EDGE_HOURS))),
    person === undefined ? undefined : sql`${outageSearch.people} @> array[${person}]::uuid[]`,
    work === undefined ? undefined : eq(outageSearch.workKind, work),
    phase === undefined || phase.length === 0 ? undefined : inArray(outageSearch.phase, phase),
    outcome === undefined || outcome.length === 0 ? undefined : sql`${outageSearch.outcomes} @> array[${sql.join(outcome.map(one => sql`${one}`), sql`, `)}]::text[]`,
    tag === undefined ? undefined : sql`${outageSearch.tags} @> array[upper(${tag}::text)]`,
  )
}

function edge(day: string, hours: number): Date {
  return new Date(Date.parse(`${day}T00:00:00.000Z`) + hours * 3_600_000)
}
