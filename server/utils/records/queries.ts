/** The queries of the record list, built apart from being asked, so that their cost can be looked at. */
import { and, asc, desc, eq, sql } from 'drizzle-orm'
import type { SQL } from 'drizzle-orm'
import { z } from 'zod'
import { time } from '../../../shared/record/kinds/common'
import type { RecordFilter, RecordQuery, RecordSort } from '../../../shared/schemas/record-filter'
import { MOST_COUNTED } from '../../../shared/schemas/record-filter'
import { NO_HOLD, outageSearch } from '../../database/schema'
import type { Queries } from '../database'
import { unprocessable } from '../errors'
import { fits } from './filter'

/** What each order goes by, and whether it goes down. Ties break on id, in the same direction, so that an index gives both. */
const ORDERS = {
  'newest': { column: outageSearch.openedAt, down: true, place: time },
  'oldest': { column: outageSearch.openedAt, down: false, place: time },
  'longest-dark': { column: outageSearch.darkSeconds, down: true, place: z.coerce.number().int().min(0).max(NO_HOLD) },
  'shortest-hold': { column: outageSearch.holdSeconds, down: false, place: z.coerce.number().int().min(0).max(NO_HOLD) },
} as const satisfies Record<RecordSort, unknown>

const COLUMNS = {
  outageId: outageSearch.outageId, code: outageSearch.code, phase: outageSearch.phase, siteId: outageSearch.siteId, controllerId: outageSearch.controllerId, workKind: outageSearch.workKind,
  openedAt: outageSearch.openedAt, endedAt: outageSearch.endedAt, darkSince: outageSearch.darkSince, darkSeconds: outageSearch.darkSeconds, holdSeconds: outageSearch.holdSeconds,
  lateReadings: outageSearch.lateReadings, outcomes: outageSearch.outcomes,
}

/** Which sites a search looks at: all (null), or these of so many that there are. */
export type Scope = null | { sites: string[], ofAll: number }

/**
 * One row more than a page holds, in its order.
 *
 * An index over all sites gives the rows in each order, another one those of one site. A few sites of many take
 * the best rows of each, and the best of these: what that reads grows with their number, what the index over all
 * reads on the way to a row of theirs with all sites over their number, so the root of all sites parts the two.
 * @param scope with at least one site
 */
export function pageQuery(db: Queries, scope: Scope, query: RecordQuery) {
  const { column, down } = ORDERS[query.sort]
  const direction = down ? desc : asc
  const wanted = and(fits(query), query.after === undefined ? undefined : beyond(query.sort, query.after))
  const order = [direction(column), direction(outageSearch.outageId)]
  const ofRows = db.select(COLUMNS).from(outageSearch)
  if (scope === null || scope.sites.length === 1 || scope.sites.length ** 2 >= scope.ofAll) return ofRows.where(and(within(scope), wanted)).orderBy(...order).limit(query.limit + 1)
  const best = db.select({ id: outageSearch.outageId, place: sql`${column}`.as('place') }).from(outageSearch).where(and(sql`${outageSearch.siteId} = of_site.id`, wanted)).orderBy(...order).limit(query.limit + 1).as('best')
  const page = db.select({ id: best.id }).from(sql`unnest(${uuids(scope.sites)}) as of_site(id)`).crossJoinLateral(best).orderBy(direction(sql`best.place`), direction(best.id)).limit(query.limit + 1).as('page')
  return ofRows.innerJoin(page, eq(page.id, outageSearch.outageId)).orderBy(...order)
}

function within(scope: Scope): SQL | undefined {
  if (scope === null) return undefined
  return scope.sites.length === 1 ? eq(outageSearch.siteId, scope.sites[0]!) : sql`${outageSearch.siteId} = any(${uuids(scope.sites)})`
}

const uuids = (ids: readonly string[]) => sql`array[${sql.join(ids.map(id => sql`${id}`), sql`, `)}]::uuid[]`

/** How many rows a search finds; it stops once it knows that there are more than are counted. */
export function countQuery(db: Queries, scope: Scope, filter: RecordFilter) {
  const some = db.select({ one: sql`1`.as('one') }).from(outageSearch).where(and(within(scope), fits(filter))).limit(MOST_COUNTED + 1).as('some')
  return db.select({ found: sql<number>`count(*)::int` }).from(some)
}

/** The place of a row in an order, for the page that goes on after it. */
export function pageEnd(sort: RecordSort, row: { outageId: string, openedAt: Date, darkSeconds: number, holdSeconds: number }): string {
  const value = { 'newest': row.openedAt.toISOString(), 'oldest': row.openedAt.toISOString(), 'longest-dark': row.darkSeconds, 'shortest-hold': row.holdSeconds }[sort]
  return `${value}_${row.outageId}`
}

/** Rows after a place that an earlier page of the same order ended at. */
function beyond(sort: RecordSort, after: string): SQL {
  const { column, down, place } = ORDERS[sort]
  const parsed = z.tuple([place, z.string().uuid()]).safeParse(after.split('_'))
  if (!parsed.success) return unprocessable('after', 'Give the "next" of an earlier page in the same order')
  const [value, id] = parsed.data
  return sql`(${column}, ${outageSearch.outageId}) ${sql.raw(down ? '<' : '>')} (${sql.param(value)}::${sql.raw(column.getSQLType())}, ${id}::uuid)`
}
