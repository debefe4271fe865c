import { and, asc, eq, exists, inArray, isNull, or } from 'drizzle-orm'
import { answerable } from '../../../shared/record/hands'
import { alerts, alertTold, outages } from '../../database/schema'
import type { Database, Queries } from '../database'
import type { Draft } from '../record/draft'
import { addServerEntry, draftOf, saveProjection } from '../record/draft'
import { followUp } from '../record/follow'
import { serverSigner } from '../record/server-signer'
import { ALERT_PHASES, alertsDue } from './due'
import type { AlertsDue } from './due'
import type { AlertEntry } from './entries'
import { alertEntries } from './entries'
import { keepAlerts } from './keep'
import { keepTold, mailTold } from './mail'
import { alertingOf, alertSettings } from './people'
import { wakeWatch } from '../watch/wake'

/**
 * Looks at every outage that may have something to alert, enters what time has brought, and tells whom it concerns.
 * Each in a transaction of its own: one that fails keeps nobody from looking at the others, and is looked at again.
 * @param now Unix ms
 */
export async function sweepAlerts(db: Database, now: number): Promise<void> {
  const ids = await db.select({ id: outages.id }).from(outages).where(or(inArray(outages.phase, [...ALERT_PHASES]), hasUnmailed(db), hasOpen(db))).orderBy(asc(outages.id))
  const failed: unknown[] = []
  for (const { id } of ids) await lookForAlerts(db, id, now).catch(error => failed.push(error))
  if (failed.length > 0) throw new AggregateError(failed, `${failed.length} of ${ids.length} outages could not be looked at: ${String(failed[0])}`)
}

const hasUnmailed = (db: Queries) => exists(db.select({ key: alertTold.key }).from(alertTold).where(and(eq(alertTold.outageId, outages.id), isNull(alertTold.mailedAt))))
const hasOpen = (db: Queries) => exists(db.select({ key: alerts.key }).from(alerts).where(and(eq(alerts.outageId, outages.id), isNull(alerts.overAt))))

/**
 * Looks at one outage under its row's lock: entries, rows beside them and mails are written together or not at all.
 * One that is being written to is left to the next look.
 * @returns whether the log grew
 */
export async function lookForAlerts(db: Database, outageId: string, now: number): Promise<boolean> {
  const grown = await db.transaction(async (tx) => {
    const [row] = await tx.select().from(outages).where(eq(outages.id, outageId)).for('update', { skipLocked: true })
    if (!row) return false
    const draft = await draftOf(tx, outageId, row, await serverSigner(tx), now)
    const before = draft.state.size
    await followUp(draft)
    await enterAlerts(draft, row.siteId)
    await mailTold(tx, draft.state, now)
    if (draft.state.size === before) return false
    await saveProjection(draft)
    return true
  })
  if (grown) wakeWatch(db, outageId)
  return grown
}

async function enterAlerts(draft: Draft, siteId: string): Promise<void> {
  const { db, state, now } = draft
  if (state.phase === 'sealed' || state.phase === 'called-off') return closeAlerts(draft)
  const { rules, people } = await alertingOf(db, siteId)
  const due = alertsDue(state, now, alertSettings(rules, people, answerable(state)))
  const entries = alertEntries(due, now)
  if (entries.length === 0) return
  for (const entry of entries) await addAlertEntry(draft, entry)
  await keepAlerts(db, state, keysOf(due))
  await keepTold(db, state.id, due, now)
}

/** One call for each kind, so that kind and body stay together. */
function addAlertEntry(draft: Draft, entry: AlertEntry) {
  if (entry.kind === 'alert-raised') return addServerEntry(draft, entry.kind, entry.body)
  if (entry.kind === 'alert-passed-on') return addServerEntry(draft, entry.kind, entry.body)
  return addServerEntry(draft, entry.kind, entry.body)
}

const keysOf = ({ raise, passOn, over }: AlertsDue) => new Set([...raise.map(item => item.key), ...passOn.map(item => item.key), ...over])

/** A closed record takes no more entries: its alerts end beside it. */
async function closeAlerts({ db, state, now }: Draft): Promise<void> {
  await db.update(alerts).set({ overAt: new Date(now) }).where(and(eq(alerts.outageId, state.id), isNull(alerts.overAt)))
}
