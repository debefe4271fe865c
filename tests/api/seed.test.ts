/**
 * The demo as the built server seeds it. Hashes, signatures and the root are checked here a second way, by lines
 * that share no code with the program: RFC 8785 (canonical JSON), RFC 8032 (Ed25519), RFC 9162 section 2.1.1 (root).
 * What each story holds is this project's own promise, no published source.
 */
import { createHash, createPublicKey, verify } from 'node:crypto'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { connect } from '../../server/utils/database'
import { openStorage } from '../../server/utils/files/storage'
import { seedDemo } from '../../server/database/seed'
import type { StoredEntry } from '../../shared/record/entry'
import type { BodyOf, EntryKind } from '../../shared/record/kinds'
import type { OutageState } from '../../shared/record/state'
import type { OutageItem, OutagePage } from '../../shared/schemas/outage-list'
import type { Client } from '../support/client'
import { signIn } from '../support/client'
import { startTestServer } from '../support/server'
import type { TestServer } from '../support/server'

const MINUTE = 60_000

/** RFC 8785: members in the order of their UTF-16 code units, no white space; numbers and texts as ECMAScript writes them. */
function canonical(value: unknown): string {
  if (Array.isArray(value)) return `[${value.map(canonical).join(',')}]`
  if (typeof value !== 'object' || value === null) return JSON.stringify(value)
  const members = value as Record<string, unknown>
  return `{${Object.keys(members).sort().map(name => `${JSON.stringify(name)}:${canonical(members[name])}`).join(',')}}`
}

const sha256 = (...parts: (string | Uint8Array)[]) => parts.reduce((hash, part) => hash.update(part), createHash('sha256')).digest()

/** RFC 9162, 2.1.1. */
function treeRoot(leaves: string[]): Buffer {
  if (leaves.length === 1) return sha256(Uint8Array.of(0), leaves[0]!)
  const half = 2 ** Math.ceil(Math.log2(leaves.length) - 1)
  return sha256(Uint8Array.of(1), treeRoot(leaves.slice(0, half)), treeRoot(leaves.slice(half)))
}

function isSigned({ entry, signature }: StoredEntry, publicKey: string): boolean {
  const key = createPublicKey({ key: { kty: 'OKP', crv: 'Ed25519', x: publicKey }, format: 'jwk' })
  return verify(null, Buffer.from(canonical(entry)), key, Buffer.from(signature, 'base64url'))
}

