// How the paper goes out: no faster than it is read, and without growing with the record. The bounds are this project's own.
import { mkdtemp, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { setTimeout as sleep } from 'node:timers/promises'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { openRecordPdf } from '../../../server/pdf/record'
import { foldLog } from '../../../shared/record/fold'
import { recordDocument, recordText } from '../../../shared/record/record-document'
import { paperOf, testFonts } from '../../support/paper'
import { paperProcess } from '../../support/paper-process'
import { technician } from '../../support/record'
import { buildRecord } from '../../support/scenario'

let folder: string
beforeAll(async () => { folder = await mkdtemp(join(tmpdir(), 'holdover-stream-')) })
afterAll(() => rm(folder, { recursive: true, force: true }))

describe('the stream of a paper', () => {
  it('is drawn no further ahead than a reader takes, and goes on when it does', async () => {
    const { doc, written } = openRecordPdf(await paperOf(buildRecord(), 'a1b'), await testFonts())
    let done = false
    void written.then(() => { done = true })
    const read: number[] = []
    for (let quiet = 0, last = -1; quiet < 10; quiet = doc.readableLength === last ? quiet + 1 : 0) { last = doc.readableLength; await sleep(20) }
    const waiting = doc.readableLength
    expect(done).toBe(false)
    // What is drawn between two rests may stand above the mark; the whole paper is many times that.
    expect(waiting).toBeLessThan(doc.readableHighWaterMark + 150_000)
    for await (const chunk of doc as AsyncIterable<Uint8Array>) read.push(chunk.length)
    await written
    expect(read.reduce((sum, length) => sum + length, 0)).toBeGreaterThan(2 * waiting)
  }, 60_000)

  it('is given up when nobody reads any more', async () => {
    const { doc, written } = openRecordPdf(await paperOf(buildRecord(), 'a1b'), await testFonts())
    setTimeout(() => doc.destroy(), 300)
    await expect(written).rejects.toThrow('Nobody reads this paper any more')
  }, 60_000)

  it('takes less than twice the memory for 2,000 entries that it takes for 200', async () => {
    const writer = buildRecord({ until: 'submitted' })
    for (let count = writer.entries.length; count < 2_000; count = writer.entries.length) writer.pass(0.05).sign(technician, 'note-added', { words: `Looked at ${count}: doors shut, covers down, fans heard` })
    const make = await paperProcess()
    const peak = async (size: number) => {
      const entries = writer.entries.slice(0, size)
      const path = join(folder, `${size}.json`)
      await writeFile(path, recordText(recordDocument(foldLog(writer.id, entries), entries, { program: 'test', rulebook: null, checkpoints: [] })))
      return make(path)
    }
    const [short, long] = [await peak(200), await peak(2_000)]
    expect(long.pages).toBeGreaterThan(3 * short.pages)
    expect(long.peakMb).toBeLessThan(2 * short.peakMb)
  }, 180_000)
})
