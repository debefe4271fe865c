import { createHash, createPublicKey, verify } from 'node:crypto'
import { parse } from 'csv-parse/sync'
import canonicalize from 'canonicalize'
import { beforeAll, describe, expect, it } from 'vitest'
import { foldLog } from '../../../shared/record/fold'
import { csvCell, localTime, readingsCsv } from '../../../shared/record/readings-csv'
import { logRoot } from '../../../shared/record/merkle'
import { recordText } from '../../../shared/record/record-document'
import { FOLD_VERSION } from '../../../shared/record/state'
import { PROGRAM_VERSION } from '../../../shared/program-version'
import { rulebookById } from '../../../server/utils/holding'
import { recordOf } from '../../support/record'
import type { RecordDocument } from '../../../shared/record/record-document'
import { busyRecord } from '../../support/busy'
import { buildRecord } from '../../support/scenario'
import type { RecordWriter } from '../../support/record'

let writer: RecordWriter
beforeAll(() => { writer = busyRecord('submitted') })

describe('record.csv', () => {
  // RFC 4180: CRLF, quotes doubled, a cell with comma, quote or line end in quotes.
  it.each([
    ['plain', 'plain'], ['a,b', '"a,b"'], ['say "no"', '"say ""no"""'], ['two\nlines', '"two\nlines"'], [null, ''], [-18.5, '-18.5'],
  ])('writes %j as %j', (value, cell) => expect(csvCell(value)).toBe(cell))

  // OWASP, CSV injection: cells that begin with = + - @ tab or carriage return.
  it.each(['=1+1', '+1', '-1', '@SUM(A1)', '\t=1', '\r=1'])('defuses %j', value => expect(csvCell(value)).toMatch(/^"?'/))

  it('has a row for each reading, with the value as signed and as it counts', () => {
    const text = readingsCsv(writer.state, writer.entries)
    expect(text.charCodeAt(0)).toBe(0xFEFF)
    expect(text.endsWith('\r\n')).toBe(true)
    const rows = parse(text, { bom: true, columns: true }) as Record<string, string>[]
    expect(rows).toHaveLength(writer.entries.filter(stored => stored.entry.kind === 'reading-taken').length)
    expect(rows.find(row => row.value_signed === '43.2')).toMatchObject({ case: 'Dairy wall 4–7', value: '42.3', unit: 'F', limit: '41', corrected: 'yes', struck: 'no', by: 'Ada Quill', verdict: 'above its limit' })
    expect(rows.find(row => row.value_signed === '61')).toMatchObject({ value: '', struck: 'yes' })
    expect(rows[0]).toMatchObject({ round: '0', verdict: '', instrument: 'T-4', time_utc: '2026-03-03T08:21:58.000Z', time: '2026-03-03T02:21:58-06:00' })
  })

  it.each([
    ['America/Chicago', '2026-03-08T01:59:59-06:00', Date.UTC(2026, 2, 8, 7, 59, 59)],
    // Clocks went on an hour that night (tz database, rule US).
    ['America/Chicago', '2026-03-08T03:00:00-05:00', Date.UTC(2026, 2, 8, 8)],
    ['Asia/Kolkata', '2026-03-03T05:30:00+05:30', Date.UTC(2026, 2, 3)],
    ['UTC', '2026-03-03T00:00:00+00:00', Date.UTC(2026, 2, 3)],
  ])('writes local time in %s as %s', (zone, text, at) => {
    expect(localTime(at, zone)).toBe(text)
    expect(Date.parse(text)).toBe(at)
  })
})

describe('record.json', () => {
  let document: RecordDocument
  beforeAll(() => { document = JSON.parse(recordText(recordOf(writer))) as RecordDocument })

  it('folds to the same state when read back', () => {
    expect(document.format).toBe('holdover-record')
    expect(foldLog(document.outage.id, document.entries)).toEqual(writer.state)
  })

  // Checked a second way: Node's own verify over an SPKI key (RFC 8410), not the product's code.
  it('holds all that a signature is verified by', () => {
    const keys = new Map(document.signers.map(signer => [signer.device, createPublicKey({ key: { kty: 'OKP', crv: 'Ed25519', x: signer.publicKey }, format: 'jwk' })]))
    for (const { entry, signature } of document.entries) {
      expect(verify(null, Buffer.from(canonicalize(entry)!), keys.get(entry.device)!, Buffer.from(signature, 'base64url'))).toBe(true)
    }
  })

  // RFC 9162, 2.1.1, in a few lines of its own.
  it('holds the root of its entries', () => {
    const sha = (...parts: Uint8Array[]) => createHash('sha256').update(Buffer.concat(parts)).digest()
    const root = (leaves: Buffer[]): Buffer => {
      if (leaves.length === 1) return leaves[0]!
      const split = 2 ** Math.ceil(Math.log2(leaves.length) - 1)
      return sha(Uint8Array.of(1), root(leaves.slice(0, split)), root(leaves.slice(split)))
    }
    const leaves = document.entries.map(stored => sha(Uint8Array.of(0), Buffer.from(canonicalize(stored)!)))
    expect(root(leaves).toString('hex')).toBe(document.root)
  })

  it('is a document of version 2 with the rulebook, the refusals, and the owner and enrolment of each key', () => {
    expect(document.version).toBe(2)
    expect(document.versions).toEqual({ program: PROGRAM_VERSION, fold: FOLD_VERSION })
    expect(document.rulebook.data).toEqual(JSON.parse(JSON.stringify(rulebookById(document.rulebook.id, document.rulebook.version))))
    expect(document.refusals.map(({ seq, n }) => [seq, n])).toEqual(writer.state.refusals.map(({ seq, n }) => [seq, n]))
    expect(document.signers.map(signer => signer.device)).toEqual(Object.keys(writer.state.signers))
    for (const { seq, enrolledAt } of document.signers) expect(Date.parse(enrolledAt)).toBeLessThan(Date.parse(document.entries[seq - 1]!.receivedAt))
    expect(document.checkpoints.map(({ statement }) => [statement.size, statement.time])).toEqual(document.entries.map(({ seq, receivedAt }) => [seq, receivedAt]))
  })

  it('has each entry and checkpoint on a line of its own, in canonical JSON', () => {
    const lines = new Set(recordText(recordOf(writer)).split('\n').map(line => line.replace(/,$/, '')))
    for (const item of [...document.entries, ...document.checkpoints]) expect(lines.has(canonicalize(item)!)).toBe(true)
  })

  it('says what was sealed', () => {
    const sealed = buildRecord()
    const seal = sealed.entries.at(-1)!
    expect(recordOf(sealed).sealed).toEqual({ seq: seal.seq, at: seal.receivedAt, by: seal.entry.by, size: seal.seq - 1, root: logRoot(sealed.entries.slice(0, -1)) })
  })
})
