import { asc, eq, sql } from 'drizzle-orm'
import type { Storage } from 'unstorage'
import { fileRemovals, files } from '../../database/schema'
import type { Database } from '../database'
import { lockFile } from '../files/lock'
import { removeBytes } from '../files/storage'

/** Removals that are tried at once. */
const AT_ONCE = 200

/**
 * Takes the files of deleted records out of object storage. One that another record names too stays. One that
 * cannot be removed now stays noted, with why, for the next time.
 * @returns how many are still noted
 */
export async function removeFiles(db: Database, storage: Storage): Promise<number> {
  const asked = await db.select({ sha256: fileRemovals.sha256 }).from(fileRemovals).orderBy(asc(fileRemovals.tries), asc(fileRemovals.askedAt), asc(fileRemovals.sha256)).limit(AT_ONCE)
  for (const { sha256 } of asked) {
    try {
      await db.transaction(async (tx) => {
        await lockFile(tx, sha256)
        if (await tx.$count(files, eq(files.sha256, sha256)) === 0) await removeBytes(storage, sha256)
        await tx.delete(fileRemovals).where(eq(fileRemovals.sha256, sha256))
      })
    } catch (error) {
      const failure = (error instanceof Error ? error.message : String(error)).slice(0, 500)
      await db.update(fileRemovals).set({ tries: sql`${fileRemovals.tries} + 1`, failure }).where(eq(fileRemovals.sha256, sha256))
    }
  }
  return db.$count(fileRemovals)
}
