// Promises of this project's own, except where a source stands beside a check.
import { randomBytes } from 'node:crypto'
import { encode } from 'next-auth/jwt'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { PER_ACCOUNT, PER_ADDRESS } from '../../shared/schemas/people'
import type { PersonItem } from '../../shared/schemas/people'
import { signIn, visitor } from '../support/client'
import type { Client } from '../support/client'
import { addPerson, ADMINISTRATOR, OWN_PASSWORD, setUp } from '../support/people'
import { startTestServer } from '../support/server'
import type { TestServer } from '../support/server'

const SECRET = randomBytes(32).toString('base64url')
const COOKIE = 'next-auth.session-token'
let server: TestServer
let administrator: Client

beforeAll(async () => {
  server = await startTestServer({ env: { NUXT_AUTH_SECRET: SECRET } })
  administrator = await setUp(server.url)
}, 120_000)
afterAll(() => server?.stop())

/** One try to sign in, with the whole answer. */
async function attempt(email: string, password: string) {
  const client = visitor(server.url)
  const { body: { csrfToken } } = await client.send<{ csrfToken: string }>('GET', '/api/auth/csrf')
  const response = await client.fetch('/api/auth/callback/credentials', {
    method: 'POST',
    headers: { 'content-type': 'application/x-www-form-urlencoded' },
    body: new URLSearchParams({ email, password, csrfToken, json: 'true', callbackUrl: server.url }),
  })
  const { url } = await response.json() as { url: string }
  return { status: response.status, error: new URL(url).searchParams.get('error'), url, cookie: client.cookies.get(COOKIE) }
}
const statusOf = async (client: Client, path = '/api/account') => (await client.send('GET', path)).status

/** Somebody who carries a session token made by the test. */
async function bearer(token: Record<string, unknown>, secret = SECRET) {
  const client = visitor(server.url)
  client.cookies.set(COOKIE, await encode({ token, secret }))
  return client
}

describe('signing in', () => {
  it('lets in by e-mail in any case and the right password', async () => {
    const { status, error, cookie } = await attempt(ADMINISTRATOR.email.toUpperCase(), ADMINISTRATOR.password)
    expect([status, error]).toEqual([200, null])
    expect(cookie).toBeTruthy()
  })

  // OWASP Authentication cheat sheet, "authentication and error messages".
  it('answers alike to a wrong password, an unknown account and one that is switched off', async () => {
    const off = await addPerson(administrator, 'off@quillfeather.example', 'auditor')
    await administrator.send('PATCH', `/api/people/${off.id}`, { disabled: true })
    const wrong = await attempt(ADMINISTRATOR.email, 'not the password')
    const unknown = await attempt('nobody@quillfeather.example', 'not the password')
    const disabled = await attempt('off@quillfeather.example', OWN_PASSWORD)
    expect(wrong).toEqual({ status: 401, error: 'CredentialsSignin', url: expect.any(String), cookie: undefined })
    expect(unknown).toEqual(wrong)
    expect(disabled).toEqual(wrong)
  })

  it('needs both fields, and no more than text', async () => {
    for (const [email, password] of [['', ''], [ADMINISTRATOR.email, ''], ['', ADMINISTRATOR.password], ['\' or 1=1 --', 'x'], [ADMINISTRATOR.email, 'x'.repeat(5000)]]) {
      expect((await attempt(email!, password!)).status).toBe(401)
    }
  })

  it('needs the token against forged forms', async () => {
    const client = visitor(server.url)
    await client.send('GET', '/api/auth/csrf')
    await client.fetch('/api/auth/callback/credentials', {
      method: 'POST',
      headers: { 'content-type': 'application/x-www-form-urlencoded' },
      body: new URLSearchParams({ email: ADMINISTRATOR.email, password: ADMINISTRATOR.password, csrfToken: 'guessed', json: 'true' }),
    })
    expect(client.cookies.has(COOKIE)).toBe(false)
    expect(await statusOf(client)).toBe(401)
  })

  it('keeps the session in a cookie that no script reads and no other site sends', async () => {
    const client = visitor(server.url)
    const { body: { csrfToken } } = await client.send<{ csrfToken: string }>('GET', '/api/auth/csrf')
    const response = await client.fetch('/api/auth/callback/credentials', {
      method: 'POST',
      headers: { 'content-type': 'application/x-www-form-urlencoded' },
      body: new URLSearchParams({ email: ADMINISTRATOR.email, password: ADMINISTRATOR.password, csrfToken, json: 'true' }),
    })
    const line = response.headers.getSetCookie().find(one => one.startsWith(COOKIE))
    expect(line).toMatch(/HttpOnly/i)
    expect(line).toMatch(/SameSite=Lax/i)
  })
})

