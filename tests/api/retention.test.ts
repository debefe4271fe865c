// Retention, legal hold and deletion on the built server, and what the database itself refuses. Promises of this project's own, no published source.
import { createHash, createPublicKey, verify } from 'node:crypto'
import { existsSync } from 'node:fs'
import { join } from 'node:path'
import postgres from 'postgres'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { canonical } from '../../scripts/verify.mjs'
import type { DeletionFile, DeletionStatement } from '../../shared/record/deletion'
import type { StoredEntry } from '../../shared/record/entry'
import { logRoot } from '../../shared/record/merkle'
import { uuidv7 } from '../../shared/record/uuid'
import type { ChangePage } from '../../shared/schemas/changes'
import type { DeletedPage, DuePage, RecordRetention } from '../../shared/schemas/retention'
import type { Client } from '../support/client'
import { signIn } from '../support/client'
import { ADMINISTRATOR, OWN_PASSWORD } from '../support/people'
import { Phone } from '../support/phone'
import { drawnSignature } from '../support/png'
import type { World } from '../support/world'
import { startWorld } from '../support/world'

const THREE_YEARS_MIN = 3 * 366 * 24 * 60
const drawing = drawnSignature(0)
const sha256 = createHash('sha256').update(drawing).digest('hex')

let world: World
let sql: ReturnType<typeof postgres>
let administrator: Client
let supervisor: Client
let auditor: Client
let key: Phone
let technicianPhone: Phone
/** ended three years ago, each for one test */
const old: Record<'gone' | 'shared' | 'held' | 'wrong' | 'raw' | 'site' | 'other', string> = { gone: '', shared: '', held: '', wrong: '', raw: '', site: '', other: '' }
let live: string
let fresh: string

beforeAll(async () => {
  world = await startWorld()
  sql = postgres(world.server.databaseUrl, { max: 2, onnotice: () => {} })
  const { server } = world
  await server.advance(-THREE_YEARS_MIN)
  technicianPhone = await world.phoneOf('technician')
  for (const name of Object.keys(old) as (keyof typeof old)[]) {
    old[name] = await world.open(technicianPhone)
    if (name === 'gone' || name === 'shared') await technicianPhone.client.fetch(`/api/outages/${old[name]}/files/${sha256}`, { method: 'PUT', body: new Uint8Array(drawing), headers: { 'content-type': 'image/png' } })
    await technicianPhone.act(old[name], 'called-off', { reason: 'The part did not come' })
  }
  live = await world.open(technicianPhone)
  await server.advance(THREE_YEARS_MIN)
  ;[administrator, supervisor, auditor] = [await signIn(server.url, ADMINISTRATOR.email, ADMINISTRATOR.password), await signIn(server.url, 'supervisor@quillfeather.example', OWN_PASSWORD), await signIn(server.url, 'auditor@quillfeather.example', OWN_PASSWORD)]
  technicianPhone = await new Phone(await signIn(server.url, 'technician@quillfeather.example', OWN_PASSWORD), world.people.technician.id, server.now).enrol()
  fresh = await world.open(technicianPhone)
  await technicianPhone.act(fresh, 'called-off', { reason: 'Rain' })
  const { body: account } = await administrator.send<{ id: string }>('GET', '/api/account')
  key = await new Phone(administrator, account.id, server.now).enrol(ADMINISTRATOR.password)
}, 180_000)
afterAll(async () => {
  await sql?.end()
  await world?.server.stop()
})

interface Page { entries: StoredEntry[], code: string }
const retentionOf = async (outage: string, client = administrator) => (await client.send<RecordRetention>('GET', `/api/outages/${outage}/retention`)).body
const hold = (outage: string, held: boolean, reason: string, client = supervisor) => client.send<RecordRetention & { data: { reason: string } }>('PUT', `/api/outages/${outage}/hold`, { held, reason })
const entryCount = async (outage: string) => (await sql`select count(*)::int as count from entries where outage_id = ${outage}`)[0]!.count as number

