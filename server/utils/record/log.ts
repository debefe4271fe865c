import { and, asc, eq, gt, isNotNull } from 'drizzle-orm'
import type { StoredEntry } from '../../../shared/record/entry'
import { applyStored, foldLog } from '../../../shared/record/fold'
import type { Checkpoint } from '../../../shared/record/checkpoint'
import type { Frontier } from '../../../shared/record/merkle'
import { frontierOf } from '../../../shared/record/merkle'
import type { OutageState } from '../../../shared/record/state'
import { FOLD_VERSION } from '../../../shared/record/state'
import type { outages } from '../../database/schema'
import { entries } from '../../database/schema'
import type { Queries } from '../database'

export type OutageRow = typeof outages.$inferSelect

/** A row of the log as the record holds it. */
export function storedEntry(row: typeof entries.$inferSelect): StoredEntry {
  return { entry: JSON.parse(row.signed), signature: row.signature, seq: row.seq, receivedAt: row.receivedAt.toISOString(), standing: row.standing, why: row.why }
}

/** Entries of an outage after a seq, in order. @param limit 0: all */
export async function readEntries(db: Queries, outageId: string, after = 0, limit = 0): Promise<StoredEntry[]> {
  const query = db.select().from(entries).where(and(eq(entries.outageId, outageId), gt(entries.seq, after))).orderBy(asc(entries.seq))
  const rows = limit > 0 ? await query.limit(limit) : await query
  return rows.map(storedEntry)
}

/**
 * The folded state of a row: the cached one where its meaning is still the same, gone on with the entries that
 * came after it was written, else folded anew.
 */
export async function readState(db: Queries, row: OutageRow): Promise<OutageState> {
  if (row.foldVersion !== FOLD_VERSION || row.state.size > row.size) return foldLog(row.id, await readEntries(db, row.id))
  if (row.state.size < row.size) for (const stored of await readEntries(db, row.id, row.state.size)) applyStored(row.state, stored)
  return row.state
}

/** The frontier of a row's log: the cached one where it is of the same size, else worked out from the entries. */
export async function readFrontier(db: Queries, row: OutageRow): Promise<Frontier> {
  return row.frontier?.size === row.size ? row.frontier : frontierOf(await readEntries(db, row.id))
}

/** Every checkpoint of an outage, in the order of the log; entries older than checkpoints have none. */
export async function readCheckpoints(db: Queries, outageId: string): Promise<Checkpoint[]> {
  const rows = await db.select({ checkpoint: entries.checkpoint }).from(entries).where(and(eq(entries.outageId, outageId), isNotNull(entries.checkpoint))).orderBy(asc(entries.seq))
  return rows.map(row => row.checkpoint!)
}
