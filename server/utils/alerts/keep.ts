import { eq, sql } from 'drizzle-orm'
import type { AlertState, OutageState } from '../../../shared/record/state'
import { alerts } from '../../database/schema'
import type { Queries } from '../database'

const date = (at: number | null) => at === null ? null : new Date(at)

/** Writes alerts beside the log as its fold has them. @param keys which ones; all where left out */
export async function keepAlerts(db: Queries, state: OutageState, keys?: ReadonlySet<string>): Promise<void> {
  const rows = state.alerts.filter(alert => keys === undefined || keys.has(alert.key)).map(alert => rowOf(state.id, alert))
  if (rows.length === 0) return
  await db.insert(alerts).values(rows).onConflictDoUpdate({
    target: [alerts.outageId, alerts.key],
    set: { level: sql`excluded.level`, toNames: sql`excluded.to_names`, acknowledgedName: sql`excluded.acknowledged_name`, acknowledgedAt: sql`excluded.acknowledged_at`, overAt: sql`excluded.over_at` },
  })
}

/** Takes the alerts of a log that are kept beside it, and writes them anew. */
export async function rebuildAlerts(db: Queries, state: OutageState): Promise<void> {
  await db.delete(alerts).where(eq(alerts.outageId, state.id))
  await keepAlerts(db, state)
}

function rowOf(outageId: string, { key, alert, level, words, to, mark, acknowledged, over }: AlertState): typeof alerts.$inferInsert {
  return { outageId, key, alert, level, words, toNames: to, raisedAt: new Date(mark.at), acknowledgedName: acknowledged?.name ?? null, acknowledgedAt: date(acknowledged?.at ?? null), overAt: date(over) }
}