describe('the demo', () => {
  let server: TestServer
  let supervisor: Client
  let items: OutageItem[]

  beforeAll(async () => {
    server = await startTestServer({ demo: true })
    supervisor = await signIn(server.url, 'supervisor@quillfeather.example')
    items = (await supervisor.send<OutagePage>('GET', '/api/outages')).body.items
  }, 120_000)
  afterAll(() => server?.stop())

  const codeOf = (site: string, phase: string) => items.find(item => item.site.name === site && item.phase === phase)!.id
  const stateOf = async (id: string) => (await supervisor.send<OutageState>('GET', `/api/outages/${id}`)).body
  const logOf = async (id: string) => (await supervisor.send<{ entries: StoredEntry[] }>('GET', `/api/outages/${id}/entries?after=0`)).body.entries
  const bodiesOf = <K extends EntryKind>(log: StoredEntry[], kind: K) => log.filter(stored => stored.entry.kind === kind).map(stored => stored.entry.body as BodyOf<K>)

  it('shows an outage of each sort, newest first', () => {
    expect(items.map(item => [item.code, item.site.name, item.phase, item.planned, item.planSubmitted])).toEqual([
      ['Q031-0019', 'Mill Lane', 'plan', true, true],
      ['Q008-0007', 'Abbot Green', 'dark', true, true],
      ['Q031-0018', 'Mill Lane', 'submitted', false, false],
      ['Q027-0041', 'Quarry Street', 'sealed', true, true],
    ])
  })

  it('hides from the second technician the site that is not theirs', async () => {
    const second = await signIn(server.url, 'technician2@quillfeather.example')
    const seen = (await second.send<OutagePage>('GET', '/api/outages')).body.items
    expect(seen.map(item => item.code)).toEqual(['Q031-0019', 'Q031-0018', 'Q027-0041'])
    expect((await second.send('GET', `/api/outages/${codeOf('Abbot Green', 'dark')}`)).status).toBe(404)
  })

  it.each(['Q031-0019', 'Q008-0007', 'Q031-0018', 'Q027-0041'])('keeps the log of %s whole: numbers, chains, signers, signatures', async (code) => {
    const { id, size } = items.find(item => item.code === code)!
    const log = await logOf(id)
    expect(log.map(stored => stored.seq)).toEqual(Array.from({ length: size }, (_, index) => index + 1))
    const keys = new Map<string, string>()
    const chains = new Map<string, { n: number, hash: string | null }>()
    const faults: string[] = []
    for (const stored of log) {
      const { entry } = stored
      if (entry.kind === 'signer-named') keys.set(entry.body.device, entry.body.publicKey)
      const before = chains.get(entry.device) ?? { n: 0, hash: null }
      if (entry.n !== before.n + 1 || entry.prev !== before.hash) faults.push(`${stored.seq}: chain`)
      if (!isSigned(stored, keys.get(entry.device) ?? '')) faults.push(`${stored.seq}: signature`)
      chains.set(entry.device, { n: entry.n, hash: sha256(canonical(entry)).toString('hex') })
    }
    expect(faults).toEqual([])
    // The check must be able to fail: one changed figure breaks the signature.
    const changed = structuredClone(log.at(-1)!)
    changed.entry.skew += 1
    expect(isSigned(changed, keys.get(changed.entry.device)!)).toBe(false)
  })

  it('seals last week\'s record over all that stands before the seal', async () => {
    const log = await logOf(codeOf('Quarry Street', 'sealed'))
    const [seal] = bodiesOf(log, 'sealed')
    expect(log.at(-1)!.entry.kind).toBe('sealed')
    expect(seal!.size).toBe(log.length - 1)
    expect(seal!.root).toBe(treeRoot(log.slice(0, -1).map(stored => canonical(stored))).toString('hex'))
  })

  it('tells the sealed outage whole', async () => {
    const id = codeOf('Quarry Street', 'sealed')
    const [state, log] = [await stateOf(id), await logOf(id)]
    const [dark] = state.darks
    expect((dark!.to! - dark!.from) / MINUTE).toBeCloseTo(24.2, 1)
    expect(dark!.breach).toEqual([])
    expect(bodiesOf(log, 'plan-changed')).toHaveLength(1)
    expect(bodiesOf(log, 'point-excused').map(body => body.tag)).toEqual(['LT-1'])
    expect(bodiesOf(log, 'point-proven').map(body => body.tag)).toEqual(['DH-B1'])
    expect(bodiesOf(log, 'correction').map(body => body.reading)).toEqual([{ value: expect.closeTo(35.4, 0) }])
    expect(Object.values(state.points).filter(point => point.status !== 'proven').map(point => [point.tag, point.status])).toEqual([['LT-1', 'excused']])
    expect(bodiesOf(log, 'verdict-changed')).toEqual([])
    expect(state.questioned).toEqual([])
    expect(state.questions.map(question => question.answer !== null)).toEqual([true])
  })

  it('holds the drawn signatures that the records name', async () => {
    let held = 0
    for (const { id } of items) {
      for (const file of (await stateOf(id)).files) {
        const answer = await supervisor.fetch(`/api/outages/${id}/files/${file}`)
        expect([answer.status, answer.headers.get('content-type')]).toEqual([200, 'image/png'])
        expect(sha256(new Uint8Array(await answer.arrayBuffer())).toString('hex')).toBe(file)
        held += 1
      }
    }
    expect(held).toBe(3)
  })

  it('is dark right now at Abbot Green', async () => {
    const state = await stateOf(codeOf('Abbot Green', 'dark'))
    const [dark] = state.darks
    const minutes = (server.now() - dark!.from) / MINUTE
    expect(dark!.to).toBeNull()
    expect(minutes).toBeGreaterThanOrEqual(13)
    expect(minutes).toBeLessThan(20)
    const rounds = Object.values(state.cases).flatMap(item => item.readings).filter(reading => reading.at > dark!.from).map(reading => reading.round)
    expect([...new Set(rounds)]).toEqual([2, 3])
    expect(Object.values(state.points).map(point => point.status)).toEqual(Array.from({ length: 12 }, () => 'hand'))
  })

  it('waits for approval of a swap that begins at 01:00 by the clock of Mill Lane', async () => {
    const state = await stateOf(codeOf('Mill Lane', 'plan'))
    const start = Date.parse(state.plan.startsAt!)
    expect(new Intl.DateTimeFormat('en-GB', { timeZone: 'Europe/London', timeStyle: 'short' }).format(start)).toBe('01:00')
    expect((start - server.now()) / MINUTE / 60).toBeGreaterThan(23)
    expect(state.plan.census).toHaveLength(1)
    expect(state.approved).toBeNull()
  })

  it('leaves the reviewer of yesterday\'s failure something to look at', async () => {
    const id = codeOf('Mill Lane', 'submitted')
    const [state, log] = [await stateOf(id), await logOf(id)]
    expect(state.questioned.map(item => [item.kind, item.settled !== null])).toEqual([['control-back', true]])
    expect(bodiesOf(log, 'verdict-changed').map(body => [body.caseId, body.verdict])).toEqual([[state.snapshot.cases.find(item => item.name === 'Ready meals')!.id, 'above']])
    expect(bodiesOf(log, 'act-signed').map(body => [body.act, body.quantity])).toEqual([['night-covers', null], ['discarded', 14], ['moved', 52]])
    expect(state.largestSkew?.ms).toBe(6200)
  })

  it('is seeded once: where anybody exists, nothing is added', async () => {
    const { client, db } = connect(server.databaseUrl, 1)
    try {
      await seedDemo(db, server.now(), openStorage({ dataDir: server.dataDirectory }))
    } finally {
      await client.end()
    }
    expect((await supervisor.send<OutagePage>('GET', '/api/outages')).body.items).toHaveLength(4)
  })
})
