// What is done by the clock, without a request; promises of this project's own, no published source.
import { afterAll, beforeAll, expect, it } from 'vitest'
import type { StoredEntry } from '../../shared/record/entry'
import type { World } from '../support/world'
import { startWorld } from '../support/world'

let world: World
const wait = (ms: number) => new Promise(resolve => setTimeout(resolve, ms))

beforeAll(async () => {
  world = await startWorld({ jobs: true })
}, 120_000)
afterAll(() => world?.server.stop())

it('time alone brings a verdict to an outage that nobody writes to', async () => {
  const { server, people } = world
  const phone = await world.phoneOf('technician')
  const outage = await world.open(phone, server.now() - 60_000)
  await phone.act(outage, 'reading-taken', { round: 0, caseId: world.snapshot.cases[0]!.id, value: 36, unit: 'F', method: 'product', instrumentId: null })
  const log = async () => (await people.technician.client.send<{ entries: StoredEntry[] }>('GET', `/api/outages/${outage}/entries`)).body.entries
  const before = (await log()).length
  await server.advance(90)
  // A process looks when it begins, and then again and again.
  await server.down()
  await server.up()
  const verdicts = async () => (await log()).slice(before).filter(({ entry }) => entry.kind === 'verdict-changed').map(({ entry }) => [entry.by, (entry.body as { verdict: string }).verdict])
  for (let tries = 0; tries < 100 && (await verdicts()).length === 0; tries++) await wait(100)
  expect(await verdicts()).toContainEqual(['server', 'unknown'])
  // Looked at again nothing is entered twice.
  await wait(2000)
  const once = (await log()).length
  await server.down()
  await server.up()
  await wait(3000)
  expect((await log()).length).toBe(once)
}, 60_000)
