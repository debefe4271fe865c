// The built server with a PostgreSQL of the test's own; the promises are this project's own, no published source.
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { signIn, visitor } from '../support/client'
import { startTestServer } from '../support/server'
import type { TestServer } from '../support/server'

const MINUTE = 60_000

describe('a server with the demo', () => {
  let server: TestServer

  beforeAll(async () => {
    server = await startTestServer({ demo: true })
  }, 120_000)
  afterAll(() => server?.stop())

  it('says that it is ready', async () => {
    const { status, body } = await visitor(server.url).send<{ status: string }>('GET', '/api/health')
    expect([status, body.status]).toEqual([200, 'ok'])
  })

  it.each(['technician', 'technician2', 'supervisor', 'auditor', 'admin'])('lets %s in, and tells who they are', async (name) => {
    const email = `${name}@quillfeather.example`
    const client = await signIn(server.url, email)
    const { body } = await client.send<{ user?: { email?: string } }>('GET', '/api/auth/session')
    expect(body.user?.email).toBe(email)
  })

  it('lets nobody in by a wrong password', async () => {
    await expect(signIn(server.url, 'auditor@quillfeather.example', 'wrong')).rejects.toThrow('auditor@quillfeather.example was not let in: 401')
  })

  it('needs no first administrator', async () => {
    expect((await visitor(server.url).send('GET', '/api/setup')).body).toEqual({ needed: false })
  })

  it('lives in the time that the test gives it', async () => {
    const told = async () => Date.parse((await visitor(server.url).send<{ time: string }>('GET', '/api/health')).body.time)
    const before = await told()
    await server.advance(90)
    await server.advance(30)
    const moved = await told() - before
    expect(moved).toBeGreaterThanOrEqual(120 * MINUTE)
    expect(moved).toBeLessThan(121 * MINUTE)
    expect(Math.abs(server.now() - await told())).toBeLessThan(MINUTE)
  })
})

describe('a server without the demo', () => {
  let server: TestServer

  beforeAll(async () => {
    server = await startTestServer()
  }, 120_000)
  afterAll(() => server?.stop())

  it('is empty, and lets the administrator in whom the first visit makes', async () => {
    const guest = visitor(server.url)
    const person = { email: 'ada@quillfeather.example', name: 'Ada Brook', password: 'a long first password' }
    expect((await guest.send('GET', '/api/setup')).body).toEqual({ needed: true })
    await expect(signIn(server.url, person.email, person.password)).rejects.toThrow('was not let in')
    expect((await guest.send('POST', '/api/setup', person)).status).toBe(201)
    const client = await signIn(server.url, person.email, person.password)
    expect((await client.send<{ user?: { email?: string } }>('GET', '/api/auth/session')).body.user?.email).toBe(person.email)
    expect((await guest.send('GET', '/api/setup')).body).toEqual({ needed: false })
  })
})