/** The statement over a record as it stands; `change` is what is to be wrong with it. */
async function statementFor(outage: string, change: Partial<DeletionStatement> = {}): Promise<DeletionStatement> {
  const { body: page } = await administrator.send<Page>('GET', `/api/outages/${outage}/entries`)
  const { years, over, files } = await retentionOf(outage)
  const { now } = world.server
  return {
    type: 'holdover-deletion', version: 1, id: uuidv7(now()), outage, code: page.code, site: 'Mill Lane', size: page.entries.length, root: logRoot(page.entries), seal: null, files,
    retention: { years, over: over ?? new Date(now()).toISOString() }, reason: 'Its retention is over', at: new Date(now()).toISOString(), skew: 0, by: key.person, name: ADMINISTRATOR.name, device: key.id, ...change,
  }
}
const signed = (statement: DeletionStatement, by = key) => ({ statement, signature: by.seal(statement as never).signature })
const remove = (outage: string, body: unknown, client = administrator) => client.send<DeletionFile & { data: { field?: string, reason: string } }>('POST', `/api/outages/${outage}/deletion`, body)

describe('how long records are kept', () => {
  it('is two years until an administrator sets it, for one site only ever longer, and the history says who did', async () => {
    expect((await retentionOf(old.gone)).years).toBe(2)
    expect((await administrator.send('PUT', '/api/retention', { years: 0 })).status).toBe(422)
    expect(await administrator.send('PUT', `/api/sites/${world.site}/retention`, { years: 2 })).toMatchObject({ status: 422, body: { data: { field: 'years' } } })
    expect((await administrator.send('PUT', `/api/sites/${world.site}/retention`, { years: 7 })).status).toBe(200)
    expect(await retentionOf(old.gone)).toMatchObject({ years: 7, ended: true, held: false, files: 1 })
    expect(await remove(old.site, signed(await statementFor(old.site)))).toMatchObject({ status: 409, body: { data: { reason: expect.stringMatching(/^This record is to be kept until \d{4}-\d\d-\d\d$/) } } })
    await administrator.send('PUT', '/api/retention', { years: 1 })
    expect((await administrator.send('PUT', `/api/sites/${world.site}/retention`, { years: null })).status).toBe(200)
    expect((await retentionOf(old.gone)).years).toBe(1)
    const { body } = await administrator.send<ChangePage>('GET', '/api/changes?subject=retention')
    expect(body.items.map(({ by, subjectName, fields }) => [by, subjectName, fields])).toEqual([
      [ADMINISTRATOR.name, 'Mill Lane', [{ field: 'years', before: 7, after: null }]],
      [ADMINISTRATOR.name, 'All sites', [{ field: 'years', before: 2, after: 1 }]],
      [ADMINISTRATOR.name, 'Mill Lane', [{ field: 'years', before: null, after: 7 }]],
    ])
  })

  it('has not begun while an outage has not ended, and lists what is over, the oldest first, deleting nothing by itself', async () => {
    expect(await retentionOf(live)).toMatchObject({ ended: false, over: null })
    const { body } = await administrator.send<DuePage>('GET', '/api/retention/due')
    expect(body.items.map(item => item.id)).toEqual(Object.values(old))
    expect(body.next).toBeNull()
    expect(await entryCount(old.gone)).toBeGreaterThan(2)
  })
})

