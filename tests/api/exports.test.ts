// Exports of the demo's records, from the asking to the file opened again, on the built server; promises of this project's own.
import { createHash } from 'node:crypto'
import { eq } from 'drizzle-orm'
import { createStorage } from 'unstorage'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { outageSearch, people, recordExports, siteAccess } from '../../server/database/schema'
import { connect } from '../../server/utils/database'
import { readParts, writeParts } from '../../server/utils/exports/parts'
import { expireExports, workExports } from '../../server/utils/exports/work'
import type { Order } from '../../server/utils/exports/contents'
import type { ChangePage } from '../../shared/schemas/changes'
import type { ExportItem, ExportKind } from '../../shared/schemas/exports'
import { uuidv7 } from '../../shared/record/uuid'
import type { Client } from '../support/client'
import { signIn } from '../support/client'
import { startTestServer } from '../support/server'
import type { TestServer } from '../support/server'
import { unzip } from '../support/unzip'

const FINISHED = { phase: 'submitted,sealed' }
let server: TestServer
let database: ReturnType<typeof connect>
let auditor: Client
let administrator: Client
let records: { id: string, code: string }[]

beforeAll(async () => {
  server = await startTestServer({ demo: true, jobs: true })
  database = connect(server.databaseUrl, 4)
  auditor = await signIn(server.url, 'auditor@quillfeather.example')
  administrator = await signIn(server.url, 'admin@quillfeather.example')
  const rows = await database.db.select({ id: outageSearch.outageId, code: outageSearch.code, phase: outageSearch.phase }).from(outageSearch)
  records = rows.filter(({ phase }) => phase === 'submitted' || phase === 'sealed').map(({ id, code }) => ({ id, code }))
}, 120_000)
afterAll(async () => {
  await database?.client.end()
  await server?.stop()
})

const ask = (kind: ExportKind, filter: object = FINISHED, client = auditor) => client.send<ExportItem & { data: { reason: string } }>('POST', '/api/exports', { kind, filter })
const item = async (id: string) => (await auditor.send<{ items: ExportItem[] }>('GET', '/api/exports')).body.items.find(one => one.id === id)!
async function finished(id: string): Promise<ExportItem> {
  await expect.poll(async () => (await item(id)).state, { timeout: 90_000, interval: 200 }).toBe('done')
  return item(id)
}
const download = async (id: string, client = auditor) => client.fetch(`/api/exports/${id}/file`)
async function bytesOf(kind: ExportKind): Promise<Buffer> {
  const { status, body } = await ask(kind)
  expect([status, body.total]).toEqual([201, records.length])
  const { bytes, done } = await finished(body.id)
  const response = await download(body.id)
  const file = Buffer.from(await response.arrayBuffer())
  expect([response.status, done, response.headers.get('content-length'), file.length]).toEqual([200, records.length, String(bytes), bytes])
  expect(response.headers.get('content-disposition')).toContain(body.fileName)
  return file
}

