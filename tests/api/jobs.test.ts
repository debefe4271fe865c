// What is done by the clock, without a request; promises of this project's own, no published source.
import { afterAll, beforeAll, expect, it } from 'vitest'
import type { StoredEntry } from '../../shared/record/entry'
import type { World } from '../support/world'
import { startWorld } from '../support/world'

let world: World

beforeAll(async () => {
  world = await startWorld({ jobs: true })
}, 120_000)
afterAll(() => world?.server.stop())

it('time alone brings a verdict to an outage that nobody writes to', async () => {
  const { server, people } = world
  const phone = await world.phoneOf('technician')
  const outage = await world.open(phone, server.now() - 60_000)
  const log = async () => (await people.technician.client.send<{ entries: StoredEntry[] }>('GET', `/api/outages/${outage}/entries`)).body.entries
  const before = (await log()).length
  await server.advance(90)
  // A process looks when it begins, and then once a minute.
  await server.down()
  await server.up()
  let added: StoredEntry[] = []
  for (let tries = 0; tries < 100 && added.length === 0; tries++) {
    await new Promise(resolve => setTimeout(resolve, 100))
    added = (await log()).slice(before)
  }
  expect(added.map(({ entry }) => [entry.kind, entry.by, (entry.body as { verdict?: string }).verdict])).toContainEqual(['verdict-changed', 'server', 'unknown'])
  // Looked at again nothing is entered twice.
  const once = (await log()).length
  await server.down()
  await server.up()
  await new Promise(resolve => setTimeout(resolve, 4000))
  expect((await log()).length).toBe(once)
}, 60_000)