describe('a legal hold', () => {
  it('is put on and lifted with a reason, by a supervisor or administrator, and stays in the history', async () => {
    expect((await hold(old.held, true, '')).status).toBe(422)
    expect((await hold(old.held, true, 'Claim of the insurer')).body).toMatchObject({ held: true, holds: [{ by: 'supervisor', reason: 'Claim of the insurer', lifted: null }] })
    expect((await hold(old.held, true, 'Twice')).status).toBe(409)
    const { body: due } = await administrator.send<DuePage>('GET', '/api/retention/due')
    expect(due.items.filter(item => item.held).map(item => item.id)).toEqual([old.held])
    const { body: list } = await auditor.send<{ items: { id: string, held: boolean }[] }>('GET', '/api/outages?limit=100')
    expect(list.items.filter(item => item.held).map(item => item.id)).toEqual([old.held])
    expect(await remove(old.held, signed(await statementFor(old.held)))).toMatchObject({ status: 409, body: { data: { reason: expect.stringContaining('legal hold') } } })
    expect((await hold(old.held, false, 'Settled', administrator)).body).toMatchObject({ held: false, holds: [{ lifted: { by: ADMINISTRATOR.name, reason: 'Settled' } }] })
    expect((await hold(old.held, false, 'Twice')).status).toBe(409)
    const { body } = await administrator.send<ChangePage>('GET', `/api/changes?subject=record&subjectId=${old.held}`)
    expect(body.items.map(({ by, deed, fields }) => [by, deed, fields.map(field => field.after)])).toEqual([[ADMINISTRATOR.name, 'changed', [null, 'Settled']], ['supervisor', 'changed', ['Claim of the insurer']]])
  })

  it('is never taken away or rewritten in the database', async () => {
    await hold(old.held, true, 'A second claim')
    await expect(sql`delete from legal_holds where outage_id = ${old.held}`).rejects.toThrow('append-only')
    await expect(sql`update legal_holds set reason = 'another' where outage_id = ${old.held} and lifted_at is null`).rejects.toThrow('only ever lifted')
    await expect(sql`truncate legal_holds`).rejects.toThrow('never changed')
    await expect(sql`truncate outages cascade`).rejects.toThrow()
  })
})

