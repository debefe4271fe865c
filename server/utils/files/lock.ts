import { sql } from 'drizzle-orm'
import type { Queries } from '../database'

/** Holds a file's name until the transaction ends: keeping and removing the same bytes never cross. */
export async function lockFile(tx: Queries, sha256: string): Promise<void> {
  await tx.execute(sql`select pg_advisory_xact_lock(hashtextextended(${sha256}, 1))`)
}
