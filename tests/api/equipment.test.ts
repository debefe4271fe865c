// The built server with a PostgreSQL of the test's own; the promises are this project's own, no published source.
import { readFile } from 'node:fs/promises'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { ImportPreview } from '~~/shared/import/preview'
import type { SiteLine, SiteView, WorkKindItem } from '~~/shared/schemas/site-view'
import { DEMO_PASSWORD, signIn, visitor } from '../support/client'
import type { Client } from '../support/client'
import { startTestServer } from '../support/server'
import type { TestServer } from '../support/server'

interface Fault { data?: { field?: string, reason: string } }

const SITE = { code: 'Q099', name: 'Tannery Row', timeZone: 'America/Chicago', temperatureUnit: 'F', pressureUnit: 'psig', rulebook: 'us-food-code-2022' }
const NOBODY = '00000000-0000-4000-8000-000000000000'
const example = new URL('../../docs/example-points.csv', import.meta.url)

let server: TestServer
let administrator: Client
/** A technician who may see one site. */
let technician: Client
let site: string
let elsewhere: string
const made: Record<string, string> = {}

/** Sends to the equipment of the test's own site. */
async function send(method: string, path: string, body?: unknown, client = administrator) {
  return client.send<{ id: string } & Fault>(method, `/api/sites/${site}/${path}`, body)
}

async function make(name: string, resource: string, body: object): Promise<string> {
  const answer = await send('POST', resource, body)
  expect(answer.status, JSON.stringify(answer.body)).toBe(201)
  return made[name] = answer.body.id
}

async function view(): Promise<SiteView> {
  return (await administrator.send<SiteView>('GET', `/api/sites/${site}`)).body
}

beforeAll(async () => {
  server = await startTestServer()
  const first = { email: 'admin@quillfeather.example', name: 'Maren Oduya', password: DEMO_PASSWORD }
  expect((await visitor(server.url).send('POST', '/api/setup', first)).status).toBe(201)
  administrator = await signIn(server.url, first.email)
  site = (await administrator.send<{ id: string }>('POST', '/api/sites', SITE)).body.id
  elsewhere = (await administrator.send<{ id: string }>('POST', '/api/sites', { ...SITE, code: 'Q100', name: 'Harbour Road' })).body.id
  const person = { email: 'technician@quillfeather.example', name: 'Ansel Pruitt', role: 'technician', password: 'a first password', siteIds: [site] }
  expect((await administrator.send('POST', '/api/people', person)).status).toBe(201)
  technician = await signIn(server.url, person.email, person.password)
  expect((await technician.send('POST', '/api/account/password', { current: person.password, next: DEMO_PASSWORD })).status).toBeLessThan(300)
  technician = await signIn(server.url, person.email)

  await make('controller', 'controllers', { name: 'Rack controller' })
  await make('other controller', 'controllers', { name: 'Case controller' })
  await make('rack A', 'racks', { controllerId: made.controller, name: 'Rack A', refrigerant: 'R-448A' })
  await make('rack B', 'racks', { controllerId: made.controller, name: 'Rack B', refrigerant: 'R-448A' })
  await make('other rack', 'racks', { controllerId: made['other controller'], name: 'Rack A', refrigerant: 'R-744' })
  await make('A medium', 'suction-groups', { rackId: made['rack A'], name: 'A medium', stage: 'medium', targetSuctionPsig: 44, lowCutOutPsig: 12 })
  await make('B low', 'suction-groups', { rackId: made['rack B'], name: 'B low', stage: 'low' })
  for (const name of ['A1 produce', 'A2 deli and fish', 'A3 dairy', 'A4 meat']) await make(name, 'circuits', { rackId: made['rack A'], suctionGroupId: made['A medium'], name, defrostKind: 'off-time' })
  for (const name of ['B1 freezer doors', 'B2 walk-in freezer']) await make(name, 'circuits', { rackId: made['rack B'], suctionGroupId: made['B low'], name, defrostKind: 'electric' })
  for (const name of ['Dairy wall 1–3', 'Dairy wall 4–7', 'Deli island 2', 'Deli service 3', 'Fish service', 'Juice doors 8', 'Meat 1–3', 'Produce 1–6', 'Walk-in cooler']) {
    await make(name, 'cases', { controllerId: made.controller, name, kind: 'open-multideck', foodClass: 'tcs', usualC: 2 })
  }
  for (const name of ['Freezer doors 9', 'Walk-in freezer']) await make(name, 'cases', { controllerId: made.controller, name, kind: 'walk-in-freezer', foodClass: 'frozen', usualC: -21 })
}, 120_000)
afterAll(() => server?.stop())

