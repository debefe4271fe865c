// Lists of outages, their state and their entries, page by page; promises of this project's own, no published source.
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { StoredEntry } from '../../shared/record/entry'
import { isoTime } from '../../shared/record/entry'
import { PHASES } from '../../shared/record/phases'
import type { OutageState } from '../../shared/record/state'
import type { OutagePage } from '../../shared/schemas/outage-list'
import type { Client } from '../support/client'
import type { Phone } from '../support/phone'
import type { World } from '../support/world'
import { startWorld } from '../support/world'

interface Fault { data: { field: string, reason: string } }
interface Entries { entries: StoredEntry[], size: number, phase: string, code: string, now: string }

let world: World
let phone: Phone
/** In the order in which they were opened; the third is without control. */
const opened: string[] = []

beforeAll(async () => {
  world = await startWorld()
  phone = await world.phoneOf('technician')
  for (let index = 0; index < 5; index++) {
    opened.push(await world.open(phone, index === 2 ? world.server.now() - 600_000 : undefined))
    await world.server.advance(1)
  }
}, 120_000)
afterAll(() => world?.server.stop())

const list = async (query = '', client: Client = world.people.auditor.client) => client.send<OutagePage & Fault>('GET', `/api/outages${query}`)
const idsOf = async (query = '', client?: Client) => (await list(query, client)).body.items.map(item => item.id)

describe('the list', () => {
  it('shows the newest first, each with what a screen needs', async () => {
    const { status, body: { items, next } } = await list()
    expect([status, next, items.map(item => item.id)]).toEqual([200, null, [...opened].reverse()])
    expect(items[2]).toMatchObject({ phase: 'dark', planned: false, site: { id: world.site, code: 'Q101', name: 'Mill Lane' }, controller: { id: world.controller, name: 'Rack controller' }, workKind: 'software update', startsAt: null, endedAt: null, pointsInHand: 0, planSubmitted: false })
    expect(items.map(item => item.code)).toEqual(['Q101-0005', 'Q101-0004', 'Q101-0003', 'Q101-0002', 'Q101-0001'])
    expect(Date.parse(items[2]!.darkAt!)).toBeLessThan(Date.parse(items[2]!.openedAt))
  })

  it('keeps to phases and a site', async () => {
    expect(await idsOf('?phase=dark')).toEqual([opened[2]])
    expect(await idsOf('?phase=dark,plan')).toEqual([...opened].reverse())
    expect(await idsOf('?phase=sealed')).toEqual([])
    expect(await idsOf(`?phase=${PHASES.join(',')}&site=${world.site}`)).toHaveLength(5)
    expect(await idsOf(`?site=${world.elsewhere}`)).toEqual([])
  })

  it('shows nobody the outages of a site that is not theirs', async () => {
    const { client } = world.people.stranger
    expect([await idsOf('', client), await idsOf(`?site=${world.site}`, client)]).toEqual([[], []])
    expect(await idsOf('', world.administrator)).toHaveLength(5)
  })

  it('shows no more once access is taken away, and again when it is given back', async () => {
    const { id, client } = world.people.second
    const see = async () => [(await idsOf('', client)).length, (await client.send('GET', `/api/outages/${opened[0]}`)).status]
    expect(await see()).toEqual([5, 200])
    await world.administrator.send('PATCH', `/api/people/${id}`, { siteIds: [world.elsewhere] })
    expect(await see()).toEqual([0, 404])
    await world.administrator.send('PATCH', `/api/people/${id}`, { siteIds: [world.site] })
    expect(await see()).toEqual([5, 200])
  })

  it.each([1, 2, 4, 5])('goes on by pages of %i without leaving one out or showing one twice', async (limit) => {
    const seen: string[] = []
    let after = ''
    for (let pages = 0; pages < 10; pages++) {
      const { body } = await list(`?limit=${limit}${after}`)
      expect(body.items.length).toBeLessThanOrEqual(limit)
      seen.push(...body.items.map(item => item.id))
      if (body.next === null) break
      after = `&after=${encodeURIComponent(body.next)}`
    }
    expect(seen).toEqual([...opened].reverse())
  })

  it('goes on where it was when newer ones have come', async () => {
    const { body: first } = await list('?limit=2')
    const newer = await world.open(phone)
    const { body: rest } = await list(`?limit=10&after=${encodeURIComponent(first.next!)}`)
    expect(rest.items.map(item => item.id)).toEqual([...opened].reverse().slice(2))
    opened.push(newer)
  })

  it.each([
    ['?phase=lunch', 'phase[0]'], ['?site=Q101', 'site'], ['?limit=0', 'limit'], ['?limit=101', 'limit'], ['?limit=x', 'limit'], ['?after=yesterday', 'after'],
    ['?after=2026-01-01T00:00:00.000Z_x', 'after'], [`?after=${'2026-01-01T00:00:00.000Z_'}${'-'.repeat(36)}`, 'after'], [`?after=0_${'0'.repeat(36)}`, 'after'],
  ])('answers %s with 422 and the field', async (query, field) => {
    const { status, body } = await list(query)
    expect([status, body.data.field]).toEqual([422, field])
  })
})

