/** Going on from another log after a restore: rules of this project, no published source. */
import { describe, expect, it } from 'vitest'
import { lostOf, otherLogWords } from '~/offline/other-log'
import type { OutboxEntry } from '~/offline/outbox-ports'
import { keptFile } from '~/utils/kept-file'
import { foldLog } from '~~/shared/record/fold'
import { entryHash, isoTime } from '~~/shared/record/entry'
import type { AnyEntry, StoredEntry } from '~~/shared/record/entry'
import { secondTechnician, technician } from '../../support/record'
import { storyTo } from '../record/store'

const writer = storyTo('dark')
for (const words of ['one', 'two']) writer.sign(technician, 'note-added', { words })
writer.sign(secondTechnician, 'note-added', { words: 'of another' })
writer.sign(technician, 'note-added', { words: 'three' })
const log: readonly StoredEntry[] = writer.entries
const me = { person: technician.id, device: technician.device }
const words = (entry: AnyEntry) => (entry.body as { words?: string }).words
/** An entry that this phone signed after the end of a log and that still waits. */
function waiting(n: number, prev: string, receipt: OutboxEntry['receipt'] = null): OutboxEntry {
  const last = log.at(-1)!.entry
  const entry = { ...last, id: `018f0000-0000-7000-8000-00000000000${n % 10}`, n, prev, body: { words: 'waits', photos: [] } } as AnyEntry
  return { id: entry.id, outage: entry.outage, ...me, n, entry, signature: 'x'.repeat(86), keptAt: isoTime(0), place: 1, receipt, refusal: null }
}
/** Where a device's chain ends in a log. */
const chainOf = (given: readonly StoredEntry[], device = technician.device) => foldLog(writer.state.id, given).chain[device] ?? null
const end = log.filter(stored => stored.entry.device === technician.device).at(-1)!.entry

describe('a log that was restored from a backup', () => {
  it('takes again what this phone signed after the backup, in its order, and what still waits', () => {
    const found = lostOf(log, [waiting(end.n + 1, entryHash(end))], log.slice(0, -5), chainOf(log.slice(0, -5)), me)
    expect(found.unfit).toBeNull()
    expect(found.again.map(item => words(item.entry))).toEqual(['one', 'two', 'three', 'waits'])
    expect(found.again.every(item => item.receipt === null && item.refusal === null)).toBe(true)
    for (const [index, item] of found.again.slice(1).entries()) expect([item.n, item.entry.prev]).toEqual([found.again[index]!.n + 1, entryHash(found.again[index]!.entry)])
    expect(found.again[0]!.entry).toBe(log.at(-5)!.entry)
    expect(found.others).toBe(1)
  })
  it('counts a receipt of the lost log for nothing', () => {
    const received = waiting(end.n + 1, entryHash(end), { status: 'accepted', seq: 99, receivedAt: isoTime(0), why: [] })
    expect(lostOf(log, [received], log, chainOf(log), me).again).toMatchObject([{ id: received.id, receipt: null }])
  })
  it('asks for nothing where the log holds it all', () => {
    expect(lostOf(log, [], log, chainOf(log), me)).toEqual({ again: [], cut: [], end: chainOf(log), others: 0, unfit: null })
  })
  it('is not gone on from where it holds what this phone never signed', () => {
    const forged = log.map(stored => stored.seq === log.length ? { ...stored, entry: { ...stored.entry, body: { ...stored.entry.body, words: 'not mine' } } as AnyEntry } : stored)
    expect(lostOf(log, [], forged, chainOf(log), me)).toMatchObject({ again: [], unfit: `No. ${log.length} of that log is signed by this phone, and this phone does not know it` })
  })
  it('takes nothing of another person or another device', () => {
    expect(lostOf(log, [], log.slice(0, -5), chainOf(log.slice(0, -5)), { ...me, device: secondTechnician.device }).again).toEqual([])
  })
  it('sends a refused entry again too, whose place in the chain was taken', () => {
    const refused = { ...waiting(end.n + 1, entryHash(end)), refusal: { code: 403, field: null, reason: 'no', recorded: true } }
    const after = waiting(end.n + 2, entryHash(refused.entry))
    expect(lostOf(log, [refused, after], log, chainOf(log), me)).toMatchObject({ again: [{ n: end.n + 1, refusal: null }, { n: end.n + 2 }], cut: [] })
  })
  it('marks what cannot follow, since an entry before it is gone, and goes on from the end of the rest', () => {
    const after = waiting(end.n + 2, 'a'.repeat(64))
    const found = lostOf(log, [after], log, chainOf(log), me)
    expect(found).toMatchObject({ again: [], cut: [{ n: end.n + 2, refusal: { recorded: false } }], end: chainOf(log) })
  })
  it('says in the log what was seen before, and why', () => {
    const seen = { statement: { type: 'holdover-checkpoint' as const, version: 1 as const, outage: writer.state.id, size: 50, root: 'a'.repeat(64), time: '2026-03-03T02:24:00.000Z', key: me.device }, signature: 'x'.repeat(86) }
    expect(otherLogWords(seen, 46, 3, 'Ada restored last night\'s backup')).toBe(`This phone had seen another log of this outage: 50 entries at 2026-03-03T02:24:00.000Z, root ${'a'.repeat(64)}. It goes on from the log of 46 entries that the server gives now, and sends 3 of its own again as they were signed. Reason: Ada restored last night's backup`)
    expect(keptFile(writer.state.id, [waiting(1, '')], seen, log)).toMatchObject({ format: 'holdover-kept-entries', version: 1, seen, entries: [{ signature: 'x'.repeat(86) }], log: { length: log.length } })
  })
})
