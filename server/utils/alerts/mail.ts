import { and, asc, eq, inArray, isNotNull, isNull, max } from 'drizzle-orm'
import { sha256Hex } from '../../../shared/record/canonical'
import type { OutageState } from '../../../shared/record/state'
import { alerts, alertTold, people } from '../../database/schema'
import type { Queries } from '../database'
import { alertLetter } from '../../emails/alert'
import { aboutOutage } from '../mail/tell-contacts'
import { writeMail } from '../mail/write'
import type { AlertsDue } from './due'

/** Alerts of one outage that come so close upon each other go as one mail, ms. */
export const TOGETHER_MS = 60_000

/** Writes down who is to be told of what, in the transaction that enters it in the log. */
export async function keepTold(db: Queries, outageId: string, { raise, passOn }: AlertsDue, now: number): Promise<void> {
  const rows = [...raise, ...passOn].flatMap(({ key, to }) => to.map(person => ({ outageId, key, personId: person.id, toldAt: new Date(now) })))
  if (rows.length > 0) await db.insert(alertTold).values(rows).onConflictDoNothing()
}

/**
 * Writes the mails of all that waits for one: at once where the last mail of the outage is a minute old, else it waits
 * for the next look, and goes with what has come by then. Each person gets one mail of all that they are told.
 * @param now Unix ms
 */
export async function mailTold(db: Queries, state: OutageState, now: number): Promise<void> {
  const waiting = await db.select({ key: alertTold.key, personId: alertTold.personId, email: people.email, words: alerts.words })
    .from(alertTold).innerJoin(alerts, and(eq(alerts.outageId, alertTold.outageId), eq(alerts.key, alertTold.key))).innerJoin(people, eq(people.id, alertTold.personId))
    .where(and(eq(alertTold.outageId, state.id), isNull(alertTold.mailedAt))).orderBy(asc(alertTold.toldAt), asc(alerts.raisedAt), asc(alertTold.key))
  if (waiting.length === 0) return
  const [last] = await db.select({ at: max(alertTold.mailedAt) }).from(alertTold).where(and(eq(alertTold.outageId, state.id), isNotNull(alertTold.mailedAt)))
  if (last?.at && now - last.at.getTime() < TOGETHER_MS) return
  for (const personId of [...new Set(waiting.map(row => row.personId))].sort()) {
    const mine = waiting.filter(row => row.personId === personId)
    const key = `alert ${state.id} ${personId} ${sha256Hex(mine.map(row => row.key).join('\n')).slice(0, 32)}`
    await writeMail(db, { ...alertLetter(aboutOutage(state), mine.map(row => row.words)), kind: 'alert', key, to: mine[0]!.email, outageId: state.id, personId }, now)
  }
  await db.update(alertTold).set({ mailedAt: new Date(now) }).where(and(eq(alertTold.outageId, state.id), isNull(alertTold.mailedAt), inArray(alertTold.key, [...new Set(waiting.map(row => row.key))])))
}
