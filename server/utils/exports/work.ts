import { and, asc, eq, lt, lte, or, sql } from 'drizzle-orm'
import type { Storage } from 'unstorage'
import { EXPORT_DAYS } from '../../../shared/schemas/exports'
import type { ExportKind } from '../../../shared/schemas/exports'
import { outages, recordExports } from '../../database/schema'
import type { Database } from '../database'
import { accessFault } from './access'
import type { Order } from './contents'
import { readParts, removeParts, writeParts } from './parts'

export type ExportRow = typeof recordExports.$inferSelect

/** A worker that has not been heard for so long is taken for dead, ms. One record takes seconds. */
const SILENT_MS = 120_000
/** An export that workers died over so often is given up. */
const TRIES_MAX = 4
const DAY_MS = 86_400_000

export interface Workshop {
  db: Database
  storage: Storage
  /** Unix ms */
  clock: () => number
  contents: Record<ExportKind, (order: Order) => AsyncIterable<Uint8Array>>
}

/** Thrown where an export was cancelled, or another worker has it by now. */
class Overtaken extends Error {}

/** Makes the exports that wait, one after another, and those whose worker died, from their beginning. */
export async function workExports(workshop: Workshop): Promise<void> {
  for (let row = await claim(workshop); row; row = await claim(workshop)) await make(workshop, row)
}

/** Takes the oldest export that nobody works on; each taking is a try of its own. */
async function claim({ db, clock }: Workshop): Promise<ExportRow | null> {
  return db.transaction(async (tx) => {
    const [row] = await tx.select().from(recordExports)
      .where(or(eq(recordExports.state, 'waiting'), and(eq(recordExports.state, 'working'), lt(recordExports.heartbeatAt, new Date(clock() - SILENT_MS)))))
      .orderBy(asc(recordExports.id)).limit(1).for('update', { skipLocked: true })
    if (!row) return null
    const [claimed] = await tx.update(recordExports).set({ state: 'working', tries: row.tries + 1, done: 0, heartbeatAt: new Date(clock()) }).where(eq(recordExports.id, row.id)).returning()
    return claimed!
  })
}

async function make(workshop: Workshop, row: ExportRow): Promise<void> {
  const { db, storage, clock, contents } = workshop
  try {
    if (row.tries > TRIES_MAX) return await fail(workshop, row, 'Its making was begun several times and never came to an end')
    const fault = await accessFault(db, row)
    if (fault) return await fail(workshop, row, fault)
    const file = await writeParts(storage, row.id, row.tries, contents[row.kind]({ db, outageIds: row.outageIds, before: done => beat(workshop, row, done) }))
    await beat(workshop, row, row.total)
    await checkFile(storage, row, file)
    const doneAt = clock()
    const finished = await change(workshop, row, { state: 'done', ...file, doneAt: new Date(doneAt), expiresAt: new Date(doneAt + EXPORT_DAYS * DAY_MS) })
    await removeParts(storage, row.id, row.tries, finished ? row.tries : null)
  } catch (error) {
    if (error instanceof Overtaken) return await removeOwn(storage, row)
    console.error(`The export ${row.id} failed:`, error)
    await fail(workshop, row, faultWords(error))
  }
}

/** Says how far it is. @throws Overtaken */
async function beat(workshop: Workshop, row: ExportRow, done: number): Promise<void> {
  if (!await change(workshop, row, { done, heartbeatAt: new Date(workshop.clock()) })) throw new Overtaken()
  // Other requests of this process get their turn between two records.
  await new Promise(resolve => setImmediate(resolve))
}

/** What the store holds must be what was written before anybody is told that it is there. */
async function checkFile(storage: Storage, row: ExportRow, { parts, bytes }: { parts: number, bytes: number }): Promise<void> {
  let held = 0
  for await (const part of readParts(storage, row.id, row.tries, parts)) held += part.length
  if (held !== bytes) throw new Error(`The store holds ${held} bytes of ${bytes}`)
}

/** Changes the export if this try still has it. @returns whether it does */
async function change({ db }: Workshop, row: ExportRow, values: Partial<ExportRow>): Promise<boolean> {
  const changed = await db.update(recordExports).set(values).where(and(eq(recordExports.id, row.id), eq(recordExports.tries, row.tries), eq(recordExports.state, 'working'))).returning({ id: recordExports.id })
  return changed.length > 0
}

async function fail(workshop: Workshop, row: ExportRow, fault: string): Promise<void> {
  const failed = await change(workshop, row, { state: 'failed', fault, doneAt: new Date(workshop.clock()) })
  await (failed ? removeParts(workshop.storage, row.id, row.tries) : removeOwn(workshop.storage, row))
}

/** Another try may be writing: only what this one wrote goes. */
async function removeOwn(storage: Storage, row: ExportRow): Promise<void> {
  await removeParts(storage, row.id, row.tries, null, row.tries)
}

/** An error with a reason in words was meant for people; any other is for the log. */
function faultWords(error: unknown): string {
  const reason = (error as { data?: { reason?: unknown } } | null)?.data?.reason
  return typeof reason === 'string' ? reason : 'Something went wrong while it was made; ask for it again, and tell your administrator if it fails once more'
}

/** Takes away files that are past their time, and those that hold a record that was deleted since. */
export async function expireExports({ db, storage, clock }: Omit<Workshop, 'contents'>): Promise<void> {
  const now = new Date(clock())
  const holdsDeleted = sql`exists (select from unnest(${recordExports.outageIds}) held(id) where not exists (select from ${outages} where ${outages.id} = held.id))`
  const rows = await db.update(recordExports).set({ state: 'expired', expiresAt: sql`least(${recordExports.expiresAt}, ${now.toISOString()}::timestamptz)` })
    .where(and(eq(recordExports.state, 'done'), or(lte(recordExports.expiresAt, now), holdsDeleted))).returning()
  for (const row of rows) await removeParts(storage, row.id, row.tries)
}
