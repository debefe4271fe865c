import { sql } from 'drizzle-orm'
import { useDatabase } from '~~/server/utils/database'
import { isReady } from '~~/server/utils/ready'

const PATIENCE_MS = 2000

/** Ready and the database answers: 200; else 503. */
export default defineEventHandler(async (event) => {
  const database = isReady() && await answers()
  if (!database) setResponseStatus(event, 503)
  setResponseHeader(event, 'cache-control', 'no-store')
  return { status: database ? 'ok' : isReady() ? 'database away' : 'starting', time: new Date().toISOString() }
})

async function answers(): Promise<boolean> {
  const late = new Promise<boolean>(resolve => setTimeout(() => resolve(false), PATIENCE_MS).unref())
  return Promise.race([useDatabase().execute(sql`select 1`).then(() => true, () => false), late])
}
