import { eq, getTableColumns } from 'drizzle-orm'
import { applyStored } from '../../../shared/record/fold'
import { frontierOf, frontierRoot } from '../../../shared/record/merkle'
import { outages } from '../../database/schema'
import type { Queries } from '../database'
import type { Draft } from './draft'
import { draftFrom, draftOf, heldAfter } from './draft'
import type { Folds, HeldFold } from './folds'
import type { OutageRow } from './log'
import { readEntries } from './log'
import type { ServerSigner } from './server-signer'

const { state: _long, ...withoutFold } = getTableColumns(outages)

/** All of an outage's row but the cached fold, which is long and seldom needed. */
export const LOCKED_COLUMNS = withoutFold
export type LockedRow = Omit<OutageRow, 'state'>

/**
 * A draft of an outage whose row is locked: from the fold that this process holds, where the log is that of the
 * fold or goes on from it, else from what the row caches. @param row null: still to be opened
 */
export async function lockedDraft(tx: Queries, folds: Folds, outageId: string, row: LockedRow | null, signer: ServerSigner, now: number): Promise<Draft> {
  if (row === null) return draftOf(tx, outageId, null, signer, now)
  const held = folds.take(outageId)
  const caughtUp = held && await catchUp(tx, held, row)
  if (caughtUp) return draftFrom(tx, caughtUp, signer, now)
  const [cached] = await tx.select({ state: outages.state }).from(outages).where(eq(outages.id, outageId))
  return draftOf(tx, outageId, { ...row, ...cached! }, signer, now)
}

/** A fold brought to the end of its log; null where the log does not go on from it, as in a database that was put back. */
async function catchUp(tx: Queries, held: HeldFold, { id, size, checkpoint }: LockedRow): Promise<HeldFold | null> {
  if (checkpoint === null || held.state.size > size) return null
  const fresh = held.state.size === size ? [] : await readEntries(tx, id, held.state.size)
  const frontier = frontierOf(fresh, held.frontier)
  if (frontier.size !== size || frontierRoot(frontier) !== checkpoint.statement.root) return null
  for (const stored of fresh) applyStored(held.state, stored)
  return { ...held, frontier, checkpoint }
}

/** Keeps what a draft has become, once it is stored for good. */
export function keepFold(folds: Folds, draft: Draft): void {
  const held = heldAfter(draft)
  if (held) folds.keep(held)
}