describe('who sees and changes equipment', () => {
  it('shows everybody the sites that are theirs', async () => {
    const of = async (client: Client) => (await client.send<SiteLine[]>('GET', '/api/sites')).body.map(line => line.code)
    expect(await of(administrator)).toEqual(['Q100', 'Q099'])
    expect(await of(technician)).toEqual(['Q099'])
    expect((await technician.send<SiteView>('GET', `/api/sites/${site}`)).body).toMatchObject({ code: 'Q099', racks: [{ name: 'Rack A' }, { name: 'Rack A' }, { name: 'Rack B' }] })
  })

  it('answers 404 for a site that is not theirs as for one that is none', async () => {
    for (const id of [elsewhere, NOBODY, 'Q100']) {
      const answer = await technician.send<Fault>('GET', `/api/sites/${id}`)
      expect([answer.status, answer.body.data?.reason]).toEqual([404, 'There is no such site'])
      expect((await technician.send('POST', `/api/sites/${id}/controllers`, { name: 'X' })).status).toBe(404)
    }
  })

  it('lets only an administrator change anything, and says so', async () => {
    const answers = await Promise.all([
      technician.send<Fault>('POST', '/api/sites', SITE),
      technician.send<Fault>('PATCH', `/api/sites/${site}`, { name: 'Mine' }),
      send('POST', 'racks', { controllerId: made.controller, name: 'Rack C', refrigerant: 'R-22' }, technician),
      send('PATCH', `racks/${made['rack A']}`, { name: 'Mine' }, technician),
      send('DELETE', `racks/${made['rack B']}`, undefined, technician),
      technician.send<Fault>('POST', `/api/controllers/${made.controller}/points/preview`, { text: 'tag,kind,name' }),
      technician.send<Fault>('POST', `/api/controllers/${made.controller}/points/import`, { text: 'tag,kind,name' }),
      technician.send<Fault>('POST', '/api/work-kinds', {}),
      technician.send<Fault>('DELETE', `/api/work-kinds/${NOBODY}`),
    ])
    for (const { status, body } of answers) expect([status, body.data?.reason]).toEqual([403, 'Only an administrator changes equipment'])
  })

  it('answers 401 to nobody in particular', async () => {
    for (const path of ['/api/sites', `/api/sites/${site}`, '/api/work-kinds']) expect((await visitor(server.url).send('GET', path)).status).toBe(401)
  })
})

describe('sites', () => {
  it('refuses a code in use, a strange rulebook, a strange time zone', async () => {
    const of = async (body: object) => { const { status, body: { data } } = await administrator.send<Fault>('POST', '/api/sites', { ...SITE, ...body }); return [status, data?.field] }
    expect(await of({})).toEqual([409, 'code'])
    expect(await of({ code: 'Q101', rulebook: 'none-such' })).toEqual([422, 'rulebook'])
    expect(await of({ code: 'Q101', timeZone: 'Moon/Crater' })).toEqual([422, 'timeZone'])
    expect((await administrator.send<Fault>('PATCH', `/api/sites/${elsewhere}`, { code: 'q099' })).status).toBe(409)
  })

  it('changes what is sent and nothing else', async () => {
    expect((await administrator.send('PATCH', `/api/sites/${site}`, { contactName: 'Odalys Brandt' })).status).toBe(200)
    expect(await view()).toMatchObject({ name: 'Tannery Row', contactName: 'Odalys Brandt', intervalMinutes: 10 })
  })

  it('keeps the rulebook while cases hold classes that another has not', async () => {
    const answer = await administrator.send<Fault>('PATCH', `/api/sites/${site}`, { rulebook: 'uk-england-2013' })
    expect([answer.status, answer.body.data?.field]).toEqual([422, 'rulebook'])
    expect(answer.body.data?.reason).toContain('Fish service')
  })
})