describe('one outage', () => {
  it('is given as the fold of its log', async () => {
    const { status, body } = await world.people.supervisor.client.send<OutageState>('GET', `/api/outages/${opened[2]}`)
    expect([status, body.phase, body.code, body.planned, body.darks.length, Object.keys(body.points).length]).toEqual([200, 'dark', 'Q101-0003', false, 1, 5])
  })
})

describe('entries', () => {
  const page = async (query: string) => phone.client.send<Entries & Fault>('GET', `/api/outages/${opened[0]}/entries${query}`)

  it('come after a seq, in order, with their number in all', async () => {
    const { body: all } = await page('')
    expect(all.entries.map(({ seq }) => seq)).toEqual([1, 2, 3, 4])
    expect([all.size, all.phase, all.code]).toEqual([4, 'plan', 'Q101-0001'])
    expect(Math.abs(Date.parse(all.now) - world.server.now())).toBeLessThan(60_000)
    const { body: rest } = await page('?after=2')
    expect([rest.entries, rest.size]).toEqual([all.entries.slice(2), 4])
    expect((await page('?after=4')).body.entries).toEqual([])
    expect((await page('?after=99')).body).toMatchObject({ entries: [], size: 4 })
  })

  it('come 500 at a time', async () => {
    const id = opened[1]!
    for (let push = 0; push < 11; push++) {
      const notes = Array.from({ length: 50 }, (_, index) => phone.write(id, 'note-added', { words: `note ${push * 50 + index}` }))
      expect((await phone.push(id, notes)).status).toBe(200)
    }
    const first = (await phone.client.send<Entries>('GET', `/api/outages/${id}/entries`)).body
    const second = (await phone.client.send<Entries>('GET', `/api/outages/${id}/entries?after=${first.entries.at(-1)!.seq}`)).body
    expect([first.entries.length, first.size, second.entries.length]).toEqual([500, 554, 54])
    expect([...first.entries, ...second.entries].map(({ seq }) => seq)).toEqual(Array.from({ length: 554 }, (_, index) => index + 1))
  }, 60_000)

  it.each(['?after=-1', '?after=x', '?after=1.5'])('answer %s with 422', async (query) => {
    const { status, body } = await page(query)
    expect([status, body.data.field]).toEqual([422, 'after'])
  })
})

describe('the list follows what is signed', () => {
  it('phase, points in hand, and what is sent for approval', async () => {
    const id = await world.open(phone)
    const desk = await world.phoneOf('supervisor')
    const item = async () => (await list()).body.items.find(one => one.id === id)!
    await phone.act(id, 'plan-submitted', {})
    expect(await item()).toMatchObject({ phase: 'plan', planSubmitted: true })
    expect((await desk.act(id, 'plan-approved', {})).result.status).toBe('accepted')
    expect((await phone.act(id, 'in-hand-begun', {})).result.status).toBe('accepted')
    const until = isoTime(world.server.now() + 3_600_000)
    expect((await phone.act(id, 'point-in-hand', { tag: 'DH-1', hand: 'off', seen: 'off', value: null, until })).result.status).toBe('accepted')
    expect(await item()).toMatchObject({ phase: 'in-hand', pointsInHand: 1 })
    await phone.act(id, 'point-in-auto', { tag: 'DH-1', seen: 'answers' })
    await phone.act(id, 'called-off', { reason: 'rain' })
    const ended = await item()
    expect(ended).toMatchObject({ phase: 'called-off', pointsInHand: 0 })
    expect(Math.abs(Date.parse(ended.endedAt!) - world.server.now())).toBeLessThan(60_000)
  })
})