describe('an export', { timeout: 120_000 }, () => {
  it('as PDF is a ZIP with each record once and an index that says what each file is', async () => {
    const files = unzip(await bytesOf('pdf'))
    expect([...files.keys()].sort()).toEqual([...records.map(({ code }) => `${code}.pdf`), 'index.csv'].sort())
    const [head, ...lines] = files.get('index.csv')!.toString('utf8').replace('\uFEFF', '').trim().split('\r\n').map(line => line.split(','))
    expect(lines).toHaveLength(records.length)
    for (const line of lines) {
      const cell = (name: string) => line[head!.indexOf(name)]!
      const pdf = files.get(cell('file'))!
      expect(pdf.subarray(0, 5).toString()).toBe('%PDF-')
      expect([cell('bytes'), cell('sha256')]).toEqual([String(pdf.length), createHash('sha256').update(pdf).digest('hex')])
      const single = Buffer.from(await (await auditor.fetch(`/api/outages/${records.find(({ code }) => code === cell('outage'))!.id}/record.pdf`)).arrayBuffer())
      expect(single.equals(pdf)).toBe(true)
    }
  })

  it('as CSV holds every reading of each record, with its outage', async () => {
    const lines = (await bytesOf('readings')).toString('utf8').trim().split('\r\n')
    let readings = 0
    for (const { id, code } of records) {
      const own = (await (await auditor.fetch(`/api/outages/${id}/record.csv`)).text()).trim().split('\r\n').slice(1)
      expect(lines.filter(line => line.startsWith(`${code},`))).toHaveLength(own.length)
      readings += own.length
    }
    expect(lines).toHaveLength(readings + 1)
  })

  it('as JSON lines holds each record on one line, as it is verified', async () => {
    const lines = (await bytesOf('json-lines')).toString('utf8').trim().split('\n').map(line => JSON.parse(line) as { outage: { id: string } })
    expect(lines.map(line => line.outage.id).sort()).toEqual(records.map(({ id }) => id).sort())
    for (const line of lines) expect(line).toEqual(await (await auditor.fetch(`/api/outages/${line.outage.id}/record.json`)).json())
  })

  it('stands in the history: who asked for it, and each download', async () => {
    const { items } = (await administrator.send<ChangePage>('GET', '/api/changes?subject=export')).body
    expect(items.map(({ by, deed }) => [by, deed])).toEqual(Array.from({ length: 3 }, () => [['Linus Weatherby', 'downloaded'], ['Linus Weatherby', 'exported']]).flat())
    expect((items[1]!.fields.find(({ field }) => field === 'records')!.after as string[]).sort()).toEqual(records.map(({ code }) => code).sort())
  })

  it('of nothing is refused, and so is a fourth that waits', async () => {
    expect((await ask('pdf', { from: '2001-01-01', to: '2001-01-02' })).body.data.reason).toBe('The search finds no record')
    const [owner] = await database.db.select({ id: people.id }).from(people).where(eq(people.email, 'auditor@quillfeather.example'))
    // Claimed by workers that were just heard, so that nobody else takes them.
    const rows = await database.db.insert(recordExports).values([1, 2, 3].map(n => ({ id: uuidv7(Date.now()), personId: owner!.id, kind: 'pdf' as const, state: 'working' as const, fileName: `${n}.zip`, outageIds: [records[0]!.id], total: 1, tries: 1, heartbeatAt: new Date(server.now()), askedAt: new Date() }))).returning()
    expect((await ask('pdf')).status).toBe(409)
    for (const { id } of rows) expect((await auditor.send<ExportItem>('DELETE', `/api/exports/${id}`)).body.state).toBe('cancelled')
    expect((await download(rows[0]!.id)).status).toBe(410)
  })
})

describe('access to an export', { timeout: 120_000 }, () => {
  it('is its owner\'s alone, and a desk\'s', async () => {
    const { body: { id } } = await ask('readings')
    await finished(id)
    expect((await download(id, administrator)).status).toBe(404)
    expect((await administrator.send('DELETE', `/api/exports/${id}`)).status).toBe(404)
    const technician = await signIn(server.url, 'technician@quillfeather.example')
    expect((await technician.send('POST', '/api/exports', { kind: 'readings', filter: FINISHED })).status).toBe(403)
  })

  it('is asked again at the download: a site that was taken away takes the file with it', async () => {
    const { body: { id } } = await ask('readings')
    await finished(id)
    const [owner] = await database.db.select({ id: people.id }).from(people).where(eq(people.email, 'auditor@quillfeather.example'))
    const access = await database.db.select().from(siteAccess).where(eq(siteAccess.personId, owner!.id))
    await database.db.delete(siteAccess).where(eq(siteAccess.personId, owner!.id))
    expect((await download(id)).status).toBe(403)
    expect((await ask('readings')).status).toBe(422)
    await database.db.insert(siteAccess).values(access)
    expect((await download(id)).status).toBe(200)
  })
})

