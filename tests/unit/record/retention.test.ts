/** When a record may be deleted, and what stays of it: rules of this project. Dates: PostgreSQL 15 manual, 9.9 (date + interval); signatures: RFC 8032. */
import { generateKeyPairSync, sign } from 'node:crypto'
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { canonicalText } from '../../../shared/record/canonical'
import type { DeletionFile, DeletionStatement } from '../../../shared/record/deletion'
import { checkDeletion, deletionFileSchema, factsOf } from '../../../shared/record/deletion'
import { logRoot } from '../../../shared/record/merkle'
import { retentionOver, retentionYears } from '../../../shared/record/retention'
import { webSignatures } from '../../../shared/record/verify/signatures'
import { storyTo } from './store'

describe('the end of retention', () => {
  const over = (last: string, years: number) => new Date(retentionOver(Date.parse(last), years)).toISOString()

  it('is so many years later, at the same time of day in UTC', () => {
    expect(over('2024-03-03T02:24:00.000Z', 2)).toBe('2026-03-03T02:24:00.000Z')
  })
  it('takes 28 February for 29 February where the year has none, as PostgreSQL does', () => {
    expect(over('2024-02-29T12:00:00.000Z', 1)).toBe('2025-02-28T12:00:00.000Z')
    expect(over('2024-02-29T12:00:00.000Z', 4)).toBe('2028-02-29T12:00:00.000Z')
  })
  it('is later for a later entry and for more years', () => {
    fc.assert(fc.property(fc.integer({ min: 0, max: 4e12 }), fc.integer({ min: 1, max: 29 }), fc.integer({ min: 0, max: 1e11 }), (at, years, more) => {
      expect(retentionOver(at + more, years)).toBeGreaterThanOrEqual(retentionOver(at, years))
      expect(retentionOver(at, years + 1) - retentionOver(at, years)).toBeGreaterThan(364 * 86_400_000)
    }))
  })
  it('is never sooner at one site than at all', () => {
    expect([retentionYears(2, null), retentionYears(2, 7), retentionYears(5, 3)]).toEqual([2, 7, 5])
  })
})

describe('what stays of a deleted record', () => {
  function signer() {
    const { privateKey, publicKey } = generateKeyPairSync('ed25519')
    return { publicKey: publicKey.export({ format: 'jwk' }).x!, sign: (value: unknown) => sign(null, Buffer.from(canonicalText(value)), privateKey).toString('base64url') }
  }
  const [administrator, server] = [signer(), signer()]
  const DEVICE = '018f0000-0000-7000-8000-000000000001'
  const SERVER = '018f0000-0000-7000-8000-000000000002'
  const writer = storyTo('dark')
  const facts = factsOf(writer.state, writer.entries, { years: 2, over: '2028-03-03T02:24:00.000Z', files: 3 })
  const statement: DeletionStatement = { ...facts, type: 'holdover-deletion', version: 1, id: DEVICE, reason: 'Its retention is over', at: '2028-04-01T00:00:00.000Z', skew: 0, by: DEVICE, name: 'Ada Brook', device: DEVICE }
  function fileOf(change: Partial<DeletionFile> = {}): DeletionFile {
    const said = { type: 'holdover-checkpoint' as const, version: 1 as const, outage: statement.outage, size: statement.size, root: statement.root, time: '2026-03-03T02:24:00.000Z', key: SERVER }
    return {
      format: 'holdover-deletion', version: 1, statement, signature: administrator.sign(statement),
      signer: { device: DEVICE, deviceName: 'Desk', publicKey: administrator.publicKey, enrolledAt: '2026-01-01T00:00:00.000Z' },
      checkpoint: { statement: said, signature: server.sign(said) }, serverKey: { id: SERVER, publicKey: server.publicKey }, deletedAt: '2028-04-01T00:00:01.000Z',
      outage: { controller: 'Rack controller', workKind: 'Software update', planned: true, openedAt: '2026-03-03T00:00:00.000Z', endedAt: null, timeZone: 'UTC' }, ...change,
    }
  }
  const checked = async (file: DeletionFile) => checkDeletion(file, await webSignatures())

  it('names size and root of the log, by which a copy is known again', () => {
    expect(facts).toMatchObject({ outage: writer.state.id, size: writer.entries.length, root: logRoot(writer.entries), seal: null, files: 3 })
    expect(deletionFileSchema.safeParse(fileOf()).success).toBe(true)
  })
  it('is signed by the administrator and vouched for by the server', async () => {
    expect(await checked(fileOf())).toEqual({ signed: true, vouched: true })
    expect(await checked(fileOf({ checkpoint: null, serverKey: null }))).toEqual({ signed: true, vouched: null })
  })
  it.each([
    ['another reason', { statement: { ...statement, reason: 'Another' } }, { signed: false, vouched: true }],
    ['another root', { statement: { ...statement, root: 'a'.repeat(64) } }, { signed: false, vouched: false }],
    ['another key', { signer: { ...fileOf().signer, publicKey: server.publicKey } }, { signed: false, vouched: true }],
    ['another device', { signer: { ...fileOf().signer, device: SERVER } }, { signed: false, vouched: true }],
    ['another server\'s key', { serverKey: { id: SERVER, publicKey: administrator.publicKey } }, { signed: true, vouched: false }],
    ['no server\'s key', { serverKey: null }, { signed: true, vouched: false }],
  ])('is found out: %s', async (_what, change, expected) => {
    expect(await checked(fileOf(change))).toEqual(expected)
  })
})
