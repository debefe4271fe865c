/**
 * What the queries behind the screens touch does not grow with the years: from 200 outages and 10,000 entries, a
 * hundredth of the large database, to a fifth of it, and no query touches more than 1.2 times the pages.
 * (`npm run bench -- list` measures at the whole of it, 20,000 outages and 1,000,000 entries.) Promises of this project's own, no published source.
 *
 * Three allowances, all for what is no growth:
 * - an index over twenty times the rows is a level higher, so each way down one touches a page more;
 * - four pages;
 * - at the small size the whole table lies on 34 pages, and PostgreSQL rightly reads it whole rather than go by an
 *   index. That says nothing of growth, so a query is compared with the dearer of two ways at the small size: the
 *   chosen one, and the one along an index that every larger table makes it take.
 * A count stops at 1,001 rows but has only 200 to count at the small size: its pages are compared for each row.
 */
import { randomBytes } from 'node:crypto'
import { availableParallelism, loadavg } from 'node:os'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { eq, like, sql } from 'drizzle-orm'
import { migrate } from 'drizzle-orm/postgres-js/migrator'
import { createStorage } from 'unstorage'
import { dropDatabase, makeDatabase } from '../../scripts/lib/postgres.mjs'
import { seedDemo } from '../../server/database/seed'
import { NEEDLE, seedLarge } from '../../server/database/seed/large'
import { controllers, entries, outages, people, sites } from '../../server/database/schema'
import type { Person } from '../../server/utils/access'
import { findOutage } from '../../server/utils/outages'
import { listOutages } from '../../server/utils/record/list'
import { readEntries } from '../../server/utils/record/log'
import { listRecords } from '../../server/utils/records/list'
import { pullWatch } from '../../server/utils/watch/pull'
import { RECORD_SORTS, recordQuerySchema } from '../../shared/schemas/record-filter'
import type { Phase } from '../../shared/record/phases'
import { LIVE, OPEN_PHASES, RECORD_PHASES } from '../../app/utils/outage-list'
import { openListening } from '../support/buffers'
import type { Touched, Way } from '../support/buffers'

const SMALL = 200
/** A fifth of what `npm run seed:large` makes; HOLDOVER_LARGE=20000 asks the whole of it. */
const LARGE = Number(process.env.HOLDOVER_LARGE ?? 4000)
/** For a fifth. */
const SECONDS = 40
const MOST = 1.2
/** Pages, 32 kB: among so few a ratio says nothing. */
const FEW = 4

const adminUrl = process.env.TEST_DATABASE_ADMIN_URL!
const name = `holdover_test_${randomBytes(6).toString('hex')}`
let listening: ReturnType<typeof openListening>
let seconds = Infinity
const cast = {} as Record<'administrator' | 'auditor' | 'second', Person>
let ids: { site: string, controller: string, person: string, outage: string, long: string, day: string, nextDay: string }
/** Goes on by more than summaries of the watch are kept for. */
let clock = Date.now()
/** What each screen touched at the small size, by its name. */
const before = new Map<string, Record<Way, Touched[]>>()

const dayOf = (from: Date, days: number) => new Date(from.getTime() + days * 86_400_000).toISOString().slice(0, 10)

type Work = (db: typeof listening.db) => Promise<unknown>
const records = (who: keyof typeof cast, query: Record<string, unknown>): Work => db => listRecords(cast[who], recordQuerySchema.parse(query), db)
const list = (who: keyof typeof cast, phase: readonly Phase[], limit: number): Work => db => listOutages(cast[who], { phase: [...phase], limit }, Date.now(), db)

/** Four pages, each from where the one before ended. */
async function later(page: (after?: string) => Promise<{ next: string | null }>): Promise<void> {
  let after: string | undefined
  for (let count = 0; count < 4; count++) after = (await page(after)).next!
}

/** Not of the program: an order that no index gives. */
const GROWING = 'an order without an index'
const byNoIndex: Work = db => db.select({ id: outages.id }).from(outages).orderBy(outages.updatedAt).limit(26)

