// Signing devices over HTTP: list, rename, revoke, replace, and what becomes of what a revoked one still kept. Promises of this project's own, no published source.
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { StoredEntry } from '../../shared/record/entry'
import { isoTime } from '../../shared/record/entry'
import type { OutageState } from '../../shared/record/state'
import type { DeviceItem } from '../../shared/schemas/people'
import { uuidv7 } from '../../shared/record/uuid'
import { OWN_PASSWORD } from '../support/people'
import { Phone } from '../support/phone'
import type { World } from '../support/world'
import { startWorld } from '../support/world'

let world: World
beforeAll(async () => { world = await startWorld() }, 120_000)
afterAll(() => world?.server.stop())

const technician = () => world.people.technician
const listOf = async (client = technician().client, path = '/api/devices') => (await client.send<DeviceItem[]>('GET', path)).body
const find = async (id: string) => (await listOf()).find(device => device.id === id)!
const revoke = (id: string, client = technician().client) => client.send('DELETE', `/api/devices/${id}`)
const stateOf = async (outage: string) => (await technician().client.send<OutageState>('GET', `/api/outages/${outage}`)).body
const entriesOf = async (outage: string) => (await technician().client.send<{ entries: StoredEntry[] }>('GET', `/api/outages/${outage}/entries`)).body.entries

describe('the list of devices', () => {
  it('says when each was enrolled and when it signed last', async () => {
    const phone = await world.phoneOf('technician')
    expect(await find(phone.id)).toMatchObject({ name: 'Phone', publicKey: phone.publicKey, lastSeenAt: null, revokedAt: null, revokedBy: null, replaced: false })
    await world.open(phone)
    expect(Math.abs(Date.parse((await find(phone.id)).lastSeenAt!) - world.server.now())).toBeLessThan(60_000)
  })

  it('is a person\'s own, and an administrator\'s to read', async () => {
    const phone = await world.phoneOf('technician')
    expect((await listOf(world.people.second.client)).some(device => device.id === phone.id)).toBe(false)
    expect((await listOf(world.administrator, `/api/people/${technician().id}/devices`)).map(device => device.id)).toContain(phone.id)
    expect((await world.people.supervisor.client.send('GET', `/api/people/${technician().id}/devices`)).status).toBe(403)
  })

  it('takes another name from the owner alone', async () => {
    const phone = await world.phoneOf('technician')
    const rename = (name: string, client = technician().client) => client.send<{ data: { field: string } }>('PATCH', `/api/devices/${phone.id}`, { name })
    expect((await rename('  Van phone ')).status).toBe(200)
    expect((await find(phone.id)).name).toBe('Van phone')
    expect(await rename('')).toMatchObject({ status: 422, body: { data: { field: 'name' } } })
    expect((await rename('x'.repeat(61))).status).toBe(422)
    expect((await rename('Taken', world.administrator)).status).toBe(404)
    expect((await find(phone.id)).name).toBe('Van phone')
  })

  it('names who revoked one, and revokes it once', async () => {
    const [mine, theirs] = [await world.phoneOf('technician'), await world.phoneOf('technician')]
    expect((await revoke(mine.id)).status).toBe(200)
    expect((await revoke(theirs.id, world.people.second.client)).status).toBe(404)
    expect((await revoke(theirs.id, world.administrator)).status).toBe(200)
    expect((await find(mine.id)).revokedBy).toBe('technician')
    expect((await find(theirs.id)).revokedBy).toBe('Ada Brook')
    expect((await revoke(mine.id)).status).toBe(404)
  })

  it('never holds the server\'s own key, which nobody revokes', async () => {
    const phone = await world.phoneOf('technician')
    const [named] = await entriesOf(await world.open(phone))
    expect((await revoke(named!.entry.device, world.administrator)).status).toBe(404)
  })
})