describe('a worker that is killed', { timeout: 120_000 }, () => {
  /** Six parts of work; a step may never come back, as in a process that was ended. */
  const contents = (dieBefore: number | null, seen: string[]) => {
    const make = async function* ({ outageIds, before }: Order) {
      for (const [index, id] of outageIds.entries()) {
        if (index === dieBefore) await new Promise(() => {})
        await before(index)
        seen.push(id)
        yield Buffer.from(`${id}\n`)
      }
      if (outageIds.length === dieBefore) await new Promise(() => {})
    }
    return { 'pdf': make, 'readings': make, 'json-lines': make }
  }
  const text = async (storage: ReturnType<typeof createStorage>, row: typeof recordExports.$inferSelect) => {
    let all = ''
    for await (const part of readParts(storage, row.id, row.tries, row.parts!)) all += Buffer.from(part).toString()
    return all
  }

  it('before any step leaves the export to another, which makes it whole, and nothing twice', async () => {
    const [owner] = await database.db.select({ id: people.id }).from(people).where(eq(people.email, 'auditor@quillfeather.example'))
    const ids = records.map(({ id }) => id)
    for (let dieBefore = 0; dieBefore <= ids.length; dieBefore++) {
      const storage = createStorage()
      // An hour that the server's own workers do not know: to them its heartbeat lies in the future.
      let now = Date.now() + 3_600_000
      const clock = () => now
      const [asked] = await database.db.insert(recordExports).values({ id: uuidv7(now), personId: owner!.id, kind: 'pdf', state: 'working', heartbeatAt: new Date(now - 121_000), tries: 0, fileName: 'x.zip', outageIds: ids, total: ids.length, askedAt: new Date(now) }).returning()
      const seen: string[] = []
      void workExports({ db: database.db, storage, clock, contents: contents(dieBefore, seen) })
      const read = async () => (await database.db.select().from(recordExports).where(eq(recordExports.id, asked!.id)))[0]!
      await expect.poll(async () => [(await read()).tries, seen.length], { timeout: 10_000 }).toEqual([1, dieBefore])
      // Nobody takes it for dead yet.
      await workExports({ db: database.db, storage, clock, contents: contents(null, []) })
      expect(await read()).toMatchObject({ state: 'working', tries: 1 })
      now += 121_000
      await workExports({ db: database.db, storage, clock, contents: contents(null, []) })
      const row = await read()
      expect(row).toMatchObject({ state: 'done', tries: 2, done: ids.length, parts: 1 })
      expect(await text(storage, row)).toBe(ids.map(id => `${id}\n`).join(''))
      expect(await storage.getKeys()).toHaveLength(1)

      now += 7 * 86_400_000
      await expireExports({ db: database.db, storage, clock })
      expect([(await read()).state, await storage.getKeys()]).toEqual(['expired', []])
    }
  })

  it('and comes back later changes nothing any more', async () => {
    const [owner] = await database.db.select({ id: people.id }).from(people).where(eq(people.email, 'auditor@quillfeather.example'))
    const storage = createStorage()
    let now = Date.now() + 3_600_000
    const clock = () => now
    const ids = records.map(({ id }) => id)
    const [asked] = await database.db.insert(recordExports).values({ id: uuidv7(now), personId: owner!.id, kind: 'pdf', state: 'working', heartbeatAt: new Date(now - 121_000), tries: 0, fileName: 'x.zip', outageIds: ids, total: ids.length, askedAt: new Date(now) }).returning()
    let wake = () => {}
    const asleep = new Promise<void>((resolve) => { wake = resolve })
    const slow = async function* ({ outageIds, before }: Order) {
      yield Buffer.from('what nobody is to read')
      await asleep
      for (const index of outageIds.keys()) await before(index)
    }
    const first = workExports({ db: database.db, storage, clock, contents: { 'pdf': slow, 'readings': slow, 'json-lines': slow } })
    await expect.poll(async () => (await database.db.select().from(recordExports).where(eq(recordExports.id, asked!.id)))[0]!.tries, { timeout: 10_000 }).toBe(1)
    now += 121_000
    await workExports({ db: database.db, storage, clock, contents: contents(null, []) })
    wake()
    await first
    const [row] = await database.db.select().from(recordExports).where(eq(recordExports.id, asked!.id))
    expect(row).toMatchObject({ state: 'done', tries: 2 })
    expect(await text(storage, row!)).toBe(ids.map(id => `${id}\n`).join(''))
    expect(await storage.getKeys()).toHaveLength(1)
  })
})

describe('a record that was deleted', { timeout: 120_000 }, () => {
  it('takes the files that hold it with it, and no others', async () => {
    const [owner] = await database.db.select({ id: people.id }).from(people).where(eq(people.email, 'auditor@quillfeather.example'))
    const storage = createStorage()
    const now = Date.now()
    const rows = await database.db.insert(recordExports).values([[records[0]!.id], [records[0]!.id, uuidv7(now)]].map(outageIds => ({ id: uuidv7(now), personId: owner!.id, kind: 'readings' as const, state: 'done' as const, fileName: 'x.csv', outageIds, total: outageIds.length, done: outageIds.length, tries: 1, parts: 1, bytes: 1, askedAt: new Date(now), doneAt: new Date(now), expiresAt: new Date(now + 86_400_000) }))).returning()
    for (const row of rows) await writeParts(storage, row.id, 1, (async function* () { yield Buffer.from('x') })())
    await expireExports({ db: database.db, storage, clock: () => now })
    const states = await Promise.all(rows.map(async row => (await database.db.select().from(recordExports).where(eq(recordExports.id, row.id)))[0]!.state))
    expect(states).toEqual(['done', 'expired'])
    expect((await storage.getKeys()).map(key => key.split(':')[1])).toEqual([rows[0]!.id])
  })
})

describe('a file that is past its time', { timeout: 120_000 }, () => {
  it('is not given any more', async () => {
    const { body: { id } } = await ask('readings')
    expect((await finished(id)).expiresAt).not.toBeNull()
    await server.advance(7 * 24 * 60 + 1)
    expect((await download(id)).status).toBe(410)
  })
})
