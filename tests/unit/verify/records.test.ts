/**
 * Sealed and clean records: what both verifiers say of them. The demands are this project's own, no published
 * source; the hashes and signatures beneath are RFC 9162 and RFC 8032.
 */
import { beforeAll, describe, expect, it } from 'vitest'
import { verifyRecord as verifyPlainly } from '../../../scripts/verify.mjs'
import type { RecordDocument } from '../../../shared/record/record-document'
import { verifyRecord } from '../../../shared/record/verify'
import { attackOn } from './attacks'
import { checkOnce, documentUpTo, drawer, variation } from './records'
import { recordsToAttack, sentRoot } from './under-attack'

const CLEAN = 1000
let documents: RecordDocument[]
beforeAll(() => { documents = recordsToAttack() }, 120_000)

describe('a sealed record', () => {
  it('is of about 60 entries, and the one that was sealed', async () => {
    for (const document of documents) {
      expect(document.size).toBeGreaterThan(55)
      expect(document.size).toBeLessThan(80)
      expect(await verifyRecord(document, { check: checkOnce, root: document.sealed!.root })).toMatchObject({ verdict: 'the-sealed-one', faults: [] })
      expect(verifyPlainly(document, document.sealed!.root)).toMatchObject({ verdict: 'the-sealed-one', faults: [] })
    }
  })

  it('fails in the same way for the script that shares no code with it', async () => {
    const draw = drawer(77)
    const differing: string[] = []
    for (let number = 0; number < 120; number++) {
      const attack = attackOn(documents, number, draw)
      const root = sentRoot(documents, attack)
      const ours = await verifyRecord(attack.document, { check: checkOnce, root })
      const theirs = verifyPlainly(attack.document, root)
      // The heading beyond size, root and seal is for the reader, and the script reads the entries alone.
      if (attack.kind === 'edit the heading' && ['outage', 'signers', 'refusals', 'rulebook'].includes(ours.faults[0]!.field)) continue
      if (ours.verdict !== theirs.verdict || ours.faults[0]?.seq !== theirs.faults[0]?.seq) differing.push(`${attack.kind} ${attack.tidy}: ${JSON.stringify([ours.verdict, ours.faults[0], theirs.verdict, theirs.faults[0]])}`)
    }
    expect(differing).toEqual([])
  }, 120_000)

  it('without any checkpoint says what does not show then: the server\'s notes on the seal itself and behind it', async () => {
    const document = documents[0]!
    const seal = document.sealed!.seq
    const entries = document.entries.map(stored => stored.seq === seal ? { ...stored, receivedAt: '2030-01-01T00:00:00.000Z' } : stored)
    const { verdict, notes, facts } = await verifyRecord({ ...document, versions: undefined, checkpoints: [], entries, root: (await verifyRecord({ ...document, entries, checkpoints: [] }, { check: checkOnce })).facts!.root }, { check: checkOnce })
    expect([verdict, facts!.checkpoints]).toEqual(['whole', 0])
    expect(notes.some(note => note.includes('carries no checkpoints'))).toBe(true)
  })
})

describe('clean records', () => {
  it(`raise no alarm, ${CLEAN} of them`, async () => {
    const alarms: string[] = []
    let count = 0
    for (let seed = 0; count < CLEAN; seed++) {
      const whole = variation(documents[seed % documents.length]!, seed)
      const draw = drawer(seed)
      const sizes = [whole.size, ...Array.from({ length: 9 }, () => 1 + draw(whole.size))]
      for (const size of sizes) {
        const document = size === whole.size ? whole : documentUpTo(whole, size)
        const root = document.sealed?.root ?? null
        const { verdict, faults } = await verifyRecord(document, { check: checkOnce, root })
        const expected = document.sealed ? 'the-sealed-one' : 'not-sealed'
        if (verdict !== expected || faults.length > 0) alarms.push(`${seed} up to ${size}: ${verdict} ${JSON.stringify(faults[0])}`)
        if (count % 50 === 0) expect(verifyPlainly(document, root).verdict).toBe(expected)
        count++
      }
    }
    expect(alarms).toEqual([])
  }, 300_000)
})