describe('equipment that does not fit', () => {
  it.each<[string, number, string, string, () => object]>([
    ['a rack of an unknown refrigerant', 422, 'refrigerant', 'racks', () => ({ controllerId: made.controller, name: 'C', refrigerant: 'R-999' })],
    ['a rack of another site\'s controller', 422, 'controllerId', 'racks', () => ({ controllerId: NOBODY, name: 'C', refrigerant: 'R-22' })],
    ['a rack of a name in use', 409, 'name', 'racks', () => ({ controllerId: made.controller, name: 'rack a', refrigerant: 'R-22' })],
    ['a cut-out above the target', 422, 'lowCutOutPsig', 'suction-groups', () => ({ rackId: made['rack A'], name: 'C', stage: 'medium', targetSuctionPsig: 40, lowCutOutPsig: 41 })],
    ['a circuit of another rack\'s group', 422, 'suctionGroupId', 'circuits', () => ({ rackId: made['rack B'], suctionGroupId: made['A medium'], name: 'C', defrostKind: 'none' })],
    ['a case of another controller\'s circuit', 422, 'circuitId', 'cases', () => ({ controllerId: made['other controller'], circuitId: made['A3 dairy'], name: 'C', kind: 'open-island', foodClass: 'tcs', usualC: 2 })],
    ['a case of a strange food class', 422, 'foodClass', 'cases', () => ({ controllerId: made.controller, name: 'C', kind: 'open-island', foodClass: 'chilled', usualC: 2 })],
    ['a limit that is not stricter', 422, 'limitStricter', 'cases', () => ({ controllerId: made.controller, name: 'C', kind: 'open-island', foodClass: 'tcs', usualC: 2, limitStricter: 41 })],
    ['a point of another controller\'s rack', 422, 'rackId', 'points', () => ({ controllerId: made.controller, tag: 'X-1', kind: 'other', name: 'X', rackId: made['other rack'] })],
    ['a group of another rack', 422, 'suctionGroupId', 'points', () => ({ controllerId: made.controller, tag: 'X-1', kind: 'other', name: 'X', rackId: made['rack A'], suctionGroupId: made['B low'] })],
    ['a heater held on', 422, 'hand', 'points', () => ({ controllerId: made.controller, tag: 'X-1', kind: 'defrost-heater', name: 'X', hand: 'on' })],
    ['a drive of nothing', 422, 'drives', 'points', () => ({ controllerId: made.controller, tag: 'X-1', kind: 'drive', name: 'X', drives: 'C-99' })],
    ['an instrument without an accuracy', 422, 'accuracyC', 'instruments', () => ({ name: 'Probe', kind: 'product' })],
    ['a list that there is not', 404, '', 'toasters', () => ({})],
  ])('refuses %s', async (_what, status, field, resource, body) => {
    const answer = await send('POST', resource, body())
    expect([answer.status, answer.body.data?.field ?? '']).toEqual([status, field])
    expect(answer.body.data?.reason).toBeTruthy()
  })

  it('leaves a thing where it is', async () => {
    const answer = await send('PATCH', `racks/${made['rack B']}`, { controllerId: made['other controller'] })
    expect([answer.status, answer.body.data?.field]).toEqual([422, 'controllerId'])
  })

  it('deletes nothing that is in use, and says by what', async () => {
    const reasons = async (path: string) => { const { status, body } = await send('DELETE', path); return [status, body.data?.reason] }
    expect(await reasons(`racks/${made['rack A']}`)).toEqual([409, 'In use by 1 suction group and 4 circuits'])
    expect(await reasons(`suction-groups/${made['B low']}`)).toEqual([409, 'In use by 2 circuits'])
    expect(await reasons(`controllers/${made['other controller']}`)).toEqual([409, 'In use by 1 rack'])
    expect(await reasons(`racks/${NOBODY}`)).toEqual([404, 'There is no such rack'])
    const spare = await make('spare', 'instruments', { name: 'Spare', kind: 'infrared', accuracyC: 2 })
    expect((await send('DELETE', `instruments/${spare}`)).status).toBe(204)
    expect((await view()).instruments).toEqual([])
  })

  it('does not find another site\'s things', async () => {
    expect((await administrator.send('PATCH', `/api/sites/${elsewhere}/racks/${made['rack A']}`, { name: 'X' })).status).toBe(404)
    expect((await administrator.send('DELETE', `/api/sites/${elsewhere}/racks/${made['rack A']}`)).status).toBe(404)
  })
})