describe('a new key in the place of an old one', () => {
  it('revokes the old one with the same request, and signs from then on', async () => {
    const old = await world.phoneOf('technician')
    const outage = await world.open(old)
    const next = new Phone(technician().client, technician().id, world.server.now)
    const enrolled = (password: string, replaces = old.id) => technician().client.send('POST', '/api/devices', { id: next.id, name: 'Phone', publicKey: next.publicKey, password, replaces })
    expect((await enrolled('not the password')).status).toBe(422)
    expect((await find(old.id)).revokedAt).toBeNull()
    expect((await enrolled(OWN_PASSWORD)).status).toBe(201)
    expect(await find(old.id)).toMatchObject({ replaced: true, revokedBy: 'technician' })
    expect((await next.act(outage, 'note-added', { words: 'by the new key' })).status).toBe(200)
    expect((await enrolled(OWN_PASSWORD)).status).toBe(200)
  })

  it('takes the place of nobody else\'s', async () => {
    const foreign = await world.phoneOf('second')
    const next = new Phone(technician().client, technician().id, world.server.now)
    expect((await technician().client.send('POST', '/api/devices', { id: next.id, name: 'Phone', publicKey: next.publicKey, password: OWN_PASSWORD, replaces: foreign.id })).status).toBe(201)
    expect((await foreign.act(await world.open(foreign), 'note-added', { words: 'still mine' })).status).toBe(200)
  })
})

describe('what a revoked device signed and had not sent', () => {
  it('is kept and questioned when it was signed before, with the reason, and blocks the seal until settled', async () => {
    const [lost, other] = [await world.phoneOf('technician'), await world.phoneOf('technician')]
    const outage = await world.open(lost)
    const kept = [lost.write(outage, 'note-added', { words: 'signed in the cellar' }), lost.write(outage, 'note-added', { words: 'and another' })]
    await world.server.advance(2)
    await revoke(lost.id)
    const late = lost.write(outage, 'note-added', { words: 'signed after' })
    const { status, body } = await lost.push(outage, [...kept, late])
    expect(status).toBe(207)
    expect(body.results.map(result => result.status)).toEqual(['questioned', 'questioned', 'refused'])
    expect(body.results[2]).toMatchObject({ code: 403, recorded: false })
    const why = /^signed by a device that was revoked at \d{4}-\d\d-\d\d \d\d:\d\d UTC, and it came after that$/
    expect((await entriesOf(outage)).filter(stored => stored.standing === 'questioned').map(stored => [stored.entry.id, stored.why])).toEqual(kept.map(signed => [signed.entry.id, [expect.stringMatching(why)]]))
    expect((await stateOf(outage)).questioned.filter(item => item.settled === null)).toHaveLength(2)
    expect((await lost.push(outage, [kept[0]])).body.results[0]).toMatchObject({ status: 'questioned' })
    for (const { entry } of kept) expect((await other.act(outage, 'questioned-settled', { entry: entry.id, words: 'I signed this before I lost it' })).result.status).toBe('accepted')
    expect((await stateOf(outage)).questioned.filter(item => item.settled === null)).toHaveLength(0)
  })

  it('goes by the corrected time, so that a clock that runs ahead loses nothing', async () => {
    const lost = await world.phoneOf('technician')
    const outage = await world.open(lost)
    const ahead = 3_600_000
    const signed = lost.write(outage, 'note-added', { words: 'my clock is an hour ahead' }, { at: isoTime(world.server.now() + ahead), skew: ahead })
    await world.server.advance(1)
    await revoke(lost.id)
    expect((await lost.push(outage, [signed])).body.results[0]!.status).toBe('questioned')
  })

  it('opens the outage that was begun on it, since there is no other record of it', async () => {
    const lost = await world.phoneOf('technician')
    const outage = uuidv7(world.server.now())
    const opening = lost.write(outage, 'outage-opened', world.opening(world.server.now() - 60_000))
    const note = lost.write(outage, 'note-added', { words: 'no light on the rack' })
    await world.server.advance(1)
    await revoke(lost.id)
    const { body } = await lost.push(outage, [opening, note])
    expect(body.results.map(result => result.status)).toEqual(['accepted', 'questioned'])
    expect((await stateOf(outage)).phase).toBe('dark')
  })

  it('is refused all the same when its signature is wrong', async () => {
    const lost = await world.phoneOf('technician')
    const outage = await world.open(lost)
    const signed = lost.write(outage, 'note-added', { words: 'mine' })
    await world.server.advance(1)
    await revoke(lost.id)
    const changed = { ...signed, entry: { ...signed.entry, body: { ...(signed.entry.body as object), words: 'not mine' } } }
    expect((await lost.push(outage, [changed])).body.results[0]).toMatchObject({ status: 'refused', code: 422 })
  })
})
