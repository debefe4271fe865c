import { and, desc, eq, inArray, sql } from 'drizzle-orm'
import { z } from 'zod'
import { time } from '../../../shared/record/kinds/common'
import type { Phase } from '../../../shared/record/phases'
import { VOICE_MS } from '../../../shared/record/voice'
import type { OutagePage } from '../../../shared/schemas/outage-list'
import { controllers, legalHolds, outages, sites } from '../../database/schema'
import type { Person } from '../access'
import { visibleSites } from '../access'
import type { Queries } from '../database'
import { useDatabase } from '../database'
import { unprocessable } from '../errors'

export interface OutageFilter { phase: Phase[], site?: string, after?: string, limit: number }

/** A page of outages, newest first; `next` goes on from here, null at the end. @param now Unix ms */
export async function listOutages(person: Person, filter: OutageFilter, now: number, db: Queries = useDatabase()): Promise<OutagePage> {
  const visible = await visibleSites(person, db)
  if (visible?.length === 0 || (filter.site && visible && !visible.includes(filter.site))) return { items: [], next: null }
  // Which rows make the page is settled first, by an index alone: the fold that they carry is long.
  const best = db.select({ id: outages.id }).from(outages).where(and(
    visible ? inArray(outages.siteId, visible) : undefined,
    filter.site ? eq(outages.siteId, filter.site) : undefined,
    filter.phase.length > 0 ? inArray(outages.phase, filter.phase) : undefined,
    filter.after ? beyond(filter.after) : undefined,
  )).orderBy(desc(outages.openedAt), desc(outages.id)).limit(filter.limit + 1).as('best')
  const rows = await db.select({
    outage: {
      id: outages.id, code: outages.code, phase: outages.phase, planned: outages.planned, workKind: outages.workKind, pointsInHand: outages.pointsInHand,
      size: outages.size, openedAt: outages.openedAt, startsAt: outages.startsAt, darkAt: outages.darkAt, endedAt: outages.endedAt,
      held: sql<boolean>`exists (select 1 from ${legalHolds} where ${legalHolds.outageId} = ${outages.id} and ${legalHolds.liftedAt} is null)`,
      planSubmitted: sql<boolean>`${outages.state} -> 'planSubmitted' <> 'null'::jsonb`,
      voices: sql<number>`(select count(*)::int from jsonb_array_elements(coalesce(${outages.state} -> 'voices', '[]'::jsonb)) voice where voice -> 'answer' = 'null'::jsonb and voice ->> 'supervisor' = ${person.id})`,
      voicesLate: sql<number>`(select count(*)::int from jsonb_array_elements(coalesce(${outages.state} -> 'voices', '[]'::jsonb)) voice where voice -> 'answer' = 'null'::jsonb and (voice ->> 'givenAt')::numeric + ${VOICE_MS}::bigint < ${now}::bigint)`,
    },
    site: { id: sites.id, code: sites.code, name: sites.name, timeZone: sites.timeZone },
    controller: { id: controllers.id, name: controllers.name },
  }).from(outages).innerJoin(best, eq(best.id, outages.id)).innerJoin(sites, eq(sites.id, outages.siteId)).innerJoin(controllers, eq(controllers.id, outages.controllerId))
    .orderBy(desc(outages.openedAt), desc(outages.id))
  const page = rows.slice(0, filter.limit)
  const last = page.at(-1)?.outage
  return {
    items: page.map(({ outage, site, controller }) => ({ ...outage, site, controller, openedAt: outage.openedAt.toISOString(), startsAt: iso(outage.startsAt), darkAt: iso(outage.darkAt), endedAt: iso(outage.endedAt) })),
    next: rows.length > filter.limit && last ? `${last.openedAt.toISOString()}_${last.id}` : null,
  }
}

const iso = (date: Date | null) => date?.toISOString() ?? null

const placeSchema = z.tuple([time, z.string().uuid()])

/** Rows after a place that an earlier page ended at. */
function beyond(place: string) {
  const parsed = placeSchema.safeParse(place.split('_'))
  if (!parsed.success) return unprocessable('after', 'Give the "next" of an earlier page')
  const [at, id] = parsed.data
  return sql`(${outages.openedAt}, ${outages.id}) < (${at}::timestamptz, ${id}::uuid)`
}
