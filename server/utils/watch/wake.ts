import { sql } from 'drizzle-orm'
import type { Database } from '../database'

/** The channel on which servers tell each other that an outage has changed; the payload is its id. */
export const WATCH_CHANNEL = 'holdover_watch'
/** Between two notifications of one server lies at least this, so that a busy moment makes one of them, ms. */
const APART_MS = 10

interface Waiting { db: Database, outages: Set<string> }

let waiting: Waiting | null = null
let busy = false

/**
 * Tells every server that an outage has changed. Called after the commit, never within a transaction: there a
 * notification is a lock in the order of all commits. Nobody waits for it; one that is lost is made good by the
 * pull that screens make now and then.
 */
export function wakeWatch(db: Database, outage: string): void {
  waiting ??= { db, outages: new Set() }
  waiting.outages.add(outage)
  if (!busy) void notifyAll()
}

async function notifyAll(): Promise<void> {
  busy = true
  while (waiting) {
    const { db, outages } = waiting
    waiting = null
    const ids = sql.join([...outages].map(id => sql`(${id})`), sql`, `)
    try {
      await db.execute(sql`select pg_notify(${WATCH_CHANNEL}, id) from (values ${ids}) as told (id)`)
    } catch {
      // The database is away: so are the screens' pulls, which ask again by themselves.
    }
    await new Promise(resolve => setTimeout(resolve, APART_MS))
  }
  busy = false
}
