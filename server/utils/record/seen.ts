import { and, eq } from 'drizzle-orm'
import { entries } from '../../database/schema'
import type { Queries } from '../database'
import type { PushResult } from './admit'
import { refuse } from './admit'

/** A place in a log: how long it is, and the Merkle root of it all. */
export interface LogEnd { size: number, root: string }

/**
 * Whether a log gives what a device saw of it. One that does not was put back to an older state, or is another one.
 * @param end of the log; null where no checkpoint says it
 */
export async function givesSeen(db: Queries, outageId: string, end: LogEnd | null, seen: LogEnd | null): Promise<boolean> {
  if (seen === null) return true
  if (end !== null && seen.size >= end.size) return seen.size === end.size && seen.root === end.root
  const [row] = await db.select({ checkpoint: entries.checkpoint }).from(entries).where(and(eq(entries.outageId, outageId), eq(entries.seq, seen.size)))
  return row?.checkpoint?.statement.root === seen.root
}

/** Nothing is decided about an entry that would build on a log which its device never saw: it waits there. */
export function notThatLog(item: unknown): PushResult {
  const id = (item as { entry?: { id?: unknown } } | null)?.entry?.id
  return { ...refuse(typeof id === 'string' ? id.slice(0, 64) : null, 409, 'This log is not the one that your device saw'), later: 'log' }
}
