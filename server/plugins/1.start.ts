import { existsSync } from 'node:fs'
import { dirname, join, resolve } from 'node:path'
import { sql } from 'drizzle-orm'
import { drizzle } from 'drizzle-orm/postgres-js'
import { migrate } from 'drizzle-orm/postgres-js/migrator'
import postgres from 'postgres'
import { seedDemo } from '~~/server/database/seed'
import { JOBS } from '~~/server/jobs'
import { closeQueue, openQueue } from '~~/server/jobs/queue'
import { closeDatabase, databaseUrl, isDatabaseAway, useDatabase } from '~~/server/utils/database'
import { mailSettingsFault } from '~~/server/utils/mail/settings'
import { isReady, markReady, untilReady } from '~~/server/utils/ready'
import { serverSigner } from '~~/server/utils/record/server-signer'
import { renewOldSearch } from '~~/server/utils/records/renew'

/** Any number that only this program uses: one node migrates and seeds at a time. */
const LOCK = 7_163_027

/** Migrates and seeds, then lets requests in. Nitro doesn't wait for plugins, so requests wait here. */
export default defineNitroPlugin((nitro) => {
  if (import.meta.prerender) return
  nitro.hooks.hook('request', async (event) => {
    if (!isReady() && !event.path.startsWith('/api/health')) await untilReady()
  })
  // Jobs first: they use the database.
  nitro.hooks.hook('close', async () => {
    await closeQueue()
    await closeDatabase()
  })
  answerAwayWith503(nitro)
  if (!useRuntimeConfig().authSecret) fail('NUXT_AUTH_SECRET is not set; the start command makes one')
  const fault = mailSettingsFault(process.env)
  if (fault) fail(fault)
  start().then(opened, error => fail(error instanceof Error ? `${error.message}${error.cause instanceof Error ? `: ${error.cause.message}` : ''}` : String(error)))
})

/** Lets requests in; lists that an older program left behind are brought up meanwhile. */
function opened(): void {
  markReady()
  renewOldSearch(useDatabase()).catch(error => console.error('The search of records is not up to date yet; the next start goes on with it.', error))
}

async function start(): Promise<void> {
  const client = postgres(databaseUrl(), { max: 1, onnotice: () => {} })
  try {
    const db = drizzle(client)
    await db.execute(sql`select pg_advisory_lock(${LOCK})`)
    await migrate(db, { migrationsFolder: migrationsFolder() })
    await openQueue(databaseUrl(), JOBS)
    await serverSigner(useDatabase())
    if (process.env.HOLDOVER_DEMO === '1') await seedDemo(useDatabase(), Date.now())
  } finally {
    await client.end({ timeout: 5 })
  }
}

/** Beside the built server, or in the source tree while developing. */
function migrationsFolder(): string {
  const built = join(dirname(resolve(process.argv[1] ?? '.')), 'server/migrations')
  const beside = join(dirname(resolve(process.argv[1] ?? '.')), 'migrations')
  return [built, beside].find(existsSync) ?? resolve('server/database/migrations')
}

/** A database that is away is 503 with words, not 500. */
function answerAwayWith503(nitro: { h3App: { options: { onError?: (error: never, event: never) => unknown } } }): void {
  const usual = nitro.h3App.options.onError as ((error: unknown, event: unknown) => unknown) | undefined
  nitro.h3App.options.onError = (error: unknown, event: unknown) => {
    if (isDatabaseAway(error)) Object.assign(error as object, { statusCode: 503, statusMessage: 'Service Unavailable', message: 'The database is away', unhandled: false, data: { reason: 'The database is away; nothing was lost, try again in a moment' } })
    return usual?.(error, event)
  }
}

function fail(reason: string): never {
  console.error(`Holdover cannot start. ${reason}`)
  process.exit(1)
}
