import { and, asc, desc, eq, inArray, sql } from 'drizzle-orm'
import type { WatchAnswer, WatchOutage } from '../../../shared/schemas/watch'
import { WATCH_MAX, WATCHED_PHASES } from '../../../shared/schemas/watch'
import { outages } from '../../database/schema'
import type { Person } from '../access'
import { visibleSites } from '../access'
import type { Database } from '../database'
import { readState } from '../record/log'
import { watchSummary } from './summary'

/** Forecasts drift a little with the time alone: an unchanged outage is summed up anew after this, ms. */
const FRESH_MS = 60_000
/** Summaries that this server keeps. */
const KEPT_MAX = 2000

interface Kept { seq: number, at: number, summary: Promise<WatchOutage> }

/** Many screens ask for the same outage in the same moment: it is read and summed up once. */
const kept = new Map<string, Kept>()

export interface PullAsked {
  /** outages that the screen has, each with the seq that it knows */
  known: Record<string, number>
  /** only these are asked for */
  only?: string[]
}

/** What a person's watch shows, as far as it has changed; outages without control first. @param now Unix ms */
export async function pullWatch(db: Database, person: Person, { known, only }: PullAsked, now: number): Promise<WatchAnswer> {
  const visible = await visibleSites(person, db)
  if (visible?.length === 0 || only?.length === 0) return { now, items: [], ids: [], more: false }
  const rows = await db.select({ id: outages.id, seq: outages.size }).from(outages).where(and(
    inArray(outages.phase, [...WATCHED_PHASES]),
    visible ? inArray(outages.siteId, visible) : undefined,
    only ? inArray(outages.id, only) : undefined,
  )).orderBy(desc(sql`${outages.phase} = 'dark'`), desc(outages.openedAt), asc(outages.id)).limit(WATCH_MAX + 1)
  const shown = rows.slice(0, WATCH_MAX)
  const items = await Promise.all(shown.filter(row => known[row.id] !== row.seq).map(row => summed(db, row, now)))
  return { now, items: items.filter(item => item !== null), ids: shown.map(row => row.id), more: rows.length > WATCH_MAX }
}

/** The summary of an outage at a seq or later; null where it is gone meanwhile. */
async function summed(db: Database, { id, seq }: { id: string, seq: number }, now: number): Promise<WatchOutage | null> {
  const held = kept.get(id)
  if (held && held.seq >= seq && now - held.at < FRESH_MS) return held.summary.catch(() => null)
  const summary = sumUp(db, id, now)
  kept.delete(id)
  kept.set(id, { seq, at: now, summary })
  if (kept.size > KEPT_MAX) kept.delete(kept.keys().next().value!)
  // An answer that failed is not kept for others.
  summary.catch(() => { if (kept.get(id)?.summary === summary) kept.delete(id) })
  return summary
}

async function sumUp(db: Database, id: string, now: number): Promise<WatchOutage> {
  const [row] = await db.select().from(outages).where(eq(outages.id, id))
  if (!row) throw new Error('the outage is gone')
  return watchSummary(await readState(db, row), now)
}
