// Signed entries over HTTP, with a PostgreSQL of the test's own; promises of this project's own, no published source.
import { createHash, createPublicKey, verify } from 'node:crypto'
import postgres from 'postgres'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { canonicalText } from '../../shared/record/canonical'
import type { StoredEntry } from '../../shared/record/entry'
import { isoTime } from '../../shared/record/entry'
import { foldLog } from '../../shared/record/fold'
import { schemaOf } from '../../shared/record/kinds'
import type { OutageState } from '../../shared/record/state'
import { uuidv7 } from '../../shared/record/uuid'
import type { Client } from '../support/client'
import { visitor } from '../support/client'
import type { Phone, PushAnswer, Signed } from '../support/phone'
import type { World } from '../support/world'
import { startWorld } from '../support/world'

interface Fault { data: { field: string | null, reason: string } }
interface Page { entries: StoredEntry[], size: number, phase: string, code: string }

let world: World
let phone: Phone
let second: Phone
let desk: Phone
let outage: string
let sql: postgres.Sql

beforeAll(async () => {
  world = await startWorld()
  phone = await world.phoneOf('technician')
  second = await world.phoneOf('second')
  desk = await world.phoneOf('supervisor')
  outage = await world.open(phone)
  sql = postgres(world.server.databaseUrl, { max: 2, onnotice: () => {} })
}, 120_000)
afterAll(async () => {
  await sql?.end()
  await world?.server.stop()
})

const note = (words = 'Rain', of = phone, on = outage) => of.write(on, 'note-added', { words })
const log = async (on = outage, client = world.people.technician.client) => (await client.send<Page>('GET', `/api/outages/${on}/entries`)).body
/** Sends one entry; when it is refused without a place in the chain, the device forgets it. */
async function send(signed: Signed, of = phone, on = outage) {
  const { status, body } = await of.push(on, [signed])
  const [result] = body.results ?? []
  if (result?.status === 'refused' && !result.recorded) of.unwrite(on, signed)
  return { status, body, result }
}

describe('an accepted entry', () => {
  it('is answered with its seq and receipt, and stands in the log as it was signed', async () => {
    const signed = note('Doors shut')
    const { status, result, body } = await send(signed)
    expect([status, result]).toMatchObject([200, { id: signed.entry.id, status: 'accepted', why: [] }])
    const { entries, size, phase, code } = await log()
    expect([body.size, body.phase, body.code]).toEqual([size, phase, code])
    const stored = entries.at(-1)!
    expect([stored.seq, stored.entry, stored.signature]).toEqual([(result as { seq: number }).seq, signed.entry, signed.signature])
    expect(Math.abs(Date.parse(stored.receivedAt) - world.server.now())).toBeLessThan(60_000)
  })

  it('gives the outage a code of its site, and its equipment', async () => {
    const { code } = await log()
    expect(code).toMatch(/^Q101-\d{4}$/)
    const { body: state } = await world.people.auditor.client.send<OutageState>('GET', `/api/outages/${outage}`)
    expect([state.code, state.phase, state.snapshot.controller.name]).toEqual([code, 'plan', 'Rack controller'])
  })

  it('comes after the names of its signers, the server first', async () => {
    const { entries } = await log()
    expect(entries.slice(0, 4).map(({ entry }) => entry.kind)).toEqual(['signer-named', 'signer-named', 'outage-opened', 'outage-numbered'])
    expect(entries[0]!.entry.body).toMatchObject({ person: 'server', name: 'Holdover', device: entries[0]!.entry.device })
    expect(entries[1]!.entry.body).toMatchObject({ person: phone.person, device: phone.id, publicKey: phone.publicKey, role: 'technician' })
  })
})

