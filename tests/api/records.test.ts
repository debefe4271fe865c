// The search for records on the built server; promises of this project's own, no published source.
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { eq, sql } from 'drizzle-orm'
import { outageSearch } from '../../server/database/schema'
import { connect } from '../../server/utils/database'
import { renewOldSearch } from '../../server/utils/records/renew'
import { isoTime } from '../../shared/record/entry'
import type { RecordChoices, RecordPage } from '../../shared/schemas/record-filter'
import type { Client } from '../support/client'
import type { Phone } from '../support/phone'
import type { World } from '../support/world'
import { startWorld } from '../support/world'

let world: World
let phone: Phone
let second: Phone
let database: ReturnType<typeof connect>
const DAY = 24 * 60
/** quiet: opened and called off · lost: control lost, back half an hour later · dark: without control now · late: opened days after · plan */
const made: Record<'quiet' | 'lost' | 'dark' | 'late' | 'plan', string> = { quiet: '', lost: '', dark: '', late: '', plan: '' }

const search = async (query: Record<string, string> = {}, client: Client = world.people.auditor.client) => client.send<RecordPage & { data: { field: string, reason: string } }>('GET', `/api/records?${new URLSearchParams(query)}`)
const found = async (query: Record<string, string> = {}, client?: Client) => {
  const { body: { items } } = await search(query, client)
  return items.map(item => Object.entries(made).find(([, id]) => id === item.id)?.[0])
}

beforeAll(async () => {
  world = await startWorld()
  database = connect(world.server.databaseUrl, 1)
  phone = await world.phoneOf('technician')
  second = await world.phoneOf('second')
  const minutesAgo = (minutes: number) => world.server.now() - minutes * 60_000
  made.quiet = await world.open(phone)
  await phone.act(made.quiet, 'note-added', { words: 'The Fish counters are covered; ring 555-0127 or write to store@quillfeather.example first.' })
  await phone.act(made.quiet, 'called-off', { reason: 'rain on the roof' })
  await world.server.advance(1)
  made.lost = await world.open(second, minutesAgo(30))
  const fish = world.snapshot.cases.find(item => item.name === 'Fish service')!.id
  for (const value of [39, 44]) await second.act(made.lost, 'reading-taken', { round: 0, caseId: fish, value, unit: 'F', method: 'product', instrumentId: null })
  await second.act(made.lost, 'act-signed', { caseId: fish, act: 'discarded', product: 'haddock', quantity: 3, unit: 'kg', place: 'back yard', takenBy: 'the shop' })
  await second.act(made.lost, 'control-back', { backAt: isoTime(minutesAgo(0)) })
  await world.server.advance(1)
  made.dark = await world.open(phone, minutesAgo(10))
  await world.server.advance(3 * DAY)
  made.late = await world.open(phone, minutesAgo(60))
  await phone.act(made.late, 'control-back', { backAt: isoTime(minutesAgo(1)) })
  await world.server.advance(1)
  made.plan = await world.open(second)
}, 120_000)
afterAll(async () => {
  await database?.client.end()
  await world?.server.stop()
})

