import { inArray } from 'drizzle-orm'
import postgres from 'postgres'
import { outages, people, siteAccess } from '../../database/schema'
import type { Database } from '../database'
import { databaseUrl, useDatabase } from '../database'
import type { Access } from './hub'
import { WatchHub } from './hub'
import { WATCH_CHANNEL } from './wake'

/** How often the accounts and sites of those who watch are looked at, ms: what changed ends a stream within two seconds. */
const CHECK_MS = 1000
/** How often a stream says that it lives, ms. */
const BEAT_MS = 15_000

/** Wake-ups written in one turn of the process: far under what may wait for a reader. */
const ROWS_A_TURN = 100

interface Listening { hub: WatchHub, stop: () => Promise<void> }

let listening: Listening | null = null

/** The streams of this server; from the first one on it listens for changes. */
export function useWatchHub(): WatchHub {
  listening ??= listen(useDatabase())
  return listening.hub
}

/** Ends every stream of this server, and the connection on which it listens. */
export async function closeWatch(): Promise<void> {
  const { hub, stop } = listening ?? {}
  listening = null
  hub?.endAll()
  await stop?.()
}

function listen(db: Database): Listening {
  const hub = new WatchHub()
  // A connection of its own: one of the pool would be taken away by other queries.
  const client = postgres(databaseUrl(), { max: 1, onnotice: () => {}, connect_timeout: 5 })
  let heard = new Set<string>()
  let reading = false
  async function tell(): Promise<void> {
    reading = true
    while (heard.size > 0) {
      const ids = [...heard]
      heard = new Set()
      await wakeAll(db, hub, ids).catch(() => hub.pullAll())
    }
    reading = false
  }
  void client.listen(WATCH_CHANNEL, (id) => {
    if (hub.size === 0) return
    heard.add(id)
    if (!reading) void tell()
  }, () => hub.pullAll()).catch(() => undefined)
  const check = setInterval(() => { if (hub.size > 0) void readAccess(db, hub.people()).then(access => hub.check(access), () => undefined) }, CHECK_MS)
  const beat = setInterval(() => hub.beat(Date.now()), BEAT_MS)
  return {
    hub,
    stop: async () => {
      clearInterval(check)
      clearInterval(beat)
      await client.end({ timeout: 1 })
    },
  }
}

const UUID = /^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/

/** Where outages stand, read once for all who are told. */
async function wakeAll(db: Database, hub: WatchHub, ids: string[]): Promise<void> {
  const rows = await db.select({ id: outages.id, site: outages.siteId, seq: outages.size, phase: outages.phase }).from(outages).where(inArray(outages.id, ids.filter(id => UUID.test(id))))
  for (const [place, { id, site, seq, phase }] of rows.entries()) {
    hub.wake(site, { outage: id, seq, phase })
    // What was written leaves the process only between turns: a reader that keeps up must not seem to stall.
    if (place % ROWS_A_TURN === ROWS_A_TURN - 1) await new Promise(resolve => setImmediate(resolve))
  }
}

/** What people may see now; somebody who is switched off is not among them. */
export async function readAccess(db: Database, ids: string[]): Promise<Map<string, Access>> {
  if (ids.length === 0) return new Map()
  const [rows, sites] = await Promise.all([
    db.select({ id: people.id, role: people.role, sessionVersion: people.sessionVersion, disabledAt: people.disabledAt }).from(people).where(inArray(people.id, ids)),
    db.select().from(siteAccess).where(inArray(siteAccess.personId, ids)),
  ])
  return new Map(rows.filter(row => row.disabledAt === null).map(({ id, role, sessionVersion }) => [id, {
    sessionVersion,
    sites: role === 'administrator' ? null : sites.filter(site => site.personId === id).map(site => site.siteId),
  }]))
}
