import { z } from 'zod'
import { canonicalBytes } from './canonical'
import type { StoredEntry } from './entry'
import { time } from './kinds/common'
import type { Frontier } from './merkle'
import { addLeaf, frontierRoot, storedLeaf } from './merkle'

const hash = z.string().regex(/^[0-9a-f]{64}$/)

/** What the server signs after each entry that it stores: how the log stood with that entry in it. */
export const checkpointSchema = z.object({
  statement: z.object({
    type: z.literal('holdover-checkpoint'),
    version: z.literal(1),
    outage: z.string().uuid(),
    size: z.number().int().positive(),
    root: hash,
    time,
    key: z.string().uuid(),
  }).strict(),
  signature: z.string().regex(/^[A-Za-z0-9_-]{86}$/),
}).strict()

/**
 * A log's size and Merkle root (RFC 9162, 2.1.1), when it had them, and the server's key that says so
 * (its device id in the log). The signature (Ed25519, base64url) is over the statement's canonical JSON.
 */
export type Checkpoint = z.infer<typeof checkpointSchema>
export type CheckpointStatement = Checkpoint['statement']

/** The statement over a log that ends with an entry. @param root of all entries up to and including it */
export function checkpointStatement(last: StoredEntry, root: string, key: string): CheckpointStatement {
  return { type: 'holdover-checkpoint', version: 1, outage: last.entry.outage, size: last.seq, root, time: last.receivedAt, key }
}

/** The bytes of a statement that are signed. */
export function statementBytes(statement: CheckpointStatement): Uint8Array {
  return canonicalBytes(statement)
}

/** Where a log and a checkpoint that was seen before part: the log's root at that size, or null where the log is shorter. */
export interface Parting { checkpoint: Checkpoint, root: string | null }

/**
 * Goes on along a log: adds entries to the frontier and compares its root with every checkpoint on the way.
 * @param from frontier of the entries before
 * @param fresh the next entries, in the order of `seq`
 * @param seen checkpoints that this log must give; those beyond its end are left for later
 */
export function follow(from: Frontier, fresh: readonly StoredEntry[], seen: readonly Checkpoint[]): { frontier: Frontier, parting: Parting | null } {
  let frontier = from
  let parting: Parting | null = compare(frontier, seen)
  for (const stored of fresh) {
    frontier = addLeaf(frontier, storedLeaf(stored))
    parting ??= compare(frontier, seen)
  }
  return { frontier, parting }
}

function compare(frontier: Frontier, seen: readonly Checkpoint[]): Parting | null {
  const here = seen.filter(({ statement }) => statement.size === frontier.size)
  if (here.length === 0) return null
  const root = frontierRoot(frontier)
  const other = here.find(({ statement }) => statement.root !== root)
  return other ? { checkpoint: other, root } : null
}

/** A log that ends before a checkpoint that was seen has lost entries. @param size of the whole log, as the server says it */
export function shortfall(size: number, seen: readonly Checkpoint[]): Parting | null {
  const beyond = seen.find(({ statement }) => statement.size > size)
  return beyond ? { checkpoint: beyond, root: null } : null
}
