/** Alerts on the built server with its jobs; the promises are this project's own, no published source. */
import { randomUUID } from 'node:crypto'
import postgres from 'postgres'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { StoredEntry } from '../../shared/record/entry'
import type { AlertRules } from '../../shared/schemas/alert-rules'
import { PLAIN_ALERT_RULES } from '../../shared/schemas/alert-rules'
import type { AlertList, SiteAlerts } from '../../shared/schemas/alerts'
import type { MailReceiver } from '../support/mail'
import { startMailReceiver } from '../support/mail'
import { ADMINISTRATOR } from '../support/people'
import type { World } from '../support/world'
import { startWorld } from '../support/world'

interface Fault { data?: { field?: string, reason: string } }

let world: World
let receiver: MailReceiver
let sql: ReturnType<typeof postgres>
beforeAll(async () => {
  receiver = await startMailReceiver()
  world = await startWorld({ jobs: true, env: { HOLDOVER_SMTP_URL: receiver.url, HOLDOVER_MAIL_FROM: 'Holdover <watch@quillfeather.example>' } })
  sql = postgres(world.server.databaseUrl, { max: 1 })
}, 120_000)
afterAll(async () => {
  await sql?.end()
  await world?.server.stop()
  await receiver?.close()
})

/** Asks for a look now; by itself the job looks every twenty seconds. */
const look = () => sql`insert into jobs.job (name, singleton_key) values ('alerts', ${randomUUID()})`
const list = async (name: 'technician' | 'supervisor' | 'stranger' = 'supervisor') => (await world.people[name].client.send<AlertList>('GET', '/api/alerts')).body
async function until<T>(read: () => Promise<T>, fits: (value: T) => boolean): Promise<T> {
  for (let tries = 0; tries < 200; tries++) {
    const value = await read()
    if (fits(value)) return value
    await new Promise(resolve => setTimeout(resolve, 100))
  }
  throw new Error(`It never came; there is ${JSON.stringify(await read())}`)
}

describe('who is told', () => {
  const path = () => `/api/sites/${world.site}/alerts`
  const put = (body: unknown) => world.administrator.send<Fault>('PUT', path(), body)
  const level = (change: Partial<AlertRules['levels'][number]> = {}) => ({ answerable: false, supervisors: false, people: [], ...change })
  const rules = (...levels: AlertRules['levels']): AlertRules => ({ levels, passOnAfter: [5, 10] })

  it('is at first the technician, then the supervisors; those who see the site may be named', async () => {
    const { body } = await world.people.technician.client.send<SiteAlerts>('GET', path())
    expect(body).toMatchObject({ rules: PLAIN_ALERT_RULES, changes: [] })
    const ids = body.people.map(person => person.id)
    expect(ids).toEqual(expect.arrayContaining([world.people.technician.id, world.people.supervisor.id]))
    expect(ids).not.toContain(world.people.stranger.id)
  })

  it.each<[string, () => unknown, string, string]>([
    ['nobody first', () => rules(level(), level({ supervisors: true }), level()), 'levels[0]', 'Somebody must be told first'],
    ['a third without a second', () => rules(level({ answerable: true }), level(), level({ supervisors: true })), 'levels[1]', 'Nobody is told second'],
    ['no minutes', () => ({ ...PLAIN_ALERT_RULES, passOnAfter: [0, 10] }), 'passOnAfter[0]', 'At least 1 minute'],
    ['somebody who may not see the site', () => rules(level({ people: [world.people.stranger.id] }), level(), level()), 'levels[0].people', 'may not see this site'],
    ['somebody twice', () => rules(level({ people: [world.people.supervisor.id, world.people.supervisor.id] }), level(), level()), 'levels[0].people', 'twice'],
  ])('refuses %s', async (_name, body, field, words) => {
    const { status, body: answer } = await put(body())
    expect([status, answer.data?.field]).toEqual([422, field])
    expect(answer.data?.reason).toContain(words)
  })

  it('is set, with who and when', async () => {
    const { name } = (await world.people.supervisor.client.send<{ name: string }>('GET', '/api/account')).body
    expect((await put(rules(level({ answerable: true }), level({ people: [world.people.supervisor.id] }), level()))).status).toBe(200)
    const { body } = await world.people.auditor.client.send<SiteAlerts>('GET', path())
    expect(body.rules.levels[1]!.people).toEqual([world.people.supervisor.id])
    expect(body.changes).toMatchObject([{ by: ADMINISTRATOR.name, subject: 'alerts', deed: 'changed', fields: [{ field: 'second', before: ['the supervisors of the site'], after: [name] }] }])
  })
})

describe('an outage that nobody reads', () => {
  it('is alerted by a job, by mail and in the list, acknowledged with one request, and stands in the record', async () => {
    const phone = await world.phoneOf('technician')
    const outage = await world.open(phone, world.server.now() - 60 * 60_000)
    await world.server.advance(3)
    await look()
    const { items } = await until(() => list(), found => found.items.length > 0)
    expect(items[0]).toMatchObject({ outage, site: 'Mill Lane', timeZone: 'America/Chicago', acknowledged: null })
    const late = items.find(item => item.alert === 'round-late')!
    expect(late.words).toMatch(/^Mill Lane: the round is late: .+ Take the round now\.$/)
    expect((await list('stranger')).items).toEqual([])

    const { mail } = await receiver.find(item => item.to === 'technician@quillfeather.example' && item.mail.text.includes('the round is late'))
    expect(mail.text.split('\n')[0]).toMatch(/^Mill Lane: /)
    expect(mail.text).toContain(`/outages/${outage}`)

    const path = `/api/outages/${outage}/alerts/acknowledge`
    const first = await world.people.technician.client.send<{ name: string }>('POST', path, { key: late.key })
    expect(first.status).toBe(200)
    expect((await world.people.supervisor.client.send('POST', path, { key: late.key })).body).toEqual(first.body)
    expect((await list()).items.find(item => item.key === late.key)!.acknowledged).toMatchObject({ name: first.body.name })

    const { entries } = (await world.people.auditor.client.send<{ entries: StoredEntry[] }>('GET', `/api/outages/${outage}/entries?after=0`)).body
    const mine = entries.filter(stored => (stored.entry.body as { key?: string }).key === late.key)
    expect(mine.map(stored => [stored.entry.kind, stored.entry.by])).toEqual([['alert-raised', 'server'], ['alert-acknowledged', 'server']])

    // A warning of the plant is looked at at once, without waiting for the clock.
    const group = world.snapshot.suctionGroups[0]!.id
    await phone.act(outage, 'pressure-read', { round: 0, suctionGroupId: group, suctionPsig: 21, dischargePsig: null, words: '' })
    await until(() => list(), found => found.items.some(item => item.alert === 'pressure'))
  }, 60_000)
})