describe('what is found', () => {
  it('everything, the newest first, with what a row needs', async () => {
    const { status, body: { items, count, next } } = await search()
    expect([status, count, next]).toEqual([200, { found: 5, more: false }, null])
    expect(await found()).toEqual(['plan', 'late', 'dark', 'lost', 'quiet'])
    expect(items[3]).toMatchObject({ code: 'Q101-0002', phase: 'hand-back', site: { id: world.site, code: 'Q101', name: 'Mill Lane', timeZone: 'America/Chicago' }, controller: { id: world.controller, name: 'Rack controller' }, workKind: 'software update', endedAt: null, darkSince: null, outcomes: ['unplanned', 'act', 'above-limit', 'discard'] })
    expect(items[3]!.darkSeconds).toBeGreaterThanOrEqual(30 * 60)
    expect(items[3]!.darkSeconds).toBeLessThan(32 * 60)
    expect(items[3]!.holdSeconds).toBeGreaterThan(0)
    expect(items[4]).toMatchObject({ phase: 'called-off', darkSeconds: 0, holdSeconds: null, outcomes: [] })
    expect(items[4]!.endedAt).not.toBeNull()
    expect(items[2]!.darkSince).not.toBeNull()
  })

  it.each([
    ['oldest', ['quiet', 'lost', 'dark', 'late', 'plan']],
    ['longest-dark', ['late', 'lost']],
    ['shortest-hold', ['lost']],
  ])('in the order %s', async (sort, first) => {
    expect((await found({ sort })).slice(0, first.length)).toEqual(first)
  })

  it('by place, phase, work and what came of it', async () => {
    expect(await found({ site: world.site })).toHaveLength(5)
    expect(await found({ site: world.elsewhere })).toEqual([])
    expect(await found({ controller: world.controller, phase: 'dark,plan' })).toEqual(['plan', 'dark'])
    expect(await found({ controller: world.elsewhere })).toEqual([])
    expect(await found({ work: 'software update' })).toHaveLength(5)
    expect(await found({ work: 'Software update' })).toEqual([])
    expect(await found({ outcome: 'unplanned' })).toEqual(['late', 'dark', 'lost'])
    expect(await found({ outcome: 'discard,unplanned' })).toEqual(['lost'])
    expect(await found({ outcome: 'discard,returned' })).toEqual([])
  })

  it('by who signed, and by the tag of a point however it is written', async () => {
    expect(await found({ person: world.people.second.id })).toEqual(['plan', 'lost'])
    expect(await found({ person: world.people.auditor.id })).toEqual([])
    expect(await found({ tag: 'lls-1' })).toHaveLength(5)
    expect(await found({ tag: 'LLS' })).toEqual([])
  })

  it.each([
    ['fish', ['quiet']], ['FISH covered', ['quiet']], ['fish haddock', []], ['hadd', ['lost']], ['back yard', ['lost']], ['555-0127', ['quiet']], ['555', ['quiet']], ['0127-555', []], ['store@quillfeather.example', ['quiet']], ['the rain', ['quiet']], ['roofs', ['quiet']],
    ['Q101-0004', ['late']], ['q101-000', ['plan', 'late', 'dark', 'lost', 'quiet']], ['panel', []], ['\'; drop table x; --', []], ['a & b | !c:*', []], ['…', ['plan', 'late', 'dark', 'lost', 'quiet']],
  ])('by the words %j', async (words, expected) => {
    const { status } = await search({ words })
    expect([status, await found({ words })]).toEqual([200, expected])
  })

  it('by days of the site', async () => {
    const { body: { items } } = await search()
    const dayOf = (index: number) => new Intl.DateTimeFormat('en-CA', { timeZone: 'America/Chicago' }).format(new Date(items[index]!.openedAt))
    expect(await found({ from: dayOf(1), to: dayOf(0) })).toEqual(['plan', 'late'])
    expect(await found({ to: dayOf(2) })).toEqual(['dark', 'lost', 'quiet'])
    expect(await found({ from: '2001-01-01', to: '2001-12-31' })).toEqual([])
  })

  it('at once: a note, an act and another signer, in the transaction of their entries', async () => {
    await phone.act(made.dark, 'note-added', { words: 'Compressor smells of varnish' })
    expect(await found({ words: 'varnish' })).toEqual(['dark'])
    await second.act(made.dark, 'note-added', { words: 'I see it too' })
    expect(await found({ person: world.people.second.id })).toEqual(['plan', 'dark', 'lost'])
    expect(await found({ words: 'varnish see' })).toEqual(['dark'])
  })
})

describe('pages', () => {
  it.each(['newest', 'oldest', 'longest-dark', 'shortest-hold'])('of the order %s leave nothing out and show nothing twice', async (sort) => {
    const whole = await found({ sort })
    expect(whole).toHaveLength(5)
    for (const limit of [1, 2, 4, 5]) {
      const seen: (string | undefined)[] = []
      let after: string | null = ''
      while (after !== null) {
        const { body }: { body: RecordPage } = await search({ sort, limit: String(limit), ...(after ? { after } : {}) })
        expect(body.items.length).toBeLessThanOrEqual(limit)
        expect(body.count).toEqual(after ? null : { found: 5, more: false })
        seen.push(...body.items.map(item => Object.entries(made).find(([, id]) => id === item.id)?.[0]))
        after = body.next
      }
      expect(seen).toEqual(whole)
    }
  })
})

