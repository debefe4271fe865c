// The watch on two built servers with one database; rules of this project, no published source.
import { randomBytes } from 'node:crypto'
import postgres from 'postgres'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { WatchAnswer } from '../../shared/schemas/watch'
import type { Client } from '../support/client'
import { visitor } from '../support/client'
import type { Phone } from '../support/phone'
import type { TestServer } from '../support/server'
import { startTestServer } from '../support/server'
import { openStream } from '../support/stream'
import type { World } from '../support/world'
import { startWorld } from '../support/world'

let world: World
let second: TestServer
let sql: postgres.Sql
let phone: Phone
let outage: string

beforeAll(async () => {
  const env = { NUXT_AUTH_SECRET: randomBytes(32).toString('base64url'), HOLDOVER_SERVER_KEY: randomBytes(32).toString('base64url') }
  world = await startWorld({ env })
  second = await startTestServer({ env: { ...env, NUXT_DATABASE_URL: world.server.databaseUrl } })
  sql = postgres(world.server.databaseUrl, { max: 1, onnotice: () => {} })
  phone = await world.phoneOf('technician')
  outage = await world.open(phone, world.server.now() - 600_000)
}, 120_000)
afterAll(async () => {
  await sql?.end()
  await second?.stop()
  await world?.server.stop()
})

/** The same person at the other server: sessions are good at both. */
function atSecond(client: Client): Client {
  const other = visitor(second.url)
  for (const [name, value] of client.cookies) other.cookies.set(name, value)
  return other
}

const note = () => phone.act(outage, 'note-added', { words: 'night covers are down' })
const pull = async (client: Client, body: object = {}) => (await client.send<WatchAnswer>('POST', '/api/watch/outages', body)).body

describe('what a watch is answered', () => {
  it('holds the outages that the person may see, and then only what has changed', async () => {
    const { client } = world.people.supervisor
    const all = await pull(client)
    expect([all.ids, all.more, all.items[0]]).toEqual([[outage], false, expect.objectContaining({ id: outage, phase: 'dark', planned: false, site: expect.objectContaining({ name: 'Mill Lane' }) })])
    expect((await client.send<WatchAnswer>('GET', '/api/watch/outages')).body.items).toEqual(all.items)
    const known = { [outage]: all.items[0]!.seq }
    expect(await pull(client, { known })).toMatchObject({ ids: [outage], items: [] })
    const { answer } = await note()
    const changed = await pull(client, { known, only: [outage] })
    expect(changed.items.map(item => [item.id, item.seq])).toEqual([[outage, answer.size]])
    expect(changed.items[0]!.phones).toEqual([expect.objectContaining({ device: phone.id })])
  })

  it('says nothing of an outage elsewhere', async () => {
    const { client } = world.people.foreignSupervisor
    expect(await pull(client)).toMatchObject({ ids: [], items: [] })
    expect(await pull(client, { only: [outage] })).toMatchObject({ ids: [], items: [] })
    expect((await client.send('POST', '/api/watch/outages', { only: ['nothing'] })).status).toBe(422)
  })
})

describe('wake-ups', () => {
  it('come on every server from whichever took the entry, and to nobody who may not see the site', async () => {
    const here = await openStream(world.people.supervisor.client)
    const there = await openStream(atSecond(world.people.auditor.client))
    const foreign = await openStream(atSecond(world.people.foreignSupervisor.client))
    for (const stream of [here, there, foreign]) expect(typeof (await stream.next('beat')).now).toBe('number')
    const { answer } = await note()
    const wake = { outage, seq: answer.size, phase: 'dark' }
    expect([await here.next('wake'), await there.next('wake')]).toEqual([wake, wake])
    expect(foreign.told.filter(told => told.name === 'wake')).toEqual([])
    for (const stream of [here, there, foreign]) stream.close()
  })

  it('lose nothing where a server goes away: whoever comes again pulls what they lack', async () => {
    const { client } = world.people.supervisor
    const there = await openStream(atSecond(client))
    const known = Object.fromEntries((await pull(client)).items.map(item => [item.id, item.seq]))
    await second.down()
    await there.ended
    const { answer } = await note()
    const again = await openStream(client)
    expect((await pull(client, { known })).items.map(item => item.seq)).toEqual([answer.size])
    const next = await note()
    expect(await again.next('wake')).toMatchObject({ outage, seq: next.answer.size })
    again.close()
    await second.up()
    expect((await pull(atSecond(client))).items[0]!.seq).toBe(next.answer.size)
  })

  it('go on where the database ends the connection on which a server listens, and all is pulled then', async () => {
    const stream = await openStream(world.people.supervisor.client)
    await stream.next('beat')
    const ended = await sql`select pg_terminate_backend(pid) from pg_stat_activity where datname = current_database() and query ilike 'listen %'`
    expect(ended.length).toBeGreaterThan(0)
    await stream.next('again', 10_000)
    const { answer } = await note()
    expect(await stream.next('wake', 10_000)).toMatchObject({ seq: answer.size })
    stream.close()
  })
})

describe('streams that end', () => {
  it('within two seconds once the account is switched off, or its sites change', async () => {
    const { id, client } = world.people.auditor
    const change = (body: object) => world.administrator.send('PATCH', `/api/people/${id}`, body)
    const first = await openStream(client)
    await first.next('beat')
    const began = Date.now()
    expect((await change({ siteIds: [world.site, world.elsewhere] })).status).toBe(200)
    await first.ended
    expect(Date.now() - began).toBeLessThan(2000)

    const then = await openStream(client)
    await then.next('beat')
    const switched = Date.now()
    expect((await change({ disabled: true })).status).toBe(200)
    await then.ended
    expect(Date.now() - switched).toBeLessThan(2000)
    const refused = await openStream(client)
    expect(refused.status).toBe(401)
  })
})
