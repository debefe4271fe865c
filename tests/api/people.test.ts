// Promises of this project's own; no published source.
import postgres from 'postgres'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Account, PersonItem } from '../../shared/schemas/people'
import { signIn, visitor } from '../support/client'
import type { Client } from '../support/client'
import { addPerson, ADMINISTRATOR, OWN_PASSWORD, setUp } from '../support/people'
import { startTestServer } from '../support/server'
import type { TestServer } from '../support/server'

interface Fault { data: { field?: string, reason: string } }
let server: TestServer
let administrator: Client
let first: PersonItem

beforeAll(async () => {
  server = await startTestServer()
  administrator = await setUp(server.url)
  first = (await administrator.send<{ items: PersonItem[] }>('GET', '/api/people')).body.items[0]!
}, 120_000)
afterAll(() => server?.stop())

const change = (id: string, body: unknown, client = administrator) => client.send<Fault & PersonItem>('PATCH', `/api/people/${id}`, body)

describe('who may manage people', () => {
  it.each(['technician', 'supervisor', 'auditor'] as const)('not a %s', async (role) => {
    await addPerson(administrator, `${role}@quillfeather.example`, role)
    const client = await signIn(server.url, `${role}@quillfeather.example`, OWN_PASSWORD)
    expect((await client.send('GET', '/api/people')).status).toBe(403)
    expect((await client.send('POST', '/api/people', { email: 'x@quillfeather.example', name: 'X', role: 'administrator', password: 'a long password' })).status).toBe(403)
    expect((await change(first.id, { name: 'X' }, client)).status).toBe(403)
    expect((await client.send<Account>('GET', '/api/account')).body).toMatchObject({ email: `${role}@quillfeather.example`, role, sites: [] })
  })

  // An error page is rendered without a session: guarded, it would lead to the sign-in page and back for ever.
  it('is told on a page, without being led in circles', async () => {
    const page = async (client: Client, path: string) => (await client.fetch(path, { headers: { accept: 'text/html' } })).status
    await addPerson(administrator, 'curious@quillfeather.example', 'technician')
    const client = await signIn(server.url, 'curious@quillfeather.example', OWN_PASSWORD)
    expect(await page(client, '/people')).toBe(403)
    expect(await page(administrator, '/people')).toBe(200)
    expect(await page(administrator, '/people/0190a6f0-0000-7000-8000-000000000001')).toBe(404)
    expect(await page(visitor(server.url), '/people')).toBe(302)
  })

  it('nobody without a session', async () => {
    for (const [method, path] of [['GET', '/api/people'], ['POST', '/api/people'], ['PATCH', `/api/people/${first.id}`], ['GET', '/api/account']] as const) {
      expect((await visitor(server.url).send(method, path, method === 'GET' ? undefined : {})).status).toBe(401)
    }
  })
})

describe('adding a person', () => {
  it('takes each e-mail address once, in any case', async () => {
    const body = { email: 'Twice@Quillfeather.example', name: 'Twice', role: 'auditor', password: 'a long password' }
    expect(await administrator.send<PersonItem>('POST', '/api/people', body)).toMatchObject({ status: 201, body: { email: 'twice@quillfeather.example', mustChangePassword: true } })
    const again = await administrator.send<Fault>('POST', '/api/people', { ...body, email: ' TWICE@quillfeather.example' })
    expect([again.status, again.body.data.field]).toEqual([409, 'email'])
  })

  it.each([
    [{ email: 'no address' }, 'email'],
    [{ name: '  ' }, 'name'],
    [{ name: 'x'.repeat(81) }, 'name'],
    [{ role: 'owner' }, 'role'],
    [{ password: 'nine char' }, 'password'],
    [{ siteIds: ['1'] }, 'siteIds[0]'],
    [{ siteIds: ['0190a6f0-0000-7000-8000-000000000001'] }, 'siteIds'],
  ])('names the field that is wrong: %j', async (wrong, field) => {
    const answer = await administrator.send<Fault>('POST', '/api/people', { email: 'wrong@quillfeather.example', name: 'Wrong', role: 'auditor', password: 'a long password', ...wrong })
    expect([answer.status, answer.body.data.field]).toEqual([422, field])
    const { body: { items } } = await administrator.send<{ items: PersonItem[] }>('GET', '/api/people')
    expect(items.some(person => person.email === 'wrong@quillfeather.example')).toBe(false)
  })

  it('never tells a password or its hash', async () => {
    expect(JSON.stringify((await administrator.send('GET', '/api/people')).body)).not.toMatch(/argon2|hash|"password"/i)
  })
})