describe('a deletion that does not stand', () => {
  it.each([
    ['another root', { root: 'a'.repeat(64) }, 409, 'statement.root'],
    ['another size', { size: 1 }, 409, 'statement.size'],
    ['another code', { code: 'Q999-0001' }, 409, 'statement.code'],
    ['a seal that there is not', { seal: { size: 1, root: 'b'.repeat(64) } }, 409, 'statement.seal'],
    ['another person\'s name', { name: 'Somebody Else' }, 422, 'statement.name'],
    ['no reason', { reason: '' }, 422, 'statement.reason'],
    ['a time long past', { at: '2020-01-01T00:00:00.000Z' }, 422, 'statement.at'],
    ['another signer', { by: '00000000-0000-4000-8000-000000000000' }, 403, undefined],
    ['a device of nobody\'s', { device: '00000000-0000-4000-8000-000000000000' }, 403, undefined],
  ])('is refused: %s', async (_what, change, status, field) => {
    const answer = await remove(old.wrong, signed(await statementFor(old.wrong, change)))
    expect([answer.status, answer.body.data.field]).toEqual([status, field])
    expect(await entryCount(old.wrong)).toBeGreaterThan(2)
  })

  it('is refused: altered after it was signed, signed by another key, sent for another outage', async () => {
    const whole = signed(await statementFor(old.wrong))
    expect(await remove(old.wrong, { ...whole, statement: { ...whole.statement, reason: 'Another reason' } })).toMatchObject({ status: 422, body: { data: { field: 'signature' } } })
    expect(await remove(old.wrong, { ...whole, statement: { ...whole.statement, more: 1 } })).toMatchObject({ status: 422 })
    expect(await remove(old.wrong, signed(whole.statement, technicianPhone))).toMatchObject({ status: 422, body: { data: { field: 'signature' } } })
    expect(await remove(old.other, whole)).toMatchObject({ status: 422, body: { data: { field: 'statement.outage' } } })
    expect(await entryCount(old.other)).toBeGreaterThan(2)
  })

  it('is refused: by anybody but an administrator, for a live outage, and before its time', async () => {
    for (const client of [supervisor, auditor, technicianPhone.client]) expect((await remove(old.wrong, signed(await statementFor(old.wrong)), client)).status).toBe(403)
    expect(await remove(live, signed(await statementFor(live)))).toMatchObject({ status: 409, body: { data: { reason: expect.stringContaining('has not ended') } } })
    expect(await remove(fresh, signed(await statementFor(fresh)))).toMatchObject({ status: 409, body: { data: { reason: expect.stringContaining('to be kept until') } } })
  })

  it('is refused by the database too, whoever asks it', async () => {
    const write = async (outage: string, change: object = {}, statementChange: Partial<DeletionStatement> = {}) => {
      const { statement, signature } = signed(await statementFor(outage, statementChange))
      const [row] = await sql`select code, site_id from outages where id = ${outage}`
      return { outage_id: outage, code: row!.code, site_id: row!.site_id, controller_name: 'x', work_kind: 'x', planned: true, opened_at: new Date(), size: statement.size, root: statement.root, statement: canonical(statement), signature, person_id: key.person, device_id: key.id, deleted_at: new Date(), ...change }
    }
    await expect(sql`delete from entries where outage_id = ${old.raw}`).rejects.toThrow('append-only')
    await expect(sql`update entries set signed = '{}' where outage_id = ${old.raw}`).rejects.toThrow('append-only')
    await expect(sql`delete from outages where id = ${old.raw}`).rejects.toThrow()
    await expect(sql`insert into deletions ${sql(await write(live))}`).rejects.toThrow('has not ended')
    await expect(sql`insert into deletions ${sql(await write(fresh))}`).rejects.toThrow('to be kept')
    await expect(sql`insert into deletions ${sql(await write(old.held))}`).rejects.toThrow('legal hold')
    await expect(sql`insert into deletions ${sql(await write(old.raw, {}, { root: 'c'.repeat(64) }))}`).rejects.toThrow('not about this record')
    await expect(sql`insert into deletions ${sql(await write(old.raw, { statement: canonical(await statementFor(old.other)) }))}`).rejects.toThrow('not about this record')
    // A statement without a deletion is none.
    await expect(sql`insert into deletions ${sql(await write(old.raw))}`).rejects.toThrow('still there')
    // One opens its own record, and no other.
    await expect(sql.begin(async (tx) => {
      await tx`insert into deletions ${tx(await write(old.other))}`
      await tx`delete from entries where outage_id = ${old.wrong}`
    })).rejects.toThrow('append-only')
    expect(await entryCount(old.raw)).toBeGreaterThan(2)
  })
})

