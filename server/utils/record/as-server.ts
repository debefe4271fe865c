import { eq } from 'drizzle-orm'
import { outages } from '../../database/schema'
import type { Database } from '../database'
import type { Draft } from './draft'
import { draftOf, saveProjection } from './draft'
import { serverSigner } from './server-signer'

/**
 * Lets the server add entries of its own to an outage, under its row's lock.
 * @param write adds to the draft; what it writes besides belongs to the same transaction
 * @param now Unix ms
 * @returns what `write` gives; null where there is no such outage
 */
export async function writeAsServer<T>(db: Database, outageId: string, now: number, write: (draft: Draft) => Promise<T>): Promise<T | null> {
  return db.transaction(async (tx) => {
    const [row] = await tx.select().from(outages).where(eq(outages.id, outageId)).for('update')
    if (!row) return null
    const draft = await draftOf(tx, outageId, row, await serverSigner(tx), now)
    const before = draft.state.size
    const written = await write(draft)
    if (draft.state.size > before) await saveProjection(draft)
    return written
  })
}
