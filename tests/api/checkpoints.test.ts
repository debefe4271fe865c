/** Receipts and checkpoints over HTTP, recomputed with code of the test's own (RFC 9162, 2.1.1; RFC 8032). */
import { createHash, createPublicKey, verify } from 'node:crypto'
import postgres from 'postgres'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { canonical, verifyRecord } from '../../scripts/verify.mjs'
import type { Checkpoint } from '../../shared/record/checkpoint'
import type { StoredEntry } from '../../shared/record/entry'
import type { ServerKey } from '../../server/utils/record/server-signer'
import type { Phone } from '../support/phone'
import { visitor } from '../support/client'
import type { World } from '../support/world'
import { startWorld } from '../support/world'

let world: World
let phone: Phone
let outage: string
beforeAll(async () => {
  world = await startWorld()
  phone = await world.phoneOf('technician')
  outage = await world.open(phone, world.server.now() - 60_000)
}, 120_000)
afterAll(() => world?.server.stop())

const sha = (...parts: Uint8Array[]) => createHash('sha256').update(Buffer.concat(parts)).digest()
function rootOf(leaves: Buffer[]): Buffer {
  if (leaves.length === 1) return leaves[0]!
  const split = 2 ** Math.ceil(Math.log2(leaves.length) - 1)
  return sha(Uint8Array.of(1), rootOf(leaves.slice(0, split)), rootOf(leaves.slice(split)))
}

interface Page { entries: StoredEntry[], size: number, checkpoint: Checkpoint }
const read = async (after = 0) => (await world.people.technician.client.send<Page>('GET', `/api/outages/${outage}/entries?after=${after}`)).body

async function check({ statement, signature }: Checkpoint): Promise<void> {
  const { entries } = await read()
  const { body: keys } = await visitor(world.server.url).send<ServerKey[]>('GET', '/api/server-keys')
  const key = createPublicKey({ key: { kty: 'OKP', crv: 'Ed25519', x: keys.find(item => item.id === statement.key)!.publicKey }, format: 'jwk' })
  expect(verify(null, Buffer.from(canonical(statement)), key, Buffer.from(signature, 'base64url'))).toBe(true)
  expect(rootOf(entries.slice(0, statement.size).map(entry => sha(Uint8Array.of(0), Buffer.from(canonical(entry))))).toString('hex')).toBe(statement.root)
  expect(statement).toMatchObject({ type: 'holdover-checkpoint', version: 1, outage, time: entries[statement.size - 1]!.receivedAt })
}

describe('a checkpoint', () => {
  it('comes with every receipt, over the log with what was pushed in it', async () => {
    for (const count of [1, 3, 2]) {
      const entries = Array.from({ length: count }, () => phone.write(outage, 'note-added', { words: 'rain' }))
      const { body } = await phone.push(outage, entries)
      expect(body.checkpoint!.statement.size).toBe(body.size)
      expect(body.results.map(result => [result.status, 'seq' in result && result.seq])).toEqual(entries.map((_, index) => ['accepted', body.size - count + 1 + index]))
      await check(body.checkpoint!)
    }
  })

  it('is the same for a replay, and comes with every reading of the log', async () => {
    const entry = phone.write(outage, 'note-added', { words: 'again' })
    const { body: first } = await phone.push(outage, [entry])
    const { body: second } = await phone.push(outage, [entry])
    expect(second.checkpoint).toEqual(first.checkpoint)
    const page = await read(first.size)
    expect(page).toMatchObject({ entries: [], checkpoint: first.checkpoint })
    await check(page.checkpoint)
  })

  it('stands in record.json after every entry, and the record verifies', async () => {
    const { body } = await world.people.auditor.client.send<{ entries: StoredEntry[], checkpoints: Checkpoint[] }>('GET', `/api/outages/${outage}/record.json`)
    expect(body.checkpoints.map(({ statement }) => statement.size)).toEqual(body.entries.map(entry => entry.seq))
    expect(verifyRecord(body)).toMatchObject({ verdict: 'not-sealed', faults: [] })
  })
})