describe('the limits on wrong passwords', () => {
  it('closes an account, not its neighbour, and opens it again after a quarter of an hour', async () => {
    await addPerson(administrator, 'tried@quillfeather.example', 'technician')
    await addPerson(administrator, 'neighbour@quillfeather.example', 'technician')
    for (let time = 0; time < PER_ACCOUNT; time += 1) expect((await attempt('tried@quillfeather.example', `guess ${time}`)).error).toBe('CredentialsSignin')
    expect(await attempt('tried@quillfeather.example', OWN_PASSWORD)).toMatchObject({ status: 401, error: 'too-many', cookie: undefined })
    expect((await attempt('neighbour@quillfeather.example', OWN_PASSWORD)).error).toBeNull()
    await server.advance(16)
    expect((await attempt('tried@quillfeather.example', OWN_PASSWORD)).error).toBeNull()
  })

  it('closes an address that tries many accounts, whatever address it claims', async () => {
    for (let time = 0; time < PER_ADDRESS; time += 1) {
      const client = visitor(server.url)
      const { body: { csrfToken } } = await client.send<{ csrfToken: string }>('GET', '/api/auth/csrf')
      await client.fetch('/api/auth/callback/credentials', {
        method: 'POST',
        headers: { 'content-type': 'application/x-www-form-urlencoded', 'x-forwarded-for': `198.51.100.${time}`, 'x-holdover-address': `198.51.100.${time}` },
        body: new URLSearchParams({ email: `guess${time}@quillfeather.example`, password: 'not the password', csrfToken, json: 'true' }),
      })
    }
    expect((await attempt(ADMINISTRATOR.email, ADMINISTRATOR.password)).error).toBe('too-many')
    await server.advance(16)
    expect((await attempt(ADMINISTRATOR.email, ADMINISTRATOR.password)).error).toBeNull()
  })
})