describe('a replay', () => {
  it('answers as the first time did, alone and among others, and stores nothing', async () => {
    const signed = note('once')
    const first = await send(signed)
    const before = (await log()).size
    const again = await phone.push(outage, [signed, signed])
    expect([again.status, again.body.results]).toEqual([200, [first.result, first.result]])
    expect((await log()).size).toBe(before)
  })

  it('of an id with other bytes is 409', async () => {
    const signed = note('one thing')
    await send(signed)
    const other = phone.seal({ ...signed.entry, body: { ...signed.entry.body as object, words: 'another thing' } })
    const { status, body } = await phone.push(outage, [other])
    expect([status, body.results[0]]).toMatchObject([409, { status: 'refused', reason: 'This id was used for another entry', recorded: false }])
    const elsewhere = await world.open(phone)
    expect((await phone.push(elsewhere, [phone.seal({ ...signed.entry, outage: elsewhere })])).status).toBe(409)
  })

  it('of an opening sent twice at once opens one outage', async () => {
    const id = uuidv7(world.server.now())
    const signed = second.write(id, 'outage-opened', world.opening())
    const answers = await Promise.all([1, 2, 3, 4].map(() => second.push(id, [signed])))
    expect(answers.map(answer => answer.status)).toEqual([200, 200, 200, 200])
    expect(new Set(answers.map(answer => JSON.stringify(answer.body.results))).size).toBe(1)
    expect((await log(id)).entries.filter(({ entry }) => entry.kind === 'outage-opened')).toHaveLength(1)
  })

  it('of a refused entry gives the same status, field and reason', async () => {
    const wrong = () => phone.raw(outage, 'note-added', { words: '', photos: [] })
    const forbidden = () => phone.write(outage, 'plan-approved', {})
    for (const [make, code] of [[wrong, 422], [forbidden, 403]] as const) {
      const signed = make()
      const first = await send(signed)
      expect(first.status).toBe(code)
      expect(await send(signed)).toEqual(first)
      expect((await phone.push(outage, [note(), signed])).body.results[1]).toMatchObject({ code, reason: first.body.data!.reason })
    }
  })
})

