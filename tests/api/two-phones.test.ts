// Two phones on one outage, both without signal, on the same point; rules of this project, no published source.
import { afterAll, beforeAll, expect, it } from 'vitest'
import type { StoredEntry } from '../../shared/record/entry'
import { isoTime } from '../../shared/record/entry'
import { sealGate } from '../../shared/record/gates'
import { openItems } from '../../shared/record/hands'
import type { OutageState } from '../../shared/record/state'
import type { Phone } from '../support/phone'
import type { World } from '../support/world'
import { startWorld } from '../support/world'

let world: World
let first: Phone
let second: Phone
let outage: string

beforeAll(async () => {
  world = await startWorld()
  first = await world.phoneOf('technician')
  second = await world.phoneOf('second')
  outage = await world.open(first, world.server.now() - 600_000)
}, 120_000)
afterAll(() => world?.server.stop())

const stateOf = async () => (await first.client.send<OutageState>('GET', `/api/outages/${outage}`)).body
const logOf = async () => (await first.client.send<{ entries: StoredEntry[] }>('GET', `/api/outages/${outage}/entries`)).body.entries

it('loses nothing of what both signed, and waits with the seal until somebody has looked', async () => {
  const tag = 'DH-1'
  const until = isoTime(world.server.now() + 36_000_000)
  // Both sign while away: the first as the plan says; the second otherwise without a reason, and proves what nobody returned.
  const ofFirst = [first.write(outage, 'point-in-hand', { tag, hand: 'off', seen: 'off', value: null, until }), first.write(outage, 'note-added', { words: 'contactor is loud' })]
  const ofSecond = [second.write(outage, 'point-in-hand', { tag, hand: 'as-found', seen: 'as-found', value: null, until }), second.write(outage, 'point-proven', { tag })]
  const early = await first.push(outage, ofFirst)
  const late = await second.push(outage, ofSecond)
  const again = await second.push(outage, ofSecond)
  expect(early.body.results.map(result => result.status)).toEqual(['accepted', 'accepted'])
  expect(late.body.results.map(result => result.status)).toEqual(['questioned', 'questioned'])
  expect(again.body.results.map(result => result.status)).toEqual(['questioned', 'questioned'])

  const log = await logOf()
  for (const signed of [...ofFirst, ...ofSecond]) expect(log.filter(stored => stored.entry.id === signed.entry.id)).toHaveLength(1)
  const state = await stateOf()
  expect([state.phase, state.points[tag]!.status, state.points[tag]!.owner]).toEqual(['dark', 'hand', first.person])
  expect(sealGate(state, [])).toEqual(['2 questioned entries not dealt with'])

  for (const signed of ofSecond) expect((await first.act(outage, 'questioned-settled', { entry: signed.entry.id, words: 'looked: off by hand' })).result.status).toBe('accepted')
  expect(sealGate(await stateOf(), [])).toEqual([])
})

it('passes the outage from one phone to the other by two signatures', async () => {
  const open = openItems(await stateOf(), first.person, [])
  const colleagues = (await first.client.send<{ id: string, name: string }[]>('GET', `/api/outages/${outage}/people`)).body
  const to = colleagues.find(person => person.id === second.person)!
  const offer = await first.act(outage, 'hands-offered', { to: to.id, toName: to.name, size: 1, open })
  expect((await stateOf()).holder!.person).toBe(first.person)
  const taken = await second.act(outage, 'hands-taken', { from: first.person, offer: offer.signed.entry.id, looked: open.map(({ what, about }) => ({ what, about })) })
  expect([offer.result.status, taken.result.status]).toEqual(['accepted', 'accepted'])
  const state = await stateOf()
  expect([state.holder!.person, [...new Set(Object.values(state.points).map(point => point.owner).filter(Boolean))]]).toEqual([second.person, [second.person]])
})
