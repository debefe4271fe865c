/** Who changed what outside of records, on the built server; the promises are this project's own, no published source. */
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { ChangeItem, ChangePage } from '../../shared/schemas/changes'
import { ADMINISTRATOR } from '../support/people'
import type { World } from '../support/world'
import { startWorld, STEP } from '../support/world'

let world: World
beforeAll(async () => { world = await startWorld() }, 120_000)
afterAll(() => world?.server.stop())

const history = async (query = '') => (await world.administrator.send<ChangePage>('GET', `/api/sites/${world.site}/history${query}`)).body
const of = async (subject: 'person' | 'work-kind') => (await world.administrator.send<ChangePage>('GET', `/api/changes?subject=${subject}`)).body.items
const told = ({ deed, subject, subjectName, fields }: ChangeItem) => ({ deed, subject, subjectName, fields: Object.fromEntries(fields.map(({ field, before, after }) => [field, [before, after]])) })

describe('the history of a site', () => {
  it('tells of the site and its equipment, the latest first, with what was referred to by name', async () => {
    const send = async (method: string, path: string, body?: object) => (await world.administrator.send<{ id: string }>(method, `/api/sites/${world.site}${path}`, body)).body
    const rack = await send('POST', '/racks', { controllerId: world.controller, name: 'Rack Z', refrigerant: 'R-448A' })
    await send('PATCH', `/racks/${rack.id}`, { name: 'Rack Y' })
    await send('PATCH', `/racks/${rack.id}`, { name: 'Rack Y' })
    await send('DELETE', `/racks/${rack.id}`)
    await send('PATCH', '', { contactName: 'Piet Harrow' })
    const { items } = await history()
    const controller = items.find(change => change.subject === 'controllers')!.subjectName
    expect(items.slice(0, 4).map(told)).toMatchObject([
      { deed: 'changed', subject: 'site', fields: { contactName: ['', 'Piet Harrow'] } },
      { deed: 'deleted', subject: 'racks', subjectName: 'Rack Y', fields: { name: ['Rack Y', null], controllerId: [controller, null] } },
      { deed: 'changed', subject: 'racks', subjectName: 'Rack Y', fields: { name: ['Rack Z', 'Rack Y'] } },
      { deed: 'added', subject: 'racks', subjectName: 'Rack Z', fields: { name: [null, 'Rack Z'], controllerId: [null, controller] } },
    ])
    expect(items.every(change => change.by === ADMINISTRATOR.name)).toBe(true)
    expect(told(items.at(-1)!)).toMatchObject({ deed: 'added', subject: 'site' })
  })

  it('says nothing of what was refused', async () => {
    const before = (await history()).items.length
    expect((await world.administrator.send('PATCH', `/api/sites/${world.site}`, { rulebook: 'none-such' })).status).toBe(422)
    expect((await world.people.technician.client.send('PATCH', `/api/sites/${world.site}`, { name: 'Mine' })).status).toBe(403)
    expect((await history()).items).toHaveLength(before)
  })

  it('comes in pages that join without a gap', async () => {
    for (let index = 0; index < 60; index++) await world.administrator.send('PATCH', `/api/sites/${world.site}`, { contactPhone: `555 ${index}` })
    const first = await history()
    expect(first.items).toHaveLength(50)
    const second = await history(`?before=${first.next}`)
    expect(first.items.concat(second.items).filter(change => change.fields[0]!.field === 'contactPhone')).toHaveLength(60)
    expect(new Set(first.items.concat(second.items).map(change => change.id)).size).toBe(first.items.length + second.items.length)
    expect(second.next).toBeNull()
  })
})

describe('the history of people and kinds of work', () => {
  it('tells of accounts, and never of a password itself', async () => {
    const { id, client } = world.people.second
    await world.administrator.send('PATCH', `/api/people/${id}`, { disabled: true, password: 'a temporary one' })
    const [latest] = await of('person')
    expect(told(latest!)).toMatchObject({ deed: 'changed', fields: { switchedOff: [false, true], password: [null, 'given anew'] } })
    expect(JSON.stringify(await of('person'))).not.toContain('a temporary one')
    // Switched off is switched off at the next request.
    expect((await client.send('GET', '/api/account')).status).toBe(401)
    expect((await of('person')).filter(change => change.deed === 'added').length).toBeGreaterThan(3)
  })

  it('tells of kinds of work', async () => {
    const { body } = await world.administrator.send<{ id: string }>('POST', '/api/work-kinds', { name: 'Sensor swap', steps: [STEP], rollBack: [] })
    await world.administrator.send('DELETE', `/api/work-kinds/${body.id}`)
    expect((await of('work-kind')).slice(0, 2).map(told)).toMatchObject([
      { deed: 'deleted', subjectName: 'Sensor swap', fields: { name: ['Sensor swap', null] } },
      { deed: 'added', subjectName: 'Sensor swap', fields: { name: [null, 'Sensor swap'] } },
    ])
  })

  it('is for administrators', async () => {
    expect((await world.people.supervisor.client.send('GET', '/api/changes?subject=person')).status).toBe(403)
    expect((await world.administrator.send('GET', '/api/changes')).status).toBe(422)
  })
})
