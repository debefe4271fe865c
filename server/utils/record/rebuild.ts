import { asc, gt } from 'drizzle-orm'
import { foldLog } from '../../../shared/record/fold'
import { frontierOf } from '../../../shared/record/merkle'
import { outages } from '../../database/schema'
import { rebuildAlerts } from '../alerts/keep'
import type { Database } from '../database'
import { renewSearch } from '../records/save'
import { saveProjection } from './draft'
import { readCheckpoints, readEntries } from './log'
import { serverSigner } from './server-signer'

/**
 * Folds every log anew and writes the projection that lists and screens read; the logs are not touched.
 * @returns how many outages there are, and the codes of those whose projection had differed
 */
export async function rebuildProjections(db: Database): Promise<{ count: number, differed: string[] }> {
  const signer = await serverSigner(db)
  const differed: string[] = []
  let count = 0
  for (let after = '00000000-0000-0000-0000-000000000000'; ;) {
    const [row] = await db.select().from(outages).where(gt(outages.id, after)).orderBy(asc(outages.id)).limit(1)
    if (!row) return { count, differed }
    after = row.id
    count++
    await db.transaction(async (tx) => {
      const log = await readEntries(tx, row.id)
      const state = foldLog(row.id, log)
      if (row.size !== state.size || row.phase !== state.phase) differed.push(row.code)
      await saveProjection({ db: tx, state, frontier: frontierOf(log), checkpoint: (await readCheckpoints(tx, row.id)).at(-1) ?? null, signer, now: row.updatedAt.getTime(), rows: [], cached: null })
      await renewSearch(tx, state, log)
      await rebuildAlerts(tx, state)
    })
  }
}