describe('changing a person', () => {
  it('changes a name without ending the session', async () => {
    const person = await addPerson(administrator, 'renamed@quillfeather.example', 'auditor')
    const client = await signIn(server.url, 'renamed@quillfeather.example', OWN_PASSWORD)
    expect((await change(person.id, { name: 'Renamed Once' })).body.name).toBe('Renamed Once')
    expect((await client.send<Account>('GET', '/api/account')).body.name).toBe('Renamed Once')
  })

  it('answers 404 for nobody and 422 for a wrong field', async () => {
    expect((await change('0190a6f0-0000-7000-8000-000000000001', { name: 'X' })).status).toBe(404)
    expect((await change('1', { name: 'X' })).status).toBe(404)
    expect((await change(first.id, { role: 'owner' })).body.data.field).toBe('role')
  })

  it('keeps the last administrator', async () => {
    expect((await change(first.id, { role: 'auditor' })).body.data.field).toBe('role')
    const off = await change(first.id, { disabled: true })
    expect([off.status, off.body.data.field]).toEqual([409, 'disabled'])
    const second = await addPerson(administrator, 'second@quillfeather.example', 'administrator')
    expect((await change(second.id, { disabled: true })).status).toBe(200)
    expect((await change(first.id, { role: 'auditor' })).status).toBe(409)
  })

  it('keeps one administrator when two take each other\'s role away at once', async () => {
    const rival = await addPerson(administrator, 'rival@quillfeather.example', 'administrator')
    const client = await signIn(server.url, 'rival@quillfeather.example', OWN_PASSWORD)
    const answers = await Promise.all([change(rival.id, { role: 'auditor' }), change(first.id, { role: 'auditor' }, client)])
    expect(answers.filter(answer => answer.status === 200)).toHaveLength(1)
    // Whoever is left gives the first one back what the other tests need.
    if (answers[1]!.status === 200) {
      expect((await change(first.id, { role: 'administrator' }, client)).status).toBe(200)
      administrator = await signIn(server.url, ADMINISTRATOR.email, ADMINISTRATOR.password)
    }
    const { body: { items } } = await administrator.send<{ items: PersonItem[] }>('GET', '/api/people')
    expect(items.some(person => person.role === 'administrator' && !person.disabledAt)).toBe(true)
  })

  it('gives a temporary password that must be changed, but not to oneself', async () => {
    const person = await addPerson(administrator, 'forgot@quillfeather.example', 'technician')
    const client = await signIn(server.url, 'forgot@quillfeather.example', OWN_PASSWORD)
    expect((await change(person.id, { password: 'given for one day' })).body.mustChangePassword).toBe(true)
    expect((await client.send('GET', '/api/account')).status).toBe(401)
    await expect(signIn(server.url, 'forgot@quillfeather.example', OWN_PASSWORD)).rejects.toThrow('was not let in')
    expect((await change(first.id, { password: 'given for one day' })).status).toBe(403)
  })
})

describe('a long list of people', () => {
  interface Page { items: PersonItem[], next: string | null, all: number, on: number }
  const list = async (query: string) => (await administrator.send<Page>('GET', `/api/people?${query}`)).body

  it('comes by pages, in one order, each account once', async () => {
    const sql = postgres(server.databaseUrl, { max: 1, onnotice: () => {} })
    // Several of one name: the order breaks on the id.
    await sql`insert into people (email, name, role, password_hash) select 'many' || n || '@quillfeather.example', 'Many ' || (n / 3), 'auditor', 'none' from generate_series(1, 120) n`
    await sql.end()
    const seen: PersonItem[] = []
    for (let after = ''; ;) {
      const page = await list(`role=auditor&q=many${after}`)
      expect(page.items.length).toBeLessThanOrEqual(50)
      seen.push(...page.items)
      if (page.next === null) break
      after = `&after=${encodeURIComponent(page.next)}`
    }
    expect(seen).toHaveLength(120)
    expect(new Set(seen.map(person => person.id)).size).toBe(120)
  })

  it('is searched in names, addresses and sites, by role, and by accounts that are off', async () => {
    expect((await list('q=MANY7%40')).items.map(person => person.email)).toEqual(['many7@quillfeather.example'])
    expect((await list('q=%25')).items).toEqual([])
    expect((await list('q=many&role=technician')).items).toEqual([])
    const off = await list('account=off')
    expect(off.items.length).toBeGreaterThan(0)
    expect(off.items.every(person => person.disabledAt !== null)).toBe(true)
    expect(off.all - off.on).toBe(off.items.length)
    for (const query of ['role=owner', 'account=gone', `q=${'x'.repeat(101)}`, 'after=nothing']) expect((await administrator.send('GET', `/api/people?${query}`)).status).toBe(422)
  })

  it('has each account under its own address, for administrators', async () => {
    const { items: [one] } = await list('q=many7%40')
    expect((await administrator.send<PersonItem>('GET', `/api/people/${one!.id}`)).body).toEqual(one)
    expect((await administrator.send('GET', '/api/people/00000000-0000-4000-8000-000000000000')).status).toBe(404)
  })
})
