// Two servers on one database, each of which decides pushes upon folds that it holds; rules of this project, no published source.
import { randomBytes } from 'node:crypto'
import { eq, sql } from 'drizzle-orm'
import { migrate } from 'drizzle-orm/postgres-js/migrator'
import { afterAll, beforeAll, beforeEach, describe, expect, it, vi } from 'vitest'
import { dropDatabase, makeDatabase } from '../../scripts/lib/postgres.mjs'
import { devices, entries, outages, people, siteAccess } from '../../server/database/schema'
import { lookForAlerts } from '../../server/utils/alerts/sweep'
import { connect } from '../../server/utils/database'
import { appendEntries } from '../../server/utils/record/append'
import { readEntries, readState } from '../../server/utils/record/log'
import { canonicalText } from '../../shared/record/canonical'
import { isoTime } from '../../shared/record/entry'
import { foldLog } from '../../shared/record/fold'
import { logRoot } from '../../shared/record/merkle'
import type { Device, PushWorld } from '../support/push-world'
import { pushWorld } from '../support/push-world'
import { seeded } from '../support/seeded'

const NAME = `holdover_test_${randomBytes(6).toString('hex')}`
const ADMIN = process.env.TEST_DATABASE_ADMIN_URL!
let servers: ReturnType<typeof connect>[]
let world: PushWorld
let outage: string

beforeAll(async () => {
  process.env.HOLDOVER_SERVER_KEY = Buffer.alloc(32, 7).toString('base64url')
  await makeDatabase(ADMIN, NAME)
  const url = Object.assign(new URL(ADMIN), { pathname: `/${NAME}` }).href
  servers = [connect(url, 4), connect(url, 4)]
  await migrate(servers[0]!.db, { migrationsFolder: 'server/database/migrations' })
  world = await pushWorld(servers[0]!.db, 4, 12)
}, 60_000)
afterAll(async () => {
  await Promise.all(servers.map(({ client }) => client.end()))
  await dropDatabase(ADMIN, NAME)
})
beforeEach(() => { outage = world.outages.pop()! })

const push = (server: number, device: Device, items = device.sign(outage, 1), now = world.now) => appendEntries(servers[server]!.db, device.person, outage, items, now)
const statuses = async (answer: ReturnType<typeof push>) => (await answer).results.map(result => result.status === 'refused' ? result.code : result.status)

/** The log is whole, and what either server reads of the outage is what it folds to. */
async function expectWhole(): Promise<void> {
  const { db } = servers[0]!
  const log = await readEntries(db, outage)
  const [row] = await db.select().from(outages).where(eq(outages.id, outage))
  expect(log.map(stored => stored.seq)).toEqual(log.map((_, index) => index + 1))
  expect(row).toMatchObject({ size: log.length, checkpoint: { statement: { size: log.length, root: logRoot(log) } } })
  expect(canonicalText(await readState(db, row!))).toBe(canonicalText(foldLog(outage, log)))
}

describe('a server that holds the fold of an outage', () => {
  it('takes what follows by one statement, without a transaction of several', async () => {
    const [device] = world.devices
    await push(0, device!)
    const transaction = vi.spyOn(servers[0]!.db, 'transaction')
    for (let count = 1; count <= 60; count += 20) expect(await statuses(push(0, device!, device!.sign(outage, count)))).toEqual(Array.from({ length: count }, () => 'accepted'))
    expect(transaction).not.toHaveBeenCalled()
    transaction.mockRestore()
    await expectWhole()
  })

  it('answers what was sent before as the first time, whichever server took it', async () => {
    const [device] = world.devices
    const items = device!.sign(outage, 3)
    const { results } = await push(0, device!, items)
    expect((await push(0, device!, items)).results).toEqual(results)
    expect((await push(1, device!, items)).results).toEqual(results)
    const more = device!.sign(outage, 1)
    const [last] = (await push(0, device!, [...items, ...more])).results.slice(-1)
    expect(last).toMatchObject({ id: more[0]!.entry.id, status: 'accepted' })
    await expectWhole()
  })

  it('goes on from what the other one has stored meanwhile', async () => {
    const random = seeded(5)
    for (let turn = 0; turn < 60; turn += 1) {
      const device = world.devices[Math.floor(random() * 4)]!
      const items = random() < 0.2 ? [device.write(outage, 'control-lost', { lostAt: isoTime(world.now), words: 'It went off.' })] : device.sign(outage, 1 + Math.floor(random() * 3))
      expect((await push(Math.floor(random() * 2), device, items)).results.every(result => result.status !== 'refused')).toBe(true)
    }
    await expectWhole()
  })

  it('stores every entry once when both are pushed to at the same time', async () => {
    for (const [index, device] of world.devices.entries()) await push(index % 2, device)
    const all = await Promise.all(world.devices.map(async (device, index) => {
      const answers: string[] = []
      for (let turn = 0; turn < 15; turn += 1) answers.push(...(await statuses(push((index + turn) % 2, device, device.sign(outage, 2)))).map(String))
      return answers
    }))
    expect(new Set(all.flat())).toEqual(new Set(['accepted']))
    expect((await readEntries(servers[0]!.db, outage)).filter(({ entry }) => entry.kind === 'note-added')).toHaveLength(4 * 31)
    await expectWhole()
  })

  it('goes on from what a look for alerts has entered', async () => {
    const [device] = world.devices
    await push(0, device!)
    await push(1, device!, [device!.write(outage, 'control-lost', { lostAt: isoTime(world.now), words: 'It went off.' })])
    expect(await lookForAlerts(servers[0]!.db, outage, world.now + 5 * 3_600_000)).toBe(true)
    expect(await statuses(push(1, device!))).toEqual(['accepted'])
    expect(await statuses(push(0, device!))).toEqual(['accepted'])
    await expectWhole()
  })
})

