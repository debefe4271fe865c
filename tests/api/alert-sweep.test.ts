/**
 * Looking for alerts against a real database: nothing is lost and nothing doubled, wherever whoever looks is killed.
 * Promises of this project's own; no published source.
 */
import { randomBytes } from 'node:crypto'
import { fileURLToPath } from 'node:url'
import { and, asc, eq } from 'drizzle-orm'
import { drizzle } from 'drizzle-orm/postgres-js'
import { migrate } from 'drizzle-orm/postgres-js/migrator'
import postgres from 'postgres'
import { createStorage } from 'unstorage'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { dropDatabase, makeDatabase } from '../../scripts/lib/postgres.mjs'
import { seedDemo } from '../../server/database/seed'
import * as schema from '../../server/database/schema'
import { acknowledgeAlert } from '../../server/utils/alerts/acknowledge'
import { rebuildAlerts } from '../../server/utils/alerts/keep'
import { lookForAlerts, sweepAlerts } from '../../server/utils/alerts/sweep'
import type { Database } from '../../server/utils/database'
import { connect } from '../../server/utils/database'
import { readEntries } from '../../server/utils/record/log'
import { foldLog } from '../../shared/record/fold'
import type { OutageState } from '../../shared/record/state'
import { PLAIN_ALERT_RULES } from '../../shared/schemas/alert-rules'

const MINUTE = 60_000
const { alerts, alertTold, mails, outages, people, sites } = schema
const SEEDED = Date.UTC(2026, 10, 3, 15, 0)
const name = `holdover_test_${randomBytes(6).toString('hex')}`
const admin = process.env.TEST_DATABASE_ADMIN_URL ?? ''
const url = admin && Object.assign(new URL(admin), { pathname: `/${name}` }).href
let one: ReturnType<typeof connect>
let two: ReturnType<typeof connect>
let db: Database
/** the outage that is dark in the demo */
let outage: { id: string, siteId: string }

beforeAll(async () => {
  process.env.HOLDOVER_SERVER_KEY = randomBytes(32).toString('base64url')
  process.env.HOLDOVER_SMTP_URL = 'smtp://127.0.0.1:1'
  process.env.NUXT_AUTH_SECRET = randomBytes(32).toString('base64url')
  await makeDatabase(admin, name)
  one = connect(url, 3)
  two = connect(url, 3)
  db = one.db
  await migrate(db, { migrationsFolder: fileURLToPath(new URL('../../server/database/migrations', import.meta.url)) })
  await seedDemo(db, SEEDED, createStorage())
  const [row] = await db.select({ id: outages.id, siteId: outages.siteId }).from(outages).where(eq(outages.phase, 'dark'))
  outage = row!
}, 120_000)
afterAll(async () => {
  await one?.client.end()
  await two?.client.end()
  if (admin) await dropDatabase(admin, name)
})

const state = async (): Promise<OutageState> => foldLog(outage.id, await readEntries(db, outage.id))
const raisedIn = async () => (await readEntries(db, outage.id)).filter(stored => stored.entry.kind === 'alert-raised').map(stored => (stored.entry.body as { key: string }).key)
const alertMails = () => db.select().from(mails).where(and(eq(mails.kind, 'alert'), eq(mails.outageId, outage.id))).orderBy(asc(mails.id))
const everything = async () => JSON.stringify([(await readEntries(db, outage.id)).length, await db.select().from(alerts), await db.select().from(alertTold), await alertMails()])

/** A database on which the query of a number fails, as it does for whoever is killed there. */
function killedAt(query: number): { db: Database, end: () => Promise<void>, asked: () => number } {
  let asked = 0
  const client = postgres(url, { max: 1, onnotice: () => {} })
  const logger = { logQuery() { if (++asked === query) throw new Error('killed') } }
  return { db: drizzle(client, { schema, casing: 'snake_case', logger }) as unknown as Database, end: () => client.end(), asked: () => asked }
}

describe('whoever looks is killed', () => {
  it('at every query: nothing is written until all of it is, then each alert once, with its mails', async () => {
    const now = SEEDED + 40 * MINUTE
    const before = await everything()
    let queries = 0
    for (let query = 1; ; query++) {
      const killed = killedAt(query)
      const failed = await lookForAlerts(killed.db, outage.id, now).then(() => false, () => true)
      queries = killed.asked()
      await killed.end()
      if (!failed) break
      expect(await everything()).toBe(before)
    }
    expect(queries).toBeGreaterThan(10)
    const keys = await raisedIn()
    expect(keys.length).toBeGreaterThan(3)
    expect(new Set(keys).size).toBe(keys.length)
    // Killed after it had committed, its run is done again: there is nothing left to do.
    const after = await everything()
    expect(await lookForAlerts(db, outage.id, now)).toBe(false)
    expect(await everything()).toBe(after)
  }, 60_000)

  it('and two look at once: one does it, the other finds nothing to do', async () => {
    for (let minutes = 45; minutes <= 120; minutes += 5) {
      const now = SEEDED + minutes * MINUTE
      await Promise.all([sweepAlerts(one.db, now), sweepAlerts(two.db, now), sweepAlerts(one.db, now), lookForAlerts(two.db, outage.id, now)])
    }
    const keys = await raisedIn()
    expect(new Set(keys).size).toBe(keys.length)
    const told = await db.select().from(alertTold).where(eq(alertTold.outageId, outage.id))
    expect(told.every(row => row.mailedAt !== null)).toBe(true)
    // Everybody who stands in the log as told has exactly one line of it in a mail.
    const { alerts: known } = await state()
    const texts = await alertMails()
    for (const row of told) {
      const words = known.find(alert => alert.key === row.key)!.words
      const [person] = await db.select().from(people).where(eq(people.id, row.personId))
      const mine = texts.filter(mail => mail.personId === row.personId).map(mail => mail.text).join('\n')
      expect(known.find(alert => alert.key === row.key)!.to).toContain(person!.name)
      expect(mine).toContain(words.replace(/^[^:]+: /, ''))
    }
    expect(told).toHaveLength(known.reduce((sum, alert) => sum + alert.to.length, 0))
  }, 60_000)
})