describe('what is refused, and the field that it names', () => {
  it('a wrong signature', async () => {
    const signed = note()
    const { status, body } = await send({ ...signed, signature: desk.seal(signed.entry).signature })
    expect([status, body.data]).toEqual([422, { field: 'entries[0].signature', reason: 'The signature does not fit the entry' }])
  })

  it.each<[string, () => Signed, string, string]>([
    ['a wrong field of the body', () => phone.raw(outage, 'reading-taken', { round: 0, caseId: world.snapshot.cases[0]!.id, value: 'warm', unit: 'F', method: 'product', instrumentId: null, words: '', photos: [] }), 'entries[0].entry.body.value', 'Enter a number'],
    ['a field deep in the body', () => phone.raw(outage, 'left-in-exception', { points: [{ tag: 'C-1', owner: '', by: isoTime(0), reason: 'x' }] }), 'entries[0].entry.body.points[0].owner', 'Name who owns it'],
    ['a field that the kind does not know', () => phone.raw(outage, 'note-added', { words: 'x', photos: [], colour: 'red' }), 'entries[0].entry.body', 'Unrecognized key'],
    ['a default left out', () => phone.raw(outage, 'note-added', { words: 'x' }), 'entries[0].entry.body', 'not written as its kind lays down'],
    ['spaces at an end', () => phone.raw(outage, 'note-added', { words: ' x', photos: [] }), 'entries[0].entry.body', 'not written as its kind lays down'],
    ['the character NUL', () => phone.raw(outage, 'note-added', { words: 'a\u0000b', photos: [] }), 'entries[0].entry.body', 'NUL'],
    ['a tag that every object has', () => phone.raw(outage, 'point-proven', { tag: 'constructor', words: '', photos: [] }), 'entries[0].entry.body.tag', 'cannot be a tag'],
    ['an unknown kind', () => phone.raw(outage, 'coffee-made', {}), 'entries[0].entry.kind', 'coffee-made'],
    ['a kind of the server', () => phone.raw(outage, 'outage-numbered', { code: 'Q101-9999' }), 'entries[0].entry.kind', 'Nobody signs'],
  ])('%s is 422, and takes its place in the chain', async (_name, make, field, reason) => {
    const before = await log()
    const { status, body, result } = await send(make())
    expect([status, body.data!.field]).toEqual([422, field])
    expect(body.data!.reason).toContain(reason)
    expect(result).toMatchObject({ status: 'refused', recorded: true })
    const { entries } = await log()
    expect(entries.slice(before.size).map(({ entry }) => entry.kind)).toEqual(['entry-refused'])
    expect((await send(note('goes on'))).status).toBe(200)
  })

  it.each<[string, (signed: Signed) => unknown, number, string]>([
    ['no entry', () => null, 422, 'entries[0]'],
    ['no signature', ({ entry }) => ({ entry }), 422, 'entries[0].signature'],
    ['an id in capitals', ({ entry }) => phone.seal({ ...entry, id: entry.id.toUpperCase() }), 422, 'entries[0].entry.id'],
    ['a device in capitals', ({ entry }) => phone.seal({ ...entry, device: entry.device.toUpperCase() }), 422, 'entries[0].entry.device'],
    ['a time that no calendar has', ({ entry }) => phone.seal({ ...entry, at: '2026-02-30T00:00:00.000Z' }), 422, 'entries[0].entry.at'],
    ['another outage', ({ entry }) => phone.seal({ ...entry, outage: uuidv7(0) }), 422, 'entries[0].entry.outage'],
    ['a version to come', ({ entry }) => phone.seal({ ...entry, v: 2 }), 422, 'entries[0].entry.v'],
    ['a gap in n', ({ entry }) => phone.seal({ ...entry, n: entry.n + 1 }), 409, 'entries[0].entry.n'],
    ['an n from before', ({ entry }) => phone.seal({ ...entry, n: entry.n - 1 }), 409, 'entries[0].entry.n'],
    ['another hash of the one before', ({ entry }) => phone.seal({ ...entry, prev: 'a'.repeat(64) }), 409, 'entries[0].entry.prev'],
  ])('%s stores nothing at all', async (_name, bend, code, field) => {
    const before = (await log()).size
    const signed = note()
    phone.unwrite(outage, signed)
    const { status, body } = await phone.push(outage, [bend(signed)])
    expect([status, body.data!.field]).toEqual([code, field])
    expect(body.results[0]).toMatchObject({ status: 'refused', recorded: false })
    expect((await log()).size).toBe(before)
  })

  it('a lone surrogate, which has no canonical form', async () => {
    const signed = note()
    phone.unwrite(outage, signed)
    const text = JSON.stringify({ entries: [signed] }).replace('Rain', '\\ud800')
    const response = await phone.client.fetch(`/api/outages/${outage}/entries`, { method: 'POST', body: text, headers: { 'content-type': 'application/json' } })
    expect([response.status, (await response.json() as Fault).data.reason]).toEqual([422, 'The entry has no canonical form'])
  })

  it('another\'s entry is 403', async () => {
    const signed = note('mine', second)
    second.unwrite(outage, signed)
    const { status, body } = await phone.push(outage, [signed])
    expect([status, body.data!.reason]).toEqual([403, 'An entry is sent by the person who signed it'])
    const borrowed = phone.seal({ ...note().entry, device: second.id })
    phone.unwrite(outage, borrowed)
    expect((await phone.push(outage, [borrowed])).body.data!.reason).toBe('This device is not enrolled for you')
  })

  it('a revoked device is 403, and what it signed stays', async () => {
    const old = await world.phoneOf('technician')
    expect((await send(note('from the old phone', old), old)).status).toBe(200)
    expect((await phone.client.send('DELETE', `/api/devices/${old.id}`)).status).toBe(200)
    const { status, body } = await send(note('after', old), old)
    expect([status, body.data!.reason]).toEqual([403, expect.stringMatching(/^This device was revoked at \d{4}-\d\d-\d\d \d\d:\d\d UTC, before this was signed$/)])
    expect((await log()).entries.some(({ entry }) => entry.device === old.id && entry.kind === 'note-added')).toBe(true)
  })

  it('a role that may not sign it is 403, recorded, and the chain stays whole', async () => {
    const signed = phone.write(outage, 'plan-approved', {})
    const { status, body, result } = await send(signed)
    expect([status, body.data!.reason]).toEqual([403, 'this is signed by a supervisor, not by a technician'])
    expect(result).toMatchObject({ recorded: true })
    const { entries } = await log()
    expect(entries.at(-1)!.entry).toMatchObject({ kind: 'entry-refused', body: { device: phone.id, n: signed.entry.n, id: signed.entry.id, hash: createHash('sha256').update(canonicalText(signed.entry)).digest('hex') } })
    expect((await send(note('on'))).status).toBe(200)
  })
})