describe('a session', () => {
  it('ends with signing out', async () => {
    await addPerson(administrator, 'leaver@quillfeather.example', 'auditor')
    const client = await signIn(server.url, 'leaver@quillfeather.example', OWN_PASSWORD)
    expect(await statusOf(client)).toBe(200)
    const { body: { csrfToken } } = await client.send<{ csrfToken: string }>('GET', '/api/auth/csrf')
    await client.fetch('/api/auth/signout', { method: 'POST', headers: { 'content-type': 'application/x-www-form-urlencoded' }, body: new URLSearchParams({ csrfToken, json: 'true' }) })
    expect(client.cookies.has(COOKIE)).toBe(false)
    expect(await statusOf(client)).toBe(401)
  })

  it('ends with a change of password, on every device', async () => {
    await addPerson(administrator, 'changer@quillfeather.example', 'technician')
    const here = await signIn(server.url, 'changer@quillfeather.example', OWN_PASSWORD)
    const there = await signIn(server.url, 'changer@quillfeather.example', OWN_PASSWORD)
    const wrong = await here.send<{ data: { field: string } }>('POST', '/api/account/password', { current: 'not the password', next: 'another long password' })
    expect([wrong.status, wrong.body.data.field]).toEqual([422, 'current'])
    const short = await here.send<{ data: { field: string } }>('POST', '/api/account/password', { current: OWN_PASSWORD, next: 'short' })
    expect([short.status, short.body.data.field]).toEqual([422, 'next'])
    expect(await statusOf(there)).toBe(200)
    expect((await here.send('POST', '/api/account/password', { current: OWN_PASSWORD, next: 'another long password' })).status).toBe(200)
    expect([await statusOf(here), await statusOf(there)]).toEqual([401, 401])
    expect((await there.send('GET', '/api/auth/session')).body).toEqual({})
    expect((await attempt('changer@quillfeather.example', OWN_PASSWORD)).status).toBe(401)
    expect((await attempt('changer@quillfeather.example', 'another long password')).status).toBe(200)
  })

  it('ends at once with a change of role or when the account is switched off', async () => {
    const person = await addPerson(administrator, 'riser@quillfeather.example', 'administrator')
    const before = await signIn(server.url, 'riser@quillfeather.example', OWN_PASSWORD)
    expect(await statusOf(before, '/api/people')).toBe(200)
    expect((await administrator.send('PATCH', `/api/people/${person.id}`, { role: 'technician' })).status).toBe(200)
    expect(await statusOf(before, '/api/people')).toBe(401)
    const after = await signIn(server.url, 'riser@quillfeather.example', OWN_PASSWORD)
    expect(await statusOf(after, '/api/people')).toBe(403)
    await administrator.send('PATCH', `/api/people/${person.id}`, { disabled: true })
    expect(await statusOf(after)).toBe(401)
    await administrator.send('PATCH', `/api/people/${person.id}`, { disabled: false })
    expect(await statusOf(after)).toBe(401)
    expect((await attempt('riser@quillfeather.example', OWN_PASSWORD)).status).toBe(200)
  })

  // CVE-2023-48309: next-auth before 4.24.5 could issue a session token with no user in it.
  it('is nobody\'s when its token names no user, none that there is, or an old session', async () => {
    const { body: { items } } = await administrator.send<{ items: PersonItem[] }>('GET', '/api/people')
    const { id } = items.find(person => person.email === ADMINISTRATOR.email)!
    expect(await statusOf(await bearer({ sub: id, sessionVersion: 1 }))).toBe(200)
    for (const token of [
      {}, { sessionVersion: 1 }, { sub: id }, { sub: null, sessionVersion: 1 }, { sub: id, sessionVersion: 0 }, { sub: id, sessionVersion: 2 }, { sub: id, sessionVersion: '1' },
      { sub: '0190a6f0-0000-7000-8000-000000000001', sessionVersion: 1 },
    ]) {
      const client = await bearer(token)
      expect(await statusOf(client)).toBe(401)
      expect((await client.send<{ user?: unknown }>('GET', '/api/auth/session')).body.user).toBeUndefined()
    }
    expect(await statusOf(await bearer({ sub: id, sessionVersion: 1 }, 'another secret of the same length as ours'))).toBe(401)
  })

  it('is nobody\'s when its cookie is no token', async () => {
    const client = visitor(server.url)
    client.cookies.set(COOKIE, 'eyJhbGciOiJub25lIn0.eyJzdWIiOiIxIn0.')
    expect(await statusOf(client)).toBe(401)
  })
})

describe('a temporary password', () => {
  it('lets nothing be done but be changed', async () => {
    await administrator.send('POST', '/api/people', { email: 'new@quillfeather.example', name: 'New', role: 'technician', password: 'given for one day' })
    const client = await signIn(server.url, 'new@quillfeather.example', 'given for one day')
    expect((await client.send<{ mustChangePassword: boolean }>('GET', '/api/account')).body.mustChangePassword).toBe(true)
    for (const path of ['/api/outages', '/api/devices', '/api/people']) expect(await statusOf(client, path)).toBe(403)
    expect((await client.send('POST', '/api/account/password', { current: 'given for one day', next: OWN_PASSWORD })).status).toBe(200)
    const own = await signIn(server.url, 'new@quillfeather.example', OWN_PASSWORD)
    expect(await statusOf(own, '/api/outages')).toBe(200)
  })
})