describe('the import of a point list', () => {
  const list = (kind: 'preview' | 'import', text: string, controller = made.controller) => administrator.send<ImportPreview & Fault & { data?: { faults?: unknown[] } }>('POST', `/api/controllers/${controller}/points/${kind}`, { text })

  it('lands nothing by a preview', async () => {
    const { status, body } = await list('preview', await readFile(example, 'utf8'))
    expect([status, body.counts, body.faults]).toEqual([200, { new: 26, changed: 0, unchanged: 0 }, []])
    expect((await view()).points).toEqual([])
  })

  it('lands nothing where there is a fault, however many rows are sound', async () => {
    const text = `${await readFile(example, 'utf8')}X-1,toaster,X,,,,,,,,,,,,,,\n`
    const { status, body } = await list('import', text)
    expect([status, body.data?.reason]).toEqual([422, '1 fault; nothing was imported'])
    expect(body.data?.faults).toEqual([{ row: 28, column: 'kind', reason: expect.stringContaining('There is no kind toaster') }])
    expect((await view()).points).toEqual([])
  })

  it('lands all 26 points once, sent as a file', async () => {
    const response = await administrator.fetch(`/api/controllers/${made.controller}/points/import`, { method: 'POST', headers: { 'content-type': 'text/csv' }, body: await readFile(example) })
    expect([response.status, (await response.json() as ImportPreview).counts]).toEqual([200, { new: 26, changed: 0, unchanged: 0 }])
    const { points } = await view()
    expect(points).toHaveLength(26)
    expect(points.find(point => point.tag === 'DR-1')).toMatchObject({ kind: 'drive', hand: { hz: 60 }, rackId: made['rack A'], suctionGroupId: made['A medium'], onLoss: 'off' })
    expect(points.find(point => point.tag === 'LLS-A3')).toMatchObject({ circuitId: made['A3 dairy'], caseIds: [made['Dairy wall 1–3'], made['Dairy wall 4–7']] })
  })

  it('updates by tag and says what changed', async () => {
    const { body } = await list('import', 'tag;kind;name;rated_a;cases\nC-1;compressor;Compressor 1;41,5;""\nC-2;compressor;Compressor 2;34;""\nAS-1;anti-sweat-heater;Door heaters;;"Freezer doors 9; Walk-in freezer"')
    expect(body).toMatchObject({ counts: { new: 1, changed: 1, unchanged: 1 }, untouched: 24 })
    expect(body.rows[0]!.changes).toEqual([{ column: 'rated_a', from: '42', to: '41.5' }])
    expect((await view()).points.find(point => point.tag === 'C-1')).toMatchObject({ ratedA: 41.5, capacityKw: 36 })
  })

  it('answers 413 to a file too large, 400 to none, 422 to one that is not UTF-8, 404 for a foreign controller', async () => {
    const post = (body: BodyInit) => administrator.fetch(`/api/controllers/${made.controller}/points/preview`, { method: 'POST', headers: { 'content-type': 'text/csv' }, body })
    expect((await post('x'.repeat(2_000_001))).status).toBe(413)
    expect((await post('')).status).toBe(400)
    expect((await post(new Uint8Array([0x74, 0xE9]))).status).toBe(422)
    expect((await list('preview', 'tag,kind,name', NOBODY)).status).toBe(404)
  })

  it('keeps a case that a point serves, and a point that a drive drives', async () => {
    const { points } = await view()
    const idOf = (tag: string) => points.find(point => point.tag === tag)!.id
    expect((await send('PATCH', `points/${idOf('DR-1')}`, { drives: 'C-1' })).status).toBe(200)
    expect((await send('DELETE', `points/${idOf('C-1')}`)).body.data?.reason).toBe('In use by the drive DR-1')
    expect((await send('DELETE', `cases/${made['Fish service']}`)).body.data?.reason).toBe('In use by 1 point')
    expect((await send('PATCH', `points/${idOf('C-1')}`, { tag: 'C-10' })).status).toBe(200)
    expect((await view()).points.find(point => point.tag === 'DR-1')?.drives).toBe('C-10')
  })

  it('lands 2,000 rows in a time that a person waits', async () => {
    const rows = Array.from({ length: 1973 }, (_, index) => `Z-${index},other,Spare ${index},Rack A`).join('\n')
    const began = Date.now()
    const { status, body } = await list('import', `tag,kind,name,rack\n${rows}`)
    expect([status, body.counts?.new]).toEqual([200, 1973])
    expect(Date.now() - began).toBeLessThan(10_000)
    expect((await send('POST', 'points', { controllerId: made.controller, tag: 'Y-1', kind: 'other', name: 'One too many' })).status).toBe(409)
  })
})

describe('kinds of work', () => {
  const step = { id: 'work', name: 'Work', shortest: 1, likely: 2, longest: 4, dark: true, after: [] }
  const of = (method: string, path: string, body?: unknown) => administrator.send<WorkKindItem & Fault>(method, `/api/work-kinds${path}`, body)

  it('are made, read by all, changed and deleted', async () => {
    const { status, body: { id } } = await of('POST', '', { name: 'Sensor change', steps: [step] })
    expect(status).toBe(201)
    expect((await technician.send<WorkKindItem[]>('GET', '/api/work-kinds')).body).toEqual([{ id, name: 'Sensor change', steps: [step], rollBack: [] }])
    expect((await of('PATCH', `/${id}`, { name: 'Sensor exchange' })).body).toMatchObject({ id, name: 'Sensor exchange', steps: [step] })
    expect((await of('POST', '', { name: 'SENSOR exchange', steps: [step] })).status).toBe(409)
    expect((await of('DELETE', `/${id}`)).status).toBe(204)
    expect((await of('DELETE', `/${id}`)).status).toBe(404)
  })

  it('are refused with the field in question', async () => {
    const fieldOf = async (body: object) => { const answer = await of('POST', '', body); return [answer.status, answer.body.data?.field] }
    expect(await fieldOf({ name: 'X', steps: [] })).toEqual([422, 'steps'])
    expect(await fieldOf({ name: 'X', steps: [{ ...step, likely: 9 }] })).toEqual([422, 'steps[0].longest'])
    expect(await fieldOf({ name: 'X', steps: [{ ...step, after: ['b'] }, { ...step, id: 'b', after: ['work'] }] })).toEqual([422, 'steps'])
  })
})