describe('the request itself', () => {
  const post = (body: string, client: Client = phone.client) => client.fetch(`/api/outages/${outage}/entries`, { method: 'POST', body, headers: { 'content-type': 'application/json' } })
  const reason = async (response: Response) => [response.status, (await response.json() as Fault).data]

  it.each([['{'], [''], ['entries']])('"%s" cannot be read: 400', async (text) => {
    expect((await post(text)).status).toBe(400)
  })
  it.each([[{}], [{ entries: 'x' }], [{ entries: [] }], [[]], ['x']])('%j is 422', async (body) => {
    expect((await post(JSON.stringify(body))).status).toBe(422)
  })
  it('101 entries are 422, and none is stored; 100 are taken', async () => {
    const before = (await log()).size
    const many = Array.from({ length: 101 }, () => note())
    expect(await reason(await post(JSON.stringify({ entries: many })))).toEqual([422, { field: 'entries', reason: 'At most 100 entries at once' }])
    for (const signed of [...many].reverse()) phone.unwrite(outage, signed)
    expect((await log()).size).toBe(before)
    const most = Array.from({ length: 100 }, (_, index) => note(`note ${index}`))
    const { status, body } = await phone.push(outage, most)
    expect([status, new Set(body.results.map(result => result.status)), (await log()).size]).toEqual([200, new Set(['accepted']), before + 100])
  })
  it('more than four megabytes are 413, and so is an entry of more than two', async () => {
    expect((await post(`{"entries":["${'x'.repeat(4_000_000)}"]}`)).status).toBe(413)
    expect((await post(`{"entries":["${'€'.repeat(1_400_000)}"]}`)).status).toBe(413)
    const signed = phone.raw(outage, 'note-added', { words: '€'.repeat(700_000), photos: [] })
    phone.unwrite(outage, signed)
    expect((await phone.push(outage, [signed])).body).toMatchObject({ statusCode: 413, results: [{ code: 413, recorded: false }] })
  })
  it('of nobody is 401, from another page 403', async () => {
    expect((await post('{}', visitor(world.server.url))).status).toBe(401)
    expect((await phone.client.fetch(`/api/outages/${outage}/entries`, { method: 'POST', body: '{}', headers: { origin: 'https://elsewhere.example' } })).status).toBe(403)
  })
  it('with some refused is 207, and goes on after them', async () => {
    const wrong = phone.raw(outage, 'note-added', { words: '', photos: [] })
    const { status, body } = await phone.push(outage, [wrong, note('right')])
    expect([status, body.results.map(result => result.status), body.data!.field]).toEqual([207, ['refused', 'accepted'], 'entries[0].entry.body.words'])
  })
})

describe('a site that is not theirs', () => {
  it('answers 404 to every entry, and to an opening at it', async () => {
    const foreign = await world.phoneOf('stranger')
    const signed = note('hello', foreign)
    const { status, body } = await foreign.push(outage, [signed])
    expect([status, body.data!.reason]).toEqual([404, 'There is no such outage'])
    const id = uuidv7(world.server.now())
    const opened = await foreign.push(id, [foreign.write(id, 'outage-opened', world.opening())])
    expect([opened.status, opened.body.data!.reason]).toEqual([404, 'There is no such controller'])
    expect(await sql`select 1 from outages where id = ${id}`).toHaveLength(0)
  })
  it('a controller under another\'s site is 404', async () => {
    const foreign = await world.phoneOf('stranger')
    const id = uuidv7(world.server.now())
    const body = world.opening()
    const lied = { ...body, snapshot: { ...body.snapshot, site: { ...body.snapshot.site, id: world.elsewhere } } }
    expect((await foreign.push(id, [foreign.write(id, 'outage-opened', lied)])).status).toBe(404)
  })
  it('an unknown outage is 404 unless it is being opened', async () => {
    const id = uuidv7(world.server.now())
    expect((await phone.push(id, [phone.write(id, 'note-added', { words: 'x' })])).status).toBe(404)
    expect((await phone.client.send('POST', '/api/outages/no-such/entries', { entries: [1] })).status).toBe(404)
  })
})