describe('who may look', () => {
  it('finds nothing of a site that is not theirs, whatever they ask', async () => {
    const { client } = world.people.stranger
    for (const query of [{}, { site: world.site }, { controller: world.controller }, { words: 'fish' }, { person: world.people.technician.id }]) {
      expect((await search(query as Record<string, string>, client)).body).toEqual({ items: [], next: null, count: { found: 0, more: false } })
    }
    expect(await found({}, world.administrator)).toHaveLength(5)
  })

  it('may choose from what is theirs', async () => {
    const of = async (client: Client) => (await client.send<RecordChoices>('GET', '/api/records/choices')).body
    const theirs = await of(world.people.auditor.client)
    expect(theirs.sites.map(site => site.name)).toEqual(['Mill Lane'])
    expect(theirs.controllers).toEqual([{ id: world.controller, name: 'Rack controller', siteId: world.site }])
    expect(theirs.people.map(person => person.id).sort()).toEqual([world.people.technician.id, world.people.second.id, world.people.supervisor.id].sort())
    const others = await of(world.people.stranger.client)
    expect([others.sites.map(site => site.name), others.controllers]).toEqual([['Abbot Green'], []])
    expect((await of(world.administrator)).sites.map(site => site.name)).toEqual(['Abbot Green', 'Mill Lane'])
  })

  it('is asked for some sites of many as for all of them', async () => {
    const { id, client } = world.people.foreignSupervisor
    await world.administrator.send('PATCH', `/api/people/${id}`, { siteIds: [world.elsewhere, world.site] })
    expect(await found({}, client)).toEqual(await found())
    for (const number of [1, 2, 3]) await world.administrator.send('POST', '/api/sites', { code: `Q20${number}`, name: `Store ${number}`, timeZone: 'America/Chicago', temperatureUnit: 'F', pressureUnit: 'psig', rulebook: 'us-food-code-2022' })
    // Two of five: now the best rows of each are taken.
    for (const sort of ['newest', 'oldest', 'longest-dark', 'shortest-hold']) expect(await found({ sort }, client)).toEqual(await found({ sort }))
    expect(await found({ words: 'fish' }, client)).toEqual(['quiet'])
    const { body: first } = await search({ limit: '2' }, client)
    expect((await search({ limit: '3', after: first.next! }, client)).body.items.map(item => item.id)).toEqual((await search()).body.items.slice(2).map(item => item.id))
  })
})

describe('what cannot be asked', () => {
  it.each([
    [{ site: 'Q101' }, 'site'], [{ controller: '1' }, 'controller'], [{ person: 'Ada' }, 'person'], [{ phase: 'lunch' }, 'phase[0]'], [{ outcome: 'discard,luck' }, 'outcome[1]'], [{ from: '2026-02-30' }, 'from'], [{ from: '3 March' }, 'from'],
    [{ from: '2026-03-02', to: '2026-03-01' }, 'to'], [{ words: 'x'.repeat(201) }, 'words'], [{ tag: 'x'.repeat(33) }, 'tag'], [{ tag: 'a\0' }, 'tag'], [{ work: '\0' }, 'work'], [{ sort: 'best' }, 'sort'], [{ limit: '101' }, 'limit'], [{ after: 'yesterday' }, 'after'],
    [{ after: '2026-03-01T00:00:00.000Z_x' }, 'after'], [{ sort: 'longest-dark', after: `2026-03-01T00:00:00.000Z_${'0'.repeat(8)}-0000-4000-8000-${'0'.repeat(12)}` }, 'after'],
  ])('%j is answered with 422 and the field', async (query, field) => {
    const { status, body } = await search(query as unknown as Record<string, string>)
    expect([status, body.data.field]).toEqual([422, field])
  })

  it('an empty field asks for nothing', async () => {
    expect(await found({ words: '', site: '', from: '', tag: '', outcome: '', sort: '', after: '' })).toHaveLength(5)
  })
})

describe('the rows behind the search', () => {
  it('are what the log says, also when they are made anew', async () => {
    const rows = () => database.db.select().from(outageSearch).orderBy(outageSearch.code)
    const before = await rows()
    expect(await renewOldSearch(database.db)).toBe(0)
    await database.db.update(outageSearch).set({ version: 0, words: sql`''::tsvector`, tags: [], people: [], outcomes: [], darkSeconds: 1 })
    await database.db.delete(outageSearch).where(eq(outageSearch.outageId, made.late))
    expect(await renewOldSearch(database.db)).toBe(5)
    expect(await rows()).toEqual(before)
  })
})
