import { and, asc, desc, eq, inArray, isNull, sql } from 'drizzle-orm'
import { ALERT_WORDS } from '../../../shared/record/kinds/alerts'
import type { AlertList } from '../../../shared/schemas/alerts'
import { alerts, outages, sites } from '../../database/schema'
import type { Person } from '../access'
import { visibleSites } from '../access'
import type { Queries } from '../database'
import { ALERT_PHASES } from './due'

/** As many as a screen shows. */
const MOST = 100

/** Open alerts of the outages that a person may see, those that nobody has acknowledged first, the latest first. */
export async function listAlerts(db: Queries, person: Person): Promise<AlertList> {
  const visible = await visibleSites(person, db)
  if (visible?.length === 0) return { items: [], more: false }
  const rows = await db.select({ alert: alerts, code: outages.code, outage: outages.id, site: sites.name, timeZone: sites.timeZone })
    .from(alerts).innerJoin(outages, eq(outages.id, alerts.outageId)).innerJoin(sites, eq(sites.id, outages.siteId))
    .where(and(isNull(alerts.overAt), inArray(outages.phase, [...ALERT_PHASES]), visible ? inArray(outages.siteId, visible) : undefined))
    .orderBy(asc(sql`${alerts.acknowledgedAt} is not null`), desc(alerts.raisedAt), asc(alerts.outageId), asc(alerts.key)).limit(MOST + 1)
  const items = rows.slice(0, MOST).map(({ alert, ...about }) => ({
    ...about, key: alert.key, alert: alert.alert, title: ALERT_WORDS[alert.alert], words: alert.words, level: alert.level, to: alert.toNames, raisedAt: alert.raisedAt.getTime(),
    acknowledged: alert.acknowledgedAt && { name: alert.acknowledgedName ?? '', at: alert.acknowledgedAt.getTime() },
  }))
  return { items, more: rows.length > MOST }
}
