// Who may do what, made from the route files themselves; promises of this project's own, no published source.
import { readdirSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { sha256Hex } from '../../shared/record/canonical'
import type { Client } from '../support/client'
import { visitor } from '../support/client'
import { drawnSignature } from '../support/png'
import type { World } from '../support/world'
import { startWorld } from '../support/world'
import type { Asker, Ids } from './matrix'
import { ASKERS, MATRIX } from './matrix'

const root = fileURLToPath(new URL('../../server/api', import.meta.url))
const MALFORMED = ['not-an-id', '%00', '1%27%20or%201=1']

/** `sites/[siteId]/index.patch.ts` → `PATCH /api/sites/[siteId]`; a file without a method answers any. */
function routeOf(file: string): string {
  const [, path, method] = /^(.+?)(?:\.(get|post|put|patch|delete))?\.ts$/.exec(file)!
  return `${(method ?? 'any').toUpperCase()} /api/${path!.replace(/(^|\/)index$/, '')}`.replace(/\/$/, '')
}

const routes = readdirSync(root, { recursive: true, encoding: 'utf8' }).filter(file => file.endsWith('.ts')).map(routeOf).sort()

let world: World
let ids: Ids
let clients: Record<Asker, Client>

async function each(make: (asker: Asker) => Promise<string>): Promise<(asker: Asker) => string> {
  const made = new Map<Asker, string>()
  for (const asker of ASKERS) made.set(asker, await make(asker))
  return asker => made.get(asker)!
}

beforeAll(async () => {
  world = await startWorld()
  const { administrator, people, site, controller } = world
  clients = { anonymous: visitor(world.server.url), technician: people.technician.client, stranger: people.stranger.client, auditor: people.auditor.client, supervisor: people.supervisor.client, administrator }
  const phone = await world.phoneOf('second')
  const outage = await world.open(phone)
  const drawing = drawnSignature(0)
  const file = sha256Hex(drawing)
  expect((await phone.client.fetch(`/api/outages/${outage}/files/${file}`, { method: 'PUT', body: new Uint8Array(drawing), headers: { 'content-type': 'image/png' } })).status).toBe(201)
  const make = async (path: string, body: object) => (await administrator.send<{ id: string }>('POST', path, body)).body.id
  const step = { id: 'load', name: 'Load', shortest: 1, likely: 2, longest: 3, dark: true }
  ids = {
    site, controller, outage, file, device: phone.id, person: people.second.id,
    rack: await each(asker => make(`/api/sites/${site}/racks`, { controllerId: controller, name: `Rack of ${asker}`, refrigerant: 'R-744' })),
    workKind: await each(asker => make('/api/work-kinds', { name: `Work of ${asker}`, steps: [step] })),
  }
}, 120_000)
afterAll(() => world?.server.stop())

async function statusOf(asker: Asker, method: string, path: string, body?: unknown): Promise<number> {
  const init: RequestInit = body === undefined ? {} : { body: JSON.stringify(body), headers: { 'content-type': 'application/json' } }
  const response = await clients[asker].fetch(path, { method: method === 'ANY' ? 'GET' : method, ...init })
  // A stream has no end to wait for.
  if (response.headers.get('content-type')?.startsWith('text/event-stream')) await response.body?.cancel()
  else await response.arrayBuffer()
  return response.status
}

describe('the table', () => {
  it('has one row for each route file, and none for a file that is not there', () => {
    expect(MATRIX.map(row => row.route).sort()).toEqual(routes)
  })
  it('opens nothing but sign-in, health, the server\'s keys, set-up and signed links to somebody who is not signed in', () => {
    expect(MATRIX.filter(row => row.expected[0] !== 401).map(row => row.route)).toEqual(['GET /api/health', 'GET /api/server-keys', 'GET /api/setup', 'POST /api/setup', 'ANY /api/auth/[...]', ...['GET', 'POST'].map(method => `${method} /api/notices/[token]`), ...['GET', 'POST'].map(method => `${method} /api/password-links`), ...['GET', 'POST'].map(method => `${method} /api/password-links/[purpose]/[token]`)])
  })
  it('names a 404 for every route with an id in its path', () => {
    expect(MATRIX.filter(row => /\[(?!\.)/.test(row.route) && !row.unknown).map(row => row.route)).toEqual([])
  })
})

describe.each(MATRIX)('$route', (row) => {
  const [method] = row.route.split(' ') as [string]

  it.each(ASKERS.map((asker, index) => [asker, row.expected[index]!] as const))('answers the %s with %i', async (asker, expected) => {
    expect(await statusOf(asker, method, row.path(ids, asker), row.body?.(world, ids, asker))).toBe(expected)
  })

  if (row.unknown) {
    it('answers 404 for an id of nothing, and for one that is no id, to whoever may ask', async () => {
      for (const [index, asker] of ASKERS.entries()) {
        const mayAsk = row.expected[index]! !== 401 && (row.expected[index]! !== 403 || row.expected[ASKERS.indexOf('stranger')] === 404)
        const paths = [row.unknown!, ...MALFORMED.map(id => row.unknown!.replace(/00000000-0000-4000-8000-000000000000|none-such|R-0/, id))]
        for (const path of paths) {
          const status = await statusOf(asker, method, path, row.body?.(world, ids, asker))
          expect([asker, path, status]).toEqual([asker, path, asker === 'anonymous' && row.expected[0] === 401 ? 401 : mayAsk ? 404 : 403])
        }
      }
    })
  }
})

describe('an address that is no route', () => {
  it.each(ASKERS.map(asker => [asker] as const))('tells the %s nothing', async (asker) => {
    for (const path of ['/api/nothing', '/api/outages/x/y/z', '/api/people/x/secrets']) expect(await statusOf(asker, 'GET', path)).toBe(asker === 'anonymous' ? 401 : 404)
  })
})