describe('what was true when the fold was held, and is no more', () => {
  it('a device that is revoked signs nothing more', async () => {
    const device = world.devices[3]!
    await push(0, device)
    await servers[1]!.db.update(devices).set({ revokedAt: new Date(world.now - 1000) }).where(eq(devices.id, device.id))
    const items = device.sign(outage, 1)
    expect(await statuses(push(0, device, items))).toEqual([403])
    await servers[1]!.db.update(devices).set({ revokedAt: null }).where(eq(devices.id, device.id))
    expect(await statuses(push(0, device, items))).toEqual(['accepted'])
    await expectWhole()
  })

  it('somebody who may not see the site any more does not find the outage', async () => {
    const [device] = world.devices
    await push(0, device!)
    const mine = await servers[1]!.db.delete(siteAccess).where(eq(siteAccess.personId, device!.person.id)).returning()
    const items = device!.sign(outage, 1)
    await expect(push(0, device!, items)).rejects.toMatchObject({ statusCode: 404 })
    await servers[1]!.db.insert(siteAccess).values(mine)
    expect(await statuses(push(0, device!, items))).toEqual(['accepted'])
    await expectWhole()
  })

  it('a printed name that has changed is entered first', async () => {
    const [device] = world.devices
    await push(0, device!)
    const { id, name } = device!.person
    await servers[1]!.db.update(people).set({ name: 'Another Name' }).where(eq(people.id, id))
    await appendEntries(servers[0]!.db, { ...device!.person, name: 'Another Name' }, outage, device!.sign(outage, 1), world.now)
    await servers[1]!.db.update(people).set({ name }).where(eq(people.id, id))
    expect((await readEntries(servers[0]!.db, outage)).slice(-2).map(({ entry }) => entry.kind)).toEqual(['signer-named', 'note-added'])
    await expectWhole()
  })

  it('an id that another outage holds, or refused, is not taken', async () => {
    const [device] = world.devices
    const other = world.outages.pop()!
    const there = [...device!.sign(other, 1), device!.write(other, 'plan-approved', { note: '' })]
    const { results } = await appendEntries(servers[1]!.db, device!.person, other, there, world.now)
    expect(results.map(result => result.status)).toEqual(['accepted', 'refused'])
    for (const [index, { entry: { id } }] of there.entries()) {
      const phone = world.devices[index + 1]!
      await push(0, phone)
      expect(await statuses(push(0, phone, [phone.write(outage, 'note-added', { words: 'An id again.' }, id)]))).toEqual([409])
    }
    await expectWhole()
  })

  it('a log that was put back and went on otherwise is not taken for the one that was held', async () => {
    const [first, second, third] = world.devices
    for (const device of [first, second, third]) await push(0, device!)
    const { db } = servers[1]!
    const [row] = await db.select().from(outages).where(eq(outages.id, outage))
    await push(0, second!)
    await db.transaction(async (tx) => {
      await tx.execute(sql`set local session_replication_role = replica`)
      await tx.delete(entries).where(sql`outage_id = ${outage} and seq > ${row!.size}`)
      await tx.update(outages).set(row!).where(eq(outages.id, outage))
    })
    expect(await statuses(push(1, first!))).toEqual(['accepted'])
    // As long as the log that was held, and another one.
    expect(await statuses(push(0, third!))).toEqual(['accepted'])
    expect(await statuses(push(0, second!))).toEqual([409])
    await expectWhole()
  })
})