describe('an opening', () => {
  const attempt = async (change: (body: ReturnType<World['opening']>) => object, of = phone) => {
    const id = uuidv7(world.server.now())
    const answer = await of.push(id, [of.write(id, 'outage-opened', { ...world.opening(), ...change(structuredClone(world.opening())) } as ReturnType<World['opening']>)])
    return { id, status: answer.status, data: answer.body.data! }
  }

  it.each<[string, (body: ReturnType<World['opening']>) => object, string]>([
    ['a time in the future', () => ({ planned: false, lostAt: isoTime(Date.now() + 3_600_000) }), 'lostAt'],
    ['a rulebook that is not known', body => ({ snapshot: { ...body.snapshot, rulebook: { id: 'mine', version: '1', name: 'Mine' } } }), 'snapshot.rulebook'],
    ['a food class that the rulebook has not', body => ({ snapshot: { ...body.snapshot, cases: body.snapshot.cases.map(item => ({ ...item, foodClass: 'toys' })) } }), 'snapshot.cases[0].foodClass'],
    ['a time zone that is none', body => ({ snapshot: { ...body.snapshot, site: { ...body.snapshot.site, timeZone: 'Moon/Crater' } } }), 'snapshot.site.timeZone'],
    ['a tag twice', body => ({ snapshot: { ...body.snapshot, points: [...body.snapshot.points, body.snapshot.points[0]!] } }), 'snapshot.points[5].tag'],
  ])('with %s is 422 and leaves nothing behind', async (_name, change, field) => {
    const { id, status, data } = await attempt(change)
    expect([status, data.field]).toEqual([422, `entries[0].entry.body.${field}`])
    expect(await sql`select 1 from outages where id = ${id}`).toHaveLength(0)
    expect((await phone.client.send('GET', `/api/outages/${id}`)).status).toBe(404)
  })

  it('that is refused takes nothing with it that was sent behind it', async () => {
    const id = uuidv7(world.server.now())
    const bad = phone.write(id, 'outage-opened', world.opening())
    phone.unwrite(id, bad)
    const { status, body } = await phone.push(id, [{ ...bad, signature: 'A'.repeat(86) }, phone.write(id, 'note-added', { words: 'behind' })])
    expect([status, body.results.map(result => result.status === 'refused' && result.code)]).toEqual([422, [422, 409]])
    expect(await sql`select 1 from outages where id = ${id}`).toHaveLength(0)
  })

  it('with points that wait for each other in a ring can be planned no further, and is answered in words', async () => {
    const body = world.opening()
    const drives = (tag: string, other: string) => ({ ...body.snapshot.points[0]!, tag, kind: 'drive' as const, drives: other, hand: { hz: 40 } })
    const points = [...body.snapshot.points, drives('V-1', 'V-2'), drives('V-2', 'V-1')]
    const plan = { ...body.plan, points: [...body.plan.points, ...['V-1', 'V-2'].map(tag => ({ tag, hand: { hz: 40 }, reason: '' }))] }
    const id = uuidv7(world.server.now())
    expect((await phone.push(id, [phone.write(id, 'outage-opened', { ...body, plan, snapshot: { ...body.snapshot, points } })])).status).toBe(200)
    const { status, result } = await phone.act(id, 'plan-submitted', {})
    expect([status, result.status]).toEqual([200, 'questioned'])
  })
})

describe('a stale act', () => {
  it('is kept as questioned with 200, and counts as in hand', async () => {
    const id = await world.open(phone)
    const { status, result, answer } = await phone.act(id, 'point-in-hand', { tag: 'DH-1', hand: 'off', seen: 'off', value: null, until: isoTime(world.server.now() + 3_600_000) })
    expect([status, result, answer.phase]).toMatchObject([200, { status: 'questioned', why: ['does not belong in the phase "plan"'] }, 'plan'])
    const { body: { items } } = await phone.client.send<{ items: { id: string, pointsInHand: number }[] }>('GET', '/api/outages')
    expect(items.find(item => item.id === id)!.pointsInHand).toBe(1)
  })

  it('of two people at once: nothing is dropped', async () => {
    const id = await world.open(phone, world.server.now() - 60_000)
    const back = { backAt: isoTime(world.server.now()) }
    const [first, other] = await Promise.all([phone.act(id, 'control-back', back), second.act(id, 'control-back', back)])
    expect([first.status, other.status]).toEqual([200, 200])
    expect([first.result.status, other.result.status].sort()).toEqual(['accepted', 'questioned'])
    expect((await log(id)).entries.filter(({ entry }) => entry.kind === 'control-back')).toHaveLength(2)
  })
})