describe('a push that says how its device saw the log', () => {
  interface Answer { results: { status: string, code?: number, later?: string }[], size: number }
  const pushSeen = async (entries: unknown[], seen: { size: number, root: string }) => phone.client.send<Answer>('POST', `/api/outages/${outage}/entries`, { entries, seen })

  it('is taken where the log gives that, now or some entries ago, and leaves all to wait where it does not', async () => {
    const ends: { size: number, root: string }[] = []
    for (let count = 0; count < 3; count += 1) {
      const { answer } = await phone.act(outage, 'note-added', { words: 'seen' })
      ends.push({ size: answer.checkpoint!.statement.size, root: answer.checkpoint!.statement.root })
    }
    const [early, , last] = ends
    const items = [phone.write(outage, 'note-added', { words: 'builds on it' }), phone.write(outage, 'note-added', { words: 'and on that' })]
    const others = [{ size: last!.size, root: early!.root }, { size: early!.size, root: last!.root }, { size: last!.size + 1, root: last!.root }]
    for (const seen of others) {
      const { status, body } = await pushSeen(items, seen)
      expect([status, body.size, body.results.map(({ status, code, later }) => [status, code, later])]).toEqual([409, last!.size, items.map(() => ['refused', 409, 'log'])])
    }
    expect((await pushSeen([items[0]], early!)).body.results).toMatchObject([{ status: 'accepted' }])
    expect((await pushSeen(items, last!)).body.results).toMatchObject([{ status: 'accepted' }, { status: 'accepted' }])
    expect((await read(last!.size)).entries).toHaveLength(2)
  })

  it('is malformed with half a root', async () => {
    const signed = phone.write(outage, 'note-added', { words: 'never sent again' })
    expect((await pushSeen([signed], { size: 1, root: 'ab' })).status).toBe(422)
    phone.unwrite(outage, signed)
  })
})

describe('signers in the log', () => {
  it('are named anew when their printed name changes, before what they sign next', async () => {
    await world.administrator.send('PATCH', `/api/people/${world.people.technician.id}`, { name: 'Another Name' })
    const { answer } = await phone.act(outage, 'note-added', { words: 'under my new name' })
    const { entries } = await read()
    expect(entries.slice(-2).map(({ entry }) => entry.kind)).toEqual(['signer-named', 'note-added'])
    expect(entries.at(-2)!.entry.body).toMatchObject({ person: world.people.technician.id, name: 'Another Name', publicKey: phone.publicKey })
    await check(answer.checkpoint!)
  })
})

describe('a database that was restored from a backup', () => {
  it('takes again, byte for byte, what a device signed after it', async () => {
    const kept = await world.open(phone)
    const later = ['one', 'two', 'three'].map(words => phone.write(kept, 'note-added', { words }))
    const { body: backup } = await phone.push(kept, later.slice(0, 1))
    await phone.push(kept, later.slice(1))
    // The log as a backup of after the first note has it; only the owner of the database can do this.
    const sql = postgres(world.server.databaseUrl, { max: 1, onnotice: () => {} })
    await sql.begin(async (tx) => {
      await tx`set local session_replication_role = replica`
      await tx`delete from entries where outage_id = ${kept} and seq > ${backup.size}`
      await tx`update outages set size = ${backup.size}, fold_version = 0, frontier = null, checkpoint = (select checkpoint from entries where outage_id = ${kept} and seq = ${backup.size}) where id = ${kept}`
    })
    await sql.end()
    const { status, body } = await phone.push(kept, later)
    expect([status, body.results.map(result => [result.status, 'seq' in result && result.seq])]).toEqual([200, later.map((_, index) => ['accepted', backup.size + index])])
    expect((await phone.act(kept, 'note-added', { words: 'and on' })).status).toBe(200)
  })
})

describe('the keys of the server', () => {
  it('are there for anybody, with the time of their use', async () => {
    const { status, body } = await visitor(world.server.url).send<ServerKey[]>('GET', '/api/server-keys')
    expect(status).toBe(200)
    expect(body).toEqual([{ id: expect.any(String), publicKey: expect.stringMatching(/^[\w-]{43}$/), from: expect.any(String), until: null }])
  })
})
