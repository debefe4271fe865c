// The list of records at 20,000 outages and 1,000,000 entries beside the same at a hundredth of them: what it takes, and
// how many pages of the database it touches.
import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { eq } from 'drizzle-orm'
import { migrate } from 'drizzle-orm/postgres-js/migrator'
import { createStorage } from 'unstorage'
import { makeDatabase, startPostgres } from '../scripts/lib/postgres.mjs'
import { closeAll, closeOnSignals } from '../scripts/lib/processes.mjs'
import { entries, people } from '~~/server/database/schema'
import { seedDemo } from '~~/server/database/seed'
import { LARGEST, NEEDLE, seedLarge } from '~~/server/database/seed/large'
import { listRecords } from '~~/server/utils/records/list'
import { RECORD_SORTS, recordQuerySchema } from '~~/shared/schemas/record-filter'
import { openListening } from '../tests/support/buffers'
import type { Touched } from '../tests/support/buffers'

const HUNDREDTH = LARGEST / 100
const BATCHES = 25
const SEARCHES: Record<string, Record<string, string>> = {
  ...Object.fromEntries(RECORD_SORTS.map(sort => [sort, { sort }])),
  'common words': { words: 'lot 3' },
  'a rare word': { words: NEEDLE.word },
  'a common tag': { tag: 'C-1' },
  'an outcome': { outcome: 'discard' },
  'an outcome, longest without control first': { outcome: 'discard', sort: 'longest-dark' },
  'a tag of few, shortest hold first': { tag: NEEDLE.tag, sort: 'shortest-hold' },
}

/** `ms` of the whole request, the median; pages touched for the rows and their names, and for the count, which stops at 1,001 rows. */
interface Measured { ms: number, pages: number, pagesOfCount: number }

const isCount = (sql: string) => sql.startsWith('select count(*)')
const pagesOf = (touched: Touched[]) => touched.reduce((sum, { pages }) => sum + pages, 0)

closeOnSignals(130)
const room = await mkdtemp(join(tmpdir(), 'holdover-bench-'))
try {
  process.env.HOLDOVER_SERVER_KEY = Buffer.alloc(32, 7).toString('base64url')
  const postgres = await startPostgres(room, { settings: { fsync: 'off', synchronous_commit: 'off', full_page_writes: 'off' } })
  await makeDatabase(postgres.urlOf('postgres'), 'bench')
  const listening = openListening(postgres.urlOf('bench'))
  const { db } = listening
  await migrate(db, { migrationsFolder: 'server/database/migrations' })
  const now = Date.now()
  await seedDemo(db, now, createStorage())
  const [auditor] = await db.select().from(people).where(eq(people.email, 'auditor@quillfeather.example'))

  async function measure(): Promise<Record<string, Measured>> {
    const measured: Record<string, Measured> = {}
    for (const [name, search] of Object.entries(SEARCHES)) {
      const query = recordQuerySchema.parse(search)
      const times: number[] = []
      for (let batch = -1; batch < BATCHES; batch++) {
        const began = performance.now()
        await listRecords(auditor!, query, db)
        if (batch >= 0) times.push(performance.now() - began)
      }
      const touched = await listening.touchedBy(of => listRecords(auditor!, query, of))
      measured[name] = { ms: Number(times.sort((a, b) => a - b)[BATCHES >> 1]!.toFixed(2)), pages: pagesOf(touched.filter(({ sql }) => !isCount(sql))), pagesOfCount: pagesOf(touched.filter(({ sql }) => isCount(sql))) }
    }
    return measured
  }

  await seedLarge(db, HUNDREDTH, now)
  const small = await measure()
  const began = performance.now()
  await seedLarge(db, LARGEST, now)
  const seeded = (performance.now() - began) / 1000
  const large = await measure()
  const count = await db.$count(entries)
  await listening.client.end()
  process.stdout.write(`${JSON.stringify({
    name: `a page of the newest records, with its count, of ${LARGEST} outages and ${count} entries`,
    ratio: Number((large.newest!.ms / small.newest!.ms).toFixed(2)),
    baseline: `the same of ${HUNDREDTH} outages, in the same database before it grew`,
    secondsToSeed: Math.round(seeded),
    searches: Object.fromEntries(Object.keys(SEARCHES).map(name => [name, { ...large[name]!, ofAHundredth: small[name], ratio: Number((large[name]!.ms / small[name]!.ms).toFixed(2)) }])),
  })}\n`)
} finally {
  await closeAll()
  await rm(room, { recursive: true, force: true })
}