describe('verdicts', () => {
  it('enter the log by the server when they change', async () => {
    const id = await world.open(phone, world.server.now() - 3_600_000)
    const [dairy] = world.snapshot.cases
    const read = (value: number) => phone.act(id, 'reading-taken', { round: 0, caseId: dairy!.id, value, unit: 'F', method: 'product', instrumentId: null })
    const verdicts = async () => (await log(id)).entries.filter(({ entry }) => entry.kind === 'verdict-changed').map(({ entry }) => (entry.body as { verdict: string }).verdict)
    await read(38)
    expect(await verdicts()).toEqual([])
    await read(47)
    expect(await verdicts()).toEqual(['above'])
    await read(47)
    expect(await verdicts()).toEqual(['above'])
  })
})

describe('acts and thermometers', () => {
  it('an act is opened by the server when little hold is left, and ended by what is signed', async () => {
    const lost = world.server.now() - 12 * 60_000
    const dark = await world.open(phone, lost)
    const { snapshot } = world
    const caseId = snapshot.cases[0]!.id
    await phone.act(dark, 'reading-taken', { round: 0, caseId, value: 40.6, unit: 'F', method: 'product', instrumentId: null })
    const opened = (await log(dark)).entries.filter(({ entry }) => entry.kind === 'act-opened')
    expect(opened.map(({ entry }) => entry.body)).toMatchObject([{ caseId, cause: 'hold-short' }])
    const { result } = await phone.act(dark, 'act-signed', { caseId, act: 'moved', product: 'milk', quantity: 12, unit: 'crates', place: 'cold room' })
    expect(result.status).toBe('accepted')
    expect(foldLog(dark, (await log(dark)).entries).cases[caseId]).toMatchObject({ openAct: null, empty: true, openings: [{ cause: 'hold-short', closed: { how: 'act' } }] })
  })

  it('a check in ice renews the equipment\'s own date, and one that was failed does not', async () => {
    const { body: made } = await world.administrator.send<{ id: string }>('POST', `/api/sites/${world.site}/instruments`, { name: 'T-9', kind: 'product', accuracyC: 0.5, lastCheckOn: '2020-01-01' })
    const on = await world.open(phone, world.server.now() - 60_000)
    const site = () => world.administrator.send<{ instruments: { id: string, lastCheckOn: string | null }[] }>('GET', `/api/sites/${world.site}`)
    const dateOf = async () => (await site()).body.instruments.find(item => item.id === made.id)!.lastCheckOn
    // The snapshot of the world is older than this thermometer: what it says of it does not fit, and nothing is renewed.
    const { result } = await phone.act(on, 'instrument-checked', { instrumentId: made.id, value: 32, unit: 'F', within: true, words: '' })
    expect([result.status, await dateOf()]).toEqual(['questioned', '2020-01-01'])
    const { body: snapshot } = await world.people.technician.client.send<typeof world.snapshot>('GET', `/api/controllers/${world.controller}/snapshot`)
    const fresh = uuidv7(world.server.now())
    const opening = world.opening(world.server.now() - 60_000)
    expect((await phone.act(fresh, 'outage-opened', { ...opening, snapshot })).result.status).toBe('accepted')
    await phone.act(fresh, 'instrument-checked', { instrumentId: made.id, value: 34, unit: 'F', within: false, words: '' })
    expect(await dateOf()).toBe('2020-01-01')
    await phone.act(fresh, 'instrument-checked', { instrumentId: made.id, value: 32.4, unit: 'F', within: true, words: '' })
    expect(await dateOf()).toMatch(/^20(2[6-9]|[3-9]\d)-\d\d-\d\d$/)
  })
})

