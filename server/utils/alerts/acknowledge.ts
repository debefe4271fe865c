import { eq } from 'drizzle-orm'
import { isoTime } from '../../../shared/record/entry'
import { outages } from '../../database/schema'
import type { Person } from '../access'
import type { Database } from '../database'
import { conflict, notFound } from '../errors'
import { addServerEntry, draftOf, saveProjection } from '../record/draft'
import { serverSigner } from '../record/server-signer'
import { wakeWatch } from '../watch/wake'
import { keepAlerts } from './keep'

/** Who acknowledged an alert, and when (ISO 8601 UTC). */
export interface Acknowledged { key: string, name: string, at: string }

/**
 * Enters that somebody has seen an alert. The first one counts: whoever comes later learns who that was.
 * @param now Unix ms
 * @throws 404 where there is no such alert; 409 where the record is closed and nobody had acknowledged it
 */
export async function acknowledgeAlert(db: Database, person: Person, outageId: string, key: string, now: number): Promise<Acknowledged> {
  const acknowledged = await db.transaction(async (tx) => {
    const [row] = await tx.select().from(outages).where(eq(outages.id, outageId)).for('update')
    if (!row) return notFound('outage')
    const draft = await draftOf(tx, outageId, row, await serverSigner(tx), now)
    const alert = draft.state.alerts.find(item => item.key === key)
    if (!alert) return notFound('alert')
    if (alert.acknowledged === null) {
      if (draft.state.phase === 'sealed' || draft.state.phase === 'called-off') return conflict('This record is closed: nothing more is entered in it')
      await addServerEntry(draft, 'alert-acknowledged', { key, person: person.id, name: person.name, acknowledgedAt: isoTime(now) })
      await keepAlerts(tx, draft.state, new Set([key]))
      await saveProjection(draft)
    }
    return { key, name: alert.acknowledged!.name, at: isoTime(alert.acknowledged!.at) }
  })
  wakeWatch(db, outageId)
  return acknowledged
}