describe('what stands beside the log', () => {
  it('is what the log says, and is made anew from it', async () => {
    const rows = () => db.select().from(alerts).where(eq(alerts.outageId, outage.id)).orderBy(asc(alerts.key))
    const before = await rows()
    const folded = await state()
    expect(before.map(row => [row.key, row.level, row.overAt?.getTime() ?? null])).toEqual(folded.alerts.map(alert => [alert.key, alert.level, alert.over]).sort((a, b) => String(a[0]) < String(b[0]) ? -1 : 1))
    await rebuildAlerts(db, folded)
    expect(await rows()).toEqual(before)
  })
})

describe('mails', () => {
  it('of one outage within a minute go as one to each, the first at once', async () => {
    const now = SEEDED + 200 * MINUTE
    const [before] = [await alertMails()]
    await db.update(sites).set({ alertRules: { levels: [{ answerable: false, supervisors: true, people: [] }, ...PLAIN_ALERT_RULES.levels.slice(1)], passOnAfter: [5, 10] } }).where(eq(sites.id, outage.siteId))
    const { alerts: open } = await state()
    // Something new at each of three looks within the minute: what was told is taken out beside the log, as if it were to be told again.
    const keys = open.slice(0, 3).map(alert => alert.key)
    const [supervisor] = await db.select().from(people).where(eq(people.role, 'supervisor'))
    const tell = (key: string, at: number) => db.insert(alertTold).values({ outageId: outage.id, key, personId: supervisor!.id, toldAt: new Date(at) }).onConflictDoUpdate({ target: [alertTold.outageId, alertTold.key, alertTold.personId], set: { toldAt: new Date(at), mailedAt: null } })
    await lookForAlerts(db, outage.id, now - 10 * MINUTE)
    const settled = (await alertMails()).length
    await tell(keys[0]!, now)
    await lookForAlerts(db, outage.id, now)
    await tell(keys[1]!, now + 20_000)
    await lookForAlerts(db, outage.id, now + 20_000)
    await tell(keys[2]!, now + 40_000)
    await lookForAlerts(db, outage.id, now + 40_000)
    const mine = async () => (await alertMails()).slice(settled).filter(mail => mail.personId === supervisor!.id && mail.createdAt.getTime() < now + 2 * MINUTE)
    expect(await mine()).toHaveLength(1)
    await lookForAlerts(db, outage.id, now + 60_000)
    const both = await mine()
    expect(both).toHaveLength(2)
    for (const key of keys.slice(1)) expect(both[1]!.text).toContain(open.find(alert => alert.key === key)!.words.replace(/^[^:]+: /, ''))
    expect(before.length).toBeLessThan(settled + 2)
  }, 30_000)

  it('say site, what and what to do in their first line and subject, and lead to the outage', async () => {
    const [first] = await alertMails()
    const [site] = await db.select().from(sites).where(eq(sites.id, outage.siteId))
    expect(first!.subject.startsWith(`${site!.name}: `)).toBe(true)
    expect(first!.text.split('\n')[0]).toMatch(new RegExp(`^${site!.name}: .+\\.$`))
    expect(first!.text).toContain(`/outages/${outage.id}`)
    expect(first!.html).not.toMatch(/<img|src=/)
  })
})

describe('acknowledging', () => {
  it('counts the first one, stands in the record, and stops what would go on', async () => {
    const [juno, sabine] = await db.select().from(people).orderBy(asc(people.createdAt), asc(people.name))
    const person = (row: typeof people.$inferSelect) => ({ id: row.id, name: row.name, email: row.email, role: row.role, mustChangePassword: false })
    const now = SEEDED + 300 * MINUTE
    const open = (await state()).alerts.find(alert => alert.over === null && alert.acknowledged === null)!
    const first = await acknowledgeAlert(db, person(juno!), outage.id, open.key, now)
    expect(first).toEqual({ key: open.key, name: juno!.name, at: new Date(now).toISOString() })
    expect(await acknowledgeAlert(db, person(sabine!), outage.id, open.key, now + MINUTE)).toEqual(first)
    await lookForAlerts(db, outage.id, now + 60 * MINUTE)
    expect((await state()).alerts.find(alert => alert.key === open.key)).toMatchObject({ level: open.level, acknowledged: { name: juno!.name, at: now } })
    await expect(acknowledgeAlert(db, person(juno!), outage.id, 'overrun nothing 9', now)).rejects.toMatchObject({ statusCode: 404 })
  })
})

describe('quiet', () => {
  it('after the seal, however long', async () => {
    const [sealed] = await db.select({ id: outages.id, size: outages.size }).from(outages).where(eq(outages.phase, 'sealed'))
    await sweepAlerts(db, SEEDED + 5000 * MINUTE)
    expect(await lookForAlerts(db, sealed!.id, SEEDED + 5000 * MINUTE)).toBe(false)
    expect((await db.select({ size: outages.size }).from(outages).where(eq(outages.id, sealed!.id)))[0]!.size).toBe(sealed!.size)
  })
})
