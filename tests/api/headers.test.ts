// Sources: OWASP HTTP Headers and Cross-Site Request Forgery Prevention cheat sheets; Content Security Policy Level 3 (W3C).
import { createHash } from 'node:crypto'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { visitor } from '../support/client'
import { startTestServer } from '../support/server'
import type { TestServer } from '../support/server'

let server: TestServer
beforeAll(async () => {
  server = await startTestServer()
}, 120_000)
afterAll(() => server?.stop())

const nonceOf = (policy: string) => /'nonce-([^']+)'/.exec(policy)?.[1]

describe('a page', () => {
  it.each(['/setup', '/sign-in', '/nothing-here'])('%s lets only its own scripts and styles run', async (path) => {
    const response = await visitor(server.url).fetch(path, { headers: { accept: 'text/html' } })
    const policy = response.headers.get('content-security-policy') ?? ''
    const html = await response.text()
    // A page that leads elsewhere has no scripts of its own.
    if (response.status === 302) return expect(response.headers.get('location')).toBe('/setup')
    const nonce = nonceOf(policy)
    expect(nonce).toMatch(/^[A-Za-z0-9+/]{22}==$/)
    const elements = html.match(/<(script|style)[\s>][^>]*/g) ?? []
    expect(elements.length).toBeGreaterThan(1)
    for (const element of elements) expect(element).toContain(`nonce="${nonce}"`)
    expect(response.headers.get('cache-control')).toBe('no-store')
    expect(response.headers.get('x-powered-by')).toBeNull()
  })

  it('has a new nonce each time', async () => {
    const policies = await Promise.all([1, 2].map(async () => (await visitor(server.url).fetch('/setup', { headers: { accept: 'text/html' } })).headers.get('content-security-policy')!))
    expect(nonceOf(policies[0]!)).not.toBe(nonceOf(policies[1]!))
  })
})

describe('the shell that phones keep', () => {
  it.each(['/outages', '/outages/new'])('%s names its inline scripts by hash and holds no data', async (path) => {
    const response = await visitor(server.url).fetch(path, { headers: { accept: 'text/html' } })
    const html = await response.text()
    const policy = response.headers.get('content-security-policy')!
    expect(policy).not.toContain('nonce-')
    for (const [, text] of html.matchAll(/<script>([\s\S]*?)<\/script>/g)) expect(policy).toContain(`'sha256-${createHash('sha256').update(text!).digest('base64')}'`)
    expect(html).toContain('<div id="__nuxt"></div>')
  })

  it('is one and the same for all', async () => {
    const read = async (path: string) => (await visitor(server.url).fetch(path, { headers: { accept: 'text/html' } })).text()
    expect(await read('/outages')).toBe(await read('/outages/lost'))
  })
})

describe('the service worker', () => {
  it('is served under one address and is asked for anew each time', async () => {
    const response = await visitor(server.url).fetch('/sw.js')
    expect([response.status, response.headers.get('cache-control')]).toEqual([200, 'no-cache'])
    const text = await response.text()
    expect(text).toContain('"/outages"')
    expect(text).not.toMatch(/"url":"\/?api\//)
  })

  it('can be switched off from the server', async () => {
    const off = await startTestServer({ env: { HOLDOVER_WORKER: '0' } })
    try {
      expect(await (await visitor(off.url).fetch('/sw.js')).text()).toContain('registration.unregister()')
    } finally {
      await off.stop()
    }
  }, 60_000)
})

describe('every answer', () => {
  it.each(['/setup', '/api/health', '/api/outages', '/mark.svg'])('%s carries the safety headers', async (path) => {
    const { headers } = await visitor(server.url).fetch(path)
    expect(headers.get('x-content-type-options')).toBe('nosniff')
    expect(headers.get('referrer-policy')).toBeTruthy()
    expect(headers.get('cross-origin-opener-policy')).toBe('same-origin')
    expect(headers.get('permissions-policy')).toContain('camera=(self)')
    expect(headers.get('strict-transport-security')).toBeNull()
  })

  it('of the API stays out of caches', async () => {
    for (const path of ['/api/setup', '/api/outages', '/api/auth/session']) {
      expect((await visitor(server.url).fetch(path)).headers.get('cache-control')).toMatch(/no-store/)
    }
  })
})

describe('a change sent by a page of another origin', () => {
  const body = JSON.stringify({ email: 'ada@quillfeather.example', name: 'Ada', password: 'a long password' })
  const send = (origin?: string) => fetch(new URL('/api/setup', server.url), { method: 'POST', body, headers: { 'content-type': 'application/json', ...(origin ? { origin } : {}) } })

  it('is refused, and nothing is done', async () => {
    for (const origin of ['https://evil.example', 'null', server.url.replace('http:', 'https:'), `${server.url}.evil.example`]) {
      expect((await send(origin)).status).toBe(403)
    }
    expect(await (await fetch(new URL('/api/setup', server.url))).json()).toEqual({ needed: true })
    expect((await send(server.url)).status).toBe(201)
  })
})