describe('many at once', () => {
  it('two devices push at the same time: seq and each count without gaps, and every signature good', async () => {
    const id = await world.open(phone)
    const batch = (of: Phone, count: number) => Array.from({ length: count }, (_, index) => of.write(id, 'note-added', { words: `note ${index}` }))
    const pushes = [1, 2, 3, 4, 5, 6, 7, 8].flatMap(() => [phone, second, desk].map(of => ({ of, entries: batch(of, 3) })))
    // Each device sends its own in order, as its outbox does; the devices do not wait for each other.
    await Promise.all([phone, second, desk].map(async (of) => {
      for (const push of pushes.filter(item => item.of === of)) expect((await of.push(id, push.entries)).status).toBe(200)
    }))
    const { entries, size } = await log(id)
    expect(entries.map(({ seq }) => seq)).toEqual(Array.from({ length: size }, (_, index) => index + 1))
    const chains = new Map<string, { n: number, hash: string }>()
    const keys = new Map(entries.flatMap(({ entry }) => entry.kind === 'signer-named' ? [[entry.body.device, entry.body.publicKey]] : []))
    for (const { entry, signature } of entries) {
      const text = canonicalText(entry)
      const key = createPublicKey({ key: { kty: 'OKP', crv: 'Ed25519', x: keys.get(entry.device)! }, format: 'jwk' })
      expect(verify(null, Buffer.from(text), key, Buffer.from(signature, 'base64url')), `${entry.kind} ${entry.n}`).toBe(true)
      expect([entry.n, entry.prev]).toEqual([(chains.get(entry.device)?.n ?? 0) + 1, chains.get(entry.device)?.hash ?? null])
      chains.set(entry.device, { n: entry.n, hash: createHash('sha256').update(text).digest('hex') })
    }
    expect(entries.filter(({ entry }) => entry.kind === 'note-added')).toHaveLength(72)
  })

  it('every stored body is one that its kind lays down, and the cached state is the fold of the log', async () => {
    for (const { id } of await sql<{ id: string }[]>`select id from outages`) {
      const { entries } = await log(id)
      for (const { entry } of entries) expect(schemaOf(entry.kind, entry.v)!.safeParse(entry.body).success, entry.kind).toBe(true)
      const { body } = await phone.client.send<OutageState>('GET', `/api/outages/${id}`)
      expect(body).toEqual(JSON.parse(JSON.stringify(foldLog(id, entries))))
    }
  })
})

describe('the log in the database', () => {
  it.each([
    ['an update', () => sql`update entries set signature = 'x' where outage_id = ${outage}`],
    ['a deletion', () => sql`delete from entries where outage_id = ${outage} and seq = 3`],
    ['emptying', () => sql`truncate entries cascade`],
    ['a second entry of one seq', () => sql`insert into entries select outage_id, seq, gen_random_uuid(), kind, person_id, device_id, n + 1000, hash, signed, signature, received_at, standing, why from entries where outage_id = ${outage} and seq = 3`],
    ['a second entry of one count', () => sql`insert into entries select outage_id, seq + 10000, gen_random_uuid(), kind, person_id, device_id, n, hash, signed, signature, received_at, standing, why from entries where outage_id = ${outage} and seq = 3`],
  ])('refuses %s', async (_name, change) => {
    const before = await log()
    await expect(change()).rejects.toThrow(/append-only|duplicate key/)
    expect(await log()).toMatchObject({ entries: before.entries, size: before.size })
  })
})

describe('a database that is away', () => {
  it('is 503 with words, health with it, and nothing is lost when it is back', async () => {
    const name = new URL(world.server.databaseUrl).pathname.slice(1)
    const admin = postgres(process.env.TEST_DATABASE_ADMIN_URL!, { max: 1, onnotice: () => {} })
    const signed = note('kept on the phone')
    try {
      await sql.end()
      await admin.unsafe(`alter database "${name}" allow_connections false`)
      await admin`select pg_terminate_backend(pid) from pg_stat_activity where datname = ${name}`
      const health = await visitor(world.server.url).send<{ status: string }>('GET', '/api/health')
      expect([health.status, health.body.status]).toEqual([503, 'database away'])
      expect(await phone.push(outage, [signed])).toMatchObject({ status: 503, body: { data: { reason: 'The database is away; nothing was lost, try again in a moment' } } })
      expect((await phone.client.send('GET', '/api/outages')).status).toBe(503)
    } finally {
      await admin.unsafe(`alter database "${name}" allow_connections true`)
      await admin.end()
      sql = postgres(world.server.databaseUrl, { max: 2, onnotice: () => {} })
    }
    await expect.poll(async () => (await visitor(world.server.url).send('GET', '/api/health')).status, { timeout: 20_000 }).toBe(200)
    const { status, body } = await phone.push(outage, [signed])
    expect([status, (body as PushAnswer).results[0]!.status]).toEqual([200, 'accepted'])
  }, 60_000)
})
