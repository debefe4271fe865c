import { asc, eq, isNull, ne, or } from 'drizzle-orm'
import { outages, outageSearch } from '../../database/schema'
import type { Database } from '../database'
import { readEntries, readState } from '../record/log'
import { SEARCH_VERSION } from './facts'
import { renewSearch } from './save'

/**
 * Makes the rows by which outages are found where there is none, or one that older rules made. Each takes a
 * lock of its own, so that pushes wait for one outage at most.
 * @returns how many were made
 */
export async function renewOldSearch(db: Database): Promise<number> {
  const old = or(isNull(outageSearch.outageId), ne(outageSearch.version, SEARCH_VERSION))
  for (let count = 0; ; count++) {
    const [next] = await db.select({ id: outages.id }).from(outages).leftJoin(outageSearch, eq(outageSearch.outageId, outages.id)).where(old).orderBy(asc(outages.id)).limit(1)
    if (!next) return count
    await db.transaction(async (tx) => {
      const [row] = await tx.select().from(outages).where(eq(outages.id, next.id)).for('update')
      if (row) await renewSearch(tx, await readState(tx, row), await readEntries(tx, row.id))
    })
  }
}