/** Every query that a screen asks, and what a search may combine; each finds a full page at both sizes, or the same few rows. */
function screens(): Record<string, Work> {
  const all: Record<string, Work> = {}
  const searches: Record<string, Record<string, unknown>> = {
    'everything': {}, 'common words': { words: 'lot 3' }, 'a rare word': { words: NEEDLE.word }, 'a common tag': { tag: 'C-1' }, 'a tag of some': { tag: 'SPARE-1' }, 'a tag of few': { tag: NEEDLE.tag },
    'a person': { person: ids.person }, 'a kind of work': { work: 'Software update' }, 'another kind of work': { work: 'Controller swap' }, 'a rare kind of work': { work: NEEDLE.work }, 'a phase': { phase: 'sealed' }, 'a rare phase': { phase: 'dark,plan' }, 'an outcome': { outcome: 'discard' }, 'a rare outcome': { outcome: NEEDLE.outcome },
    'two days': { from: ids.day, to: ids.nextDay }, 'much at once': { work: 'Software update', tag: 'C-1', outcome: 'late-rounds' },
  }
  for (const sort of RECORD_SORTS) {
    for (const [what, query] of Object.entries(searches)) {
      all[`records, all sites: ${what}, ${sort}`] = records('administrator', { ...query, sort })
      all[`records, an auditor: ${what}, ${sort}`] = records('auditor', { ...query, sort })
    }
    for (const [what, query] of Object.entries({ 'everything': {}, 'a common tag': { tag: 'C-1' } })) {
      all[`records, a few sites: ${what}, ${sort}`] = records('second', { ...query, sort, limit: 10 })
      all[`records, one site: ${what}, ${sort}`] = records('auditor', { ...query, site: ids.site, sort, limit: 10 })
      all[`records, a controller: ${what}, ${sort}`] = records('auditor', { ...query, controller: ids.controller, sort, limit: 10 })
    }
  }
  return {
    ...all,
    'records: a page later on': db => later(after => listRecords(cast.auditor, recordQuerySchema.parse({ after }), db)),
    'outages: a page later on': db => later(after => listOutages(cast.auditor, { phase: [], limit: 20, after }, Date.now(), db)),
    'a technician\'s first screen': list('second', OPEN_PHASES, 100),
    'a supervisor\'s first screen': list('auditor', [...OPEN_PHASES, 'submitted'], 100),
    'an auditor\'s first screen': list('auditor', RECORD_PHASES, 10),
    'an administrator\'s first screen': list('administrator', LIVE, 100),
    'the watch': db => pullWatch(db, cast.auditor, { known: {} }, clock += 120_000),
    'an outage': db => findOutage(cast.second, ids.outage, db),
    'its entries': db => readEntries(db, ids.outage, 0, 500),
    'the last entries of a long record': db => readEntries(db, ids.long, 200, 500),
  }
}

beforeAll(async () => {
  await makeDatabase(adminUrl, name)
  listening = openListening(Object.assign(new URL(adminUrl), { pathname: `/${name}` }).href)
  const { db } = listening
  process.env.HOLDOVER_SERVER_KEY ??= randomBytes(32).toString('base64url')
  await migrate(db, { migrationsFolder: 'server/database/migrations' })
  const now = Date.now()
  await seedDemo(db, now, createStorage())
  await seedLarge(db, SMALL, now)
  for (const [who, email] of Object.entries({ administrator: 'admin', auditor: 'auditor', second: 'technician2' })) {
    const [row] = await db.select().from(people).where(eq(people.email, `${email}@quillfeather.example`))
    cast[who as keyof typeof cast] = row!
  }
  const [controller] = await db.select({ id: controllers.id, site: controllers.siteId }).from(controllers).innerJoin(sites, eq(sites.id, controllers.siteId)).where(eq(sites.code, 'Q027'))
  const [person] = await db.select({ id: people.id }).from(people).where(eq(people.email, 'copied1@quillfeather.example'))
  const [first] = await db.select({ openedAt: outages.openedAt }).from(outages).where(like(outages.code, 'COPY-%')).orderBy(outages.code).limit(1)
  const ofPhase = async (phase: Phase) => (await db.select({ id: outages.id }).from(outages).innerJoin(sites, eq(sites.id, outages.siteId)).where(sql`${outages.phase} = ${phase} and ${like(outages.code, 'COPY-%')} and ${sites.code} in ('Q027', 'Q031')`).orderBy(outages.code).limit(1))[0]!.id
  ids = { site: controller!.site, controller: controller!.id, person: person!.id, outage: await ofPhase('called-off'), long: await ofPhase('sealed'), day: dayOf(first!.openedAt, 1), nextDay: dayOf(first!.openedAt, 2) }
  for (const [screen, work] of Object.entries({ ...screens(), [GROWING]: byNoIndex })) before.set(screen, { 'chosen': await listening.touchedBy(work), 'by index': await listening.touchedBy(work, 'by index') })
  const began = performance.now()
  await seedLarge(db, LARGE, now)
  seconds = (performance.now() - began) / 1000
}, 900_000)
afterAll(async () => {
  await listening?.client.end()
  await dropDatabase(adminUrl, name)
})

/** Queries of a screen that touch more than they may, in words; none where all is well. */
async function grown(screen: string, work: Work): Promise<string[]> {
  const small = before.get(screen)!
  const now = await listening.touchedBy(work)
  expect(now.length).toBe(small.chosen.length)
  expect(now.length).toBeGreaterThan(0)
  return now.flatMap(({ sql: text, pages, descents, counted }, index) => {
    const [chosen, byIndex] = [small.chosen[index]!, small['by index'][index]!]
    const may = MOST * Math.max(chosen.pages, byIndex.pages) * counted / chosen.counted + descents + FEW
    return pages <= may ? [] : [`${screen}: ${chosen.pages} (${byIndex.pages} by index) → ${pages} pages, ${descents} ways down, ${counted} counted: ${text.slice(0, 60)}`]
  })
}

describe('a fifth of the large database', () => {
  it('loads in time, with fifty entries an outage', async () => {
    const { db } = listening
    expect(await db.$count(outages)).toBeGreaterThanOrEqual(LARGE)
    expect(await db.$count(entries)).toBeGreaterThanOrEqual(LARGE * 50)
    // Where others wait for the processors too it may take as much longer.
    expect(seconds / Math.max(1, loadavg()[0]! / availableParallelism())).toBeLessThan(SECONDS * LARGE / 4000)
  })

  it('a query that does grow is found', async () => {
    expect(await grown(GROWING, byNoIndex)).toHaveLength(1)
  })

  it('no screen asks more of it', async () => {
    const faults: string[] = []
    for (const [screen, work] of Object.entries(screens())) faults.push(...await grown(screen, work))
    expect(faults).toEqual([])
  }, 120_000)
})
