import { and, eq } from 'drizzle-orm'
import type { Storage } from 'unstorage'
import { files } from '../../database/schema'
import type { Queries } from '../database'
import { unprocessable } from '../errors'
import { lockFile } from './lock'
import { inspectPicture } from './picture'
import { readBytes, writeBytes } from './storage'

export interface KeptFile { sha256: string, mime: 'image/jpeg' | 'image/png', size: number }

/** A file that an outage holds, or null. */
export async function fileOf(db: Queries, outageId: string, sha256: string): Promise<KeptFile | null> {
  const [row] = await db.select({ sha256: files.sha256, mime: files.mime, size: files.size }).from(files).where(and(eq(files.outageId, outageId), eq(files.sha256, sha256)))
  return row ?? null
}

/** Hashes of all files that an outage holds. */
export async function heldFiles(db: Queries, outageId: string): Promise<Set<string>> {
  const rows = await db.select({ sha256: files.sha256 }).from(files).where(eq(files.outageId, outageId))
  return new Set(rows.map(row => row.sha256))
}

/**
 * Keeps a photo or drawing of an outage. The bytes are stored before the row that says so can be seen, and the same
 * file may be sent again.
 * @throws 422 with the reason where the file is not what its name says, no picture, too large a one, or carries metadata
 */
export async function keepFile(db: Queries, storage: Storage, { outageId, personId, sha256, bytes }: { outageId: string, personId: string, sha256: string, bytes: Uint8Array }): Promise<{ file: KeptFile, fresh: boolean }> {
  const inspected = await inspectPicture(bytes, sha256)
  if ('fault' in inspected) return unprocessable(inspected.field, inspected.fault)
  const known = await fileOf(db, outageId, sha256)
  if (known && await readBytes(storage, sha256)) return { file: known, fresh: false }
  const file: KeptFile = { sha256, mime: inspected.mime, size: bytes.length }
  await db.transaction(async (tx) => {
    await lockFile(tx, sha256)
    await tx.insert(files).values({ outageId, personId, ...file }).onConflictDoNothing()
    await writeBytes(storage, sha256, bytes)
  })
  return { file, fresh: known === null }
}
