import { Readable } from 'node:stream'
import { and, eq } from 'drizzle-orm'
import type { Storage } from 'unstorage'
import { recordExports } from '../../database/schema'
import type { Person } from '../access'
import type { Database } from '../database'
import { conflict, forbidden, gone } from '../errors'
import { accessFault, seenOutages } from './access'
import { keepExport, ownExport } from './ask'
import { hasParts, readParts, removeParts } from './parts'
import type { ExportRow } from './work'

/**
 * The finished file of an export, as a stream. That it was downloaded is written to the history first.
 * 403: its records are not the person's any more; 404: not theirs; 409: not finished; 410: past its time or taken away.
 * @param now Unix ms
 */
export async function openExport(db: Database, storage: Storage, person: Person, id: string, now: number): Promise<{ row: ExportRow, bytes: number, stream: Readable }> {
  const row = await ownExport(db, person, id)
  if (row.state === 'waiting' || row.state === 'working') conflict('It is still being made')
  if (row.state !== 'done' || row.parts === null || row.bytes === null || row.expiresAt === null || row.expiresAt.getTime() <= now) return gone('The file is not kept any more; ask for the export again')
  const fault = await accessFault(db, row)
  if (fault) forbidden(fault)
  if (!await hasParts(storage, row.id, row.tries, row.parts)) gone('The file is not in the store any more; ask for the export again')
  await keepExport(db, person, row, 'downloaded', await seenOutages(db, person, row.outageIds), now)
  return { row, bytes: row.bytes, stream: Readable.from(readParts(storage, row.id, row.tries, row.parts)) }
}

/** Cancels an export that is not finished, or takes the file of a finished one away; its worker stops before the next record. */
export async function dropExport(db: Database, storage: Storage, person: Person, id: string, now: number): Promise<ExportRow> {
  const row = await ownExport(db, person, id)
  const state = row.state === 'waiting' || row.state === 'working' ? 'cancelled' : row.state === 'done' ? 'expired' : null
  if (state === null) return row
  const [dropped] = await db.update(recordExports).set({ state, doneAt: row.doneAt ?? new Date(now), expiresAt: row.state === 'done' ? new Date(now) : row.expiresAt }).where(and(eq(recordExports.id, id), eq(recordExports.state, row.state))).returning()
  // It went on in the meantime: what it is now is dropped instead.
  if (!dropped) return dropExport(db, storage, person, id, now)
  await removeParts(storage, id, row.tries)
  return dropped
}