describe('a deletion', () => {
  it('takes entries, photos and files, and leaves the signed statement, which anybody of the site can verify', async () => {
    const bytes = join(world.server.dataDirectory, 'files', sha256.slice(0, 2), sha256)
    const size = await entryCount(old.gone)
    await sql`insert into case_lessons (outage_id, outage_code, accepted_by, accepted_name, accepted_at, case_id, tau_hours, readings, rmse_k) select ${old.gone}, 'x', ${key.person}, 'x', now(), id, 4, 9, 0.1 from cases limit 1`
    const whole = signed(await statementFor(old.gone))
    const done = await remove(old.gone, whole)
    expect(done).toMatchObject({ status: 201, body: { format: 'holdover-deletion', statement: { ...whole.statement, size }, signature: whole.signature, signer: { device: key.id, publicKey: key.publicKey } } })
    expect(await entryCount(old.gone)).toBe(0)
    // The other record names the same drawing: its bytes stay.
    expect(existsSync(bytes)).toBe(true)
    expect((await remove(old.shared, signed(await statementFor(old.shared)))).status).toBe(201)
    expect(existsSync(bytes)).toBe(false)

    const { status, body } = await auditor.send<DeletionFile>('GET', `/api/outages/${old.gone}/deletion`)
    expect(status).toBe(200)
    const verified = (publicKey: string, signature: string, statement: unknown) => verify(null, Buffer.from(canonical(statement)), createPublicKey({ key: { kty: 'OKP', crv: 'Ed25519', x: publicKey }, format: 'jwk' }), Buffer.from(signature, 'base64url'))
    expect(verified(body.signer.publicKey, body.signature, body.statement)).toBe(true)
    expect(verified(body.serverKey!.publicKey, body.checkpoint!.signature, body.checkpoint!.statement)).toBe(true)
    expect(body.checkpoint!.statement).toMatchObject({ outage: old.gone, size, root: body.statement.root })
    // What was learned from it stays.
    expect((await sql`select count(*)::int as count from case_lessons where outage_id = ${old.gone}`)[0]!.count).toBe(1)
    for (const path of ['', '/entries', '/record.json', '/record.pdf', '/retention', `/files/${sha256}`]) expect((await auditor.send('GET', `/api/outages/${old.gone}${path}`)).status).toBe(404)
  })

  it('is answered the same when it comes again, and refused by another statement', async () => {
    const { body } = await administrator.send<DeletionFile>('GET', `/api/outages/${old.gone}/deletion`)
    const { statement, signature } = body
    expect(await remove(old.gone, { statement, signature })).toMatchObject({ status: 200, body: { signature } })
    expect((await remove(old.gone, signed({ ...statement, reason: 'Another' }))).status).toBe(409)
  })

  it('leaves nothing behind in any table that names outages, but what is to stay', async () => {
    const STAYS = ['deletions', 'file_removals', 'case_lessons', 'step_lessons']
    const tables = await sql<{ table: string }[]>`select table_name as table from information_schema.columns where column_name = 'outage_id' and table_schema = 'public'`
    const left = await Promise.all(tables.filter(({ table }) => !STAYS.includes(table)).map(async ({ table }) => [table, (await sql`select count(*)::int as count from ${sql(table)} where outage_id = ${old.gone}`)[0]!.count]))
    expect(left.filter(([, count]) => count > 0)).toEqual([])
    expect(left.length).toBeGreaterThan(3)
  })

  it('is never rewritten or taken back in the database', async () => {
    await expect(sql`delete from deletions where outage_id = ${old.gone}`).rejects.toThrow('never changed')
    await expect(sql`update deletions set statement = '{}' where outage_id = ${old.gone}`).rejects.toThrow('never changed')
    await expect(sql`truncate deletions`).rejects.toThrow('never changed')
  })

  it('is listed for those who may see the site, stands in the history, and is never opened again', async () => {
    const { body } = await auditor.send<DeletedPage>('GET', '/api/retention/deleted')
    expect(body.items.filter(item => item.id === old.gone)).toMatchObject([{ by: ADMINISTRATOR.name, reason: 'Its retention is over' }])
    const stranger = await signIn(world.server.url, 'stranger@quillfeather.example', OWN_PASSWORD)
    expect((await stranger.send<DeletedPage>('GET', '/api/retention/deleted')).body.items).toEqual([])
    expect((await stranger.send('GET', `/api/outages/${old.gone}/deletion`)).status).toBe(404)
    const { body: history } = await administrator.send<ChangePage>('GET', `/api/changes?subject=record&subjectId=${old.gone}`)
    expect(history.items).toMatchObject([{ by: ADMINISTRATOR.name, deed: 'deleted' }])
    const opening = technicianPhone.write(old.gone, 'outage-opened', world.opening())
    expect((await technicianPhone.push(old.gone, [opening])).status).toBe(404)
    await expect(sql`insert into outages (id, code, site_id, controller_id, planned, work_kind, phase, state, fold_version, opened_at, updated_at) values (${old.gone}, 'x', ${world.site}, ${world.controller}, true, '', 'plan', '{}', 1, now(), now())`).rejects.toThrow('this record was deleted')
  })
})
