import { and, asc, eq, inArray, isNull, ne, or } from 'drizzle-orm'
import { foldLog } from '../../../shared/record/fold'
import type { Phase } from '../../../shared/record/phases'
import type { OutageState } from '../../../shared/record/state'
import { outageFacts, outages } from '../../database/schema'
import type { Database, Queries } from '../database'
import { readEntries } from '../record/log'
import { FACTS_VERSION, factsOf } from './facts'

/** Phases in which an outage counts: its readings and times are there as people stand by them. */
export const COUNTED_PHASES = ['submitted', 'sealed'] as const satisfies readonly Phase[]
export const isCounted = (phase: Phase): phase is (typeof COUNTED_PHASES)[number] => (COUNTED_PHASES as readonly Phase[]).includes(phase)

/**
 * Keeps the facts of an outage in step with its log, in the transaction that adds entries; an outage that is
 * still going on costs nothing.
 * @param before the phase until now; null: not known
 * @param now Unix ms
 */
export async function keepFacts(db: Queries, state: OutageState, before: Phase | null, now: number): Promise<void> {
  if (isCounted(state.phase)) {
    const row = { version: FACTS_VERSION, facts: factsOf(state, await readEntries(db, state.id), state.submitted?.mark.at ?? now) }
    await db.insert(outageFacts).values({ outageId: state.id, ...row }).onConflictDoUpdate({ target: outageFacts.outageId, set: row })
  } else if (before === null || isCounted(before)) {
    await db.delete(outageFacts).where(eq(outageFacts.outageId, state.id))
  }
}

/**
 * Makes facts for finished outages that have none, or have them by older rules: records from before there were any.
 * @param until Unix ms by the server's clock at which it stops, to go on another time
 * @returns how many were made
 */
export async function makeMissingFacts(db: Database, clock: () => number, until: number): Promise<number> {
  for (let made = 0; ; made++) {
    const [next] = clock() >= until ? [] : await missing(db).orderBy(asc(outages.id)).limit(1)
    if (!next) return made
    await db.transaction(async (tx) => {
      const [row] = await tx.select({ id: outages.id }).from(outages).where(eq(outages.id, next.id)).for('update')
      if (row) await keepFacts(tx, foldLog(row.id, await readEntries(tx, row.id)), null, clock())
    })
  }
}

function missing(db: Queries) {
  return db.select({ id: outages.id }).from(outages).leftJoin(outageFacts, eq(outageFacts.outageId, outages.id))
    .where(and(inArray(outages.phase, COUNTED_PHASES), or(isNull(outageFacts.outageId), ne(outageFacts.version, FACTS_VERSION))))
}
