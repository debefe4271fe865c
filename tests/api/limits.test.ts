/** Stricter settings of a site on the built server; the promises are this project's own, no published source. */
import postgres from 'postgres'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { ChangeItem } from '../../shared/schemas/changes'
import type { SiteLimits } from '../../shared/schemas/equipment'
import type { BookSite, SiteView } from '../../shared/schemas/site-view'
import type { Snapshot } from '../../shared/record/snapshot'
import type { World } from '../support/world'
import { startWorld } from '../support/world'
import { ADMINISTRATOR } from '../support/people'

interface Fault { data?: { field?: string, reason: string } }
type Answer = SiteLimits & { changes: ChangeItem[] }

const STRICT: SiteLimits = { holding: { addAccuracy: true, allowsMinus12: false, classes: [{ foodClass: 'tcs', limit: 39, minutes: 120 }] }, instrumentCheckDays: 60 }
const AS_BEFORE: SiteLimits = { holding: { addAccuracy: false, allowsMinus12: false, classes: [] }, instrumentCheckDays: 90 }

let world: World
beforeAll(async () => { world = await startWorld() }, 120_000)
afterAll(() => world?.server.stop())

const put = (body: unknown) => world.administrator.send<Fault>('PUT', `/api/sites/${world.site}/limits`, body)
const read = async (name: 'technician' | 'supervisor' | 'auditor' = 'technician') => (await world.people[name].client.send<Answer>('GET', `/api/sites/${world.site}/limits`)).body
const snapshot = async () => (await world.people.technician.client.send<Snapshot>('GET', `/api/controllers/${world.controller}/snapshot`)).body

describe('limits of a site', () => {
  it('are as the rulebook has them at first, with no history', async () => {
    expect(await read()).toEqual({ ...AS_BEFORE, changes: [] })
  })

  it.each<[string, SiteLimits, string, string]>([
    ['a laxer limit', { ...STRICT, holding: { ...STRICT.holding, classes: [{ foodClass: 'tcs', limit: 45, minutes: null }] } }, 'holding.classes[0].limit', 'Below 41 °F'],
    ['a longer time', { ...STRICT, holding: { ...STRICT.holding, classes: [{ foodClass: 'tcs', limit: null, minutes: 240 }] } }, 'holding.classes[0].minutes', 'Shorter than 4 hours'],
    ['a choice that is not left', { ...STRICT, holding: { ...STRICT.holding, allowsMinus12: true } }, 'holding.allowsMinus12', 'leaves no such choice'],
    ['no days', { ...STRICT, instrumentCheckDays: 0 }, 'instrumentCheckDays', 'At least 1 day'],
  ])('refuse %s', async (_name, body, field, words) => {
    const { status, body: answer } = await put(body)
    expect([status, answer.data?.field]).toEqual([422, field])
    expect(answer.data?.reason).toContain(words)
    expect((await read()).changes).toEqual([])
  })

  it('are set, with who and when, and go into the next snapshot', async () => {
    const phone = await world.phoneOf('technician')
    const open = await world.open(phone)
    expect((await put(STRICT)).status).toBe(200)
    const { changes, ...limits } = await read('supervisor')
    expect(limits).toEqual(STRICT)
    expect(changes).toMatchObject([{ by: ADMINISTRATOR.name, subject: 'limits', deed: 'changed', fields: [
      { field: 'addAccuracy', before: false, after: true },
      { field: 'class:tcs', before: null, after: { limit: 39, minutes: 120 } },
      { field: 'instrumentCheckDays', before: 90, after: 60 },
    ] }])
    const after = await snapshot()
    expect(after.site).toMatchObject(STRICT)
    expect(after.cases.every(item => item.foodClass !== 'tcs' || (item.limit.value === 39 && item.stricter))).toBe(true)
    // The outage that was opened before keeps what it was planned with.
    const { body: state } = await world.people.technician.client.send<{ snapshot: Snapshot }>('GET', `/api/outages/${open}`)
    expect(state.snapshot.site).toMatchObject(AS_BEFORE)
  })

  it('are not written again where nothing changes', async () => {
    expect((await put(STRICT)).status).toBe(200)
    expect((await read()).changes).toHaveLength(1)
  })

  it('stand on the rulebook\'s page, for those who may see the site', async () => {
    const of = async (name: 'auditor' | 'stranger') => (await world.people[name].client.send<BookSite[]>('GET', '/api/rulebooks/us-food-code-2022/sites')).body
    const seen = (await of('auditor')).find(site => site.id === world.site)!
    expect(seen).toMatchObject({ ...STRICT, set: { 'class:tcs': { by: ADMINISTRATOR.name }, 'instrumentCheckDays': { by: ADMINISTRATOR.name } } })
    expect((await of('stranger')).some(site => site.id === world.site)).toBe(false)
  })

  it('hold the site to its rulebook until they are taken back', async () => {
    const move = () => world.administrator.send<Fault>('PATCH', `/api/sites/${world.site}`, { rulebook: 'us-wa-doh' })
    expect(await move()).toMatchObject({ status: 422, body: { data: { field: 'rulebook', reason: expect.stringContaining('written for the present rulebook') } } })
    expect((await put(AS_BEFORE)).status).toBe(200)
    expect((await read()).changes.map(change => change.fields.length)).toEqual([3, 3])
    const { body } = await world.administrator.send<SiteView>('GET', `/api/sites/${world.site}`)
    expect(body).toMatchObject(AS_BEFORE)
  })

  it('keep a history that the database itself does not let go', async () => {
    const sql = postgres(world.server.databaseUrl, { max: 1 })
    await expect(sql`update changes set person_name = 'Somebody'`).rejects.toThrow('append-only')
    await expect(sql`delete from changes`).rejects.toThrow('append-only')
    await expect(sql`truncate changes`).rejects.toThrow('append-only')
    await sql.end()
  })
})
