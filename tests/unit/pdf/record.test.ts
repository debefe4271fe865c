// What the paper must hold is this project's own; the tools that read it are poppler's and qpdf.
import { execFile } from 'node:child_process'
import { mkdtemp, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { promisify } from 'node:util'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { RecordPaper } from '../../../server/pdf/record'
import { AWAITED, busyRecord, LONG_TOKEN, LONG_WORDS } from '../../support/busy'
import { paperOf, pdfOf } from '../../support/paper'
import { buildRecord } from '../../support/scenario'

const run = promisify(execFile)
let folder: string
beforeAll(async () => { folder = await mkdtemp(join(tmpdir(), 'holdover-pdf-')) })
afterAll(() => rm(folder, { recursive: true, force: true }))

async function saved(name: string, paper: RecordPaper): Promise<string> {
  const path = join(folder, name)
  await writeFile(path, await pdfOf(paper))
  return path
}
const text = async (path: string, ...options: string[]) => (await run('pdftotext', [...options, path, '-'], { maxBuffer: 50_000_000 })).stdout
const info = async (path: string) => Object.fromEntries((await run('pdfinfo', [path])).stdout.split('\n').map(line => line.split(/:\s+/)))
const flat = (words: string) => words.replace(/\s+/g, ' ')
/** The parts that do not stand in a text; a plain comparison would print all of it. */
const missing = (words: string, parts: string[]) => parts.filter(part => !words.includes(part))

describe('the paper of a sealed record', () => {
  let paper: RecordPaper
  let path: string
  beforeAll(async () => {
    paper = await paperOf(buildRecord({ site: { paper: 'Letter' } }))
    path = await saved('sealed.pdf', paper)
  }, 60_000)

  it('is the same bytes for the same record', async () => {
    const again = await pdfOf(await paperOf(buildRecord({ site: { paper: 'Letter' } })))
    expect(again.equals(await pdfOf(paper))).toBe(true)
  }, 60_000)

  it('is a sound file', async () => {
    const { stdout } = await run('qpdf', ['--check', path])
    expect(stdout).toContain('No syntax or stream encoding errors found')
  })

  it('names itself, its language and its size, and is tagged', async () => {
    const facts = await info(path)
    expect(facts).toMatchObject({ 'Tagged': 'yes', 'PDF version': '1.7' })
    expect((await run('pdfinfo', [path])).stdout).toMatch(/^Title: +Record of a controller outage Q027-0041: Quarry Street, rack A controller$/m)
    expect(facts['Page size']).toContain('612 x 792')
    const { stdout } = await run('qpdf', ['--qdf', '--object-streams=disable', path, '-'], { maxBuffer: 100_000_000, encoding: 'latin1' })
    expect(missing(stdout, ['/Lang (en)', '/Type /StructTreeRoot', '/Title (Every signed entry)'])).toEqual([])
    expect(stdout.includes('Helvetica')).toBe(false)
  })

  it('tells what was entered, by whom, when and with which signature', async () => {
    const words = flat(await text(path, '-layout'))
    expect(missing(words, [
      'Record of a controller outage', 'Q027-0041', 'Quarry Street, rack A controller · software update', 'Tue 3 Mar 2026, 01:59 to 03:35', 'America/Chicago (UTC−6)',
      '23 min 10 s of 25 min planned', '18 set, 18 back in auto, 18 proven', '40.2 °F, Dairy wall 4–7', 'FDA Food Code 2022, 3-501.16(A)(2)',
      'Signed, technician · 03:35:36', 'Countersigned, supervisor ·', 'I have reviewed this record and countersign',
      'running · 18.4 A', 'file read back', 'Control taken away', 'Record countersigned and sealed', 'Holdover advises and records; it controls nothing.',
      paper.state.sealed!.root, 'is the one that was sealed', `page 1 of ${(await info(path)).Pages}`,
    ])).toEqual([])
    expect(words.match(/ok [0-9a-f]{4}…[0-9a-f]{2}/g)).toHaveLength(paper.entries.length)
  })

  it('says which signature does not fit, and that the seal does not hold', async () => {
    const forged = await saved('forged.pdf', { ...paper, verified: new Map([...paper.verified, [12, false]]), sealHolds: false })
    const words = flat(await text(forged))
    expect(missing(words, ['The signatures of 1 entry do not fit their signer\'s key: No. 12.', 'is NOT the one that was sealed'])).toEqual([])
    expect(words.match(/WRONG [0-9a-f]{4}…/g)).toHaveLength(1)
  }, 30_000)
})

describe('the paper of a record with everything in it', () => {
  let path: string
  let paper: RecordPaper
  beforeAll(async () => {
    paper = await paperOf(busyRecord('submitted'))
    path = await saved('busy.pdf', paper)
  }, 60_000)

  it('is A4 where the site says so, sound, and not sealed', async () => {
    expect((await info(path))['Page size']).toContain('595.28 x 841.89')
    await expect(run('qpdf', ['--check', path])).resolves.toBeDefined()
    const words = flat(await text(path))
    expect(missing(words, ['not sealed', 'Not yet countersigned', 'questioned: there is no such step', 'pressed the wrong line', 'The body is not written as its kind lays down', `No. ${paper.summary.corrections[0]!.of!.seq}`, '42.3 °F', 'oysters · 3.5 kg · bin room', 'LT-1, excused', 'Are the night covers down?', 'the new software does not start', 'awaited', AWAITED.slice(32), 'Photos', 'Drawn signatures'])).toEqual([])
  })

  it('sets names in other letters, and a sign that no font has as a question mark', async () => {
    expect(missing(flat(await text(path)), ['Łucja Ångström Ελένη Жук ?'])).toEqual([])
  })

  it('loses none of 260 words and none of 180 letters without a break', async () => {
    const words = await text(path)
    const set = new Set(words.split(/\s+/))
    expect(LONG_WORDS.split(' ').filter(word => !set.has(word))).toEqual([])
    expect(words.match(/x{2,}/g)!.join('').length).toBeGreaterThanOrEqual(LONG_TOKEN.length)
  })

  it('writes no word over another and none outside the margins', async () => {
    const pages = (await text(path, '-bbox')).split('<page ').slice(1)
    expect(pages.length).toBeGreaterThan(5)
    for (const page of pages) {
      const boxes = [...page.matchAll(/<word xMin="([\d.]+)" yMin="([\d.]+)" xMax="([\d.]+)" yMax="([\d.]+)">(.*?)<\/word>/g)].map(([, ...numbers]) => ({ left: Number(numbers[0]), top: Number(numbers[1]), right: Number(numbers[2]), bottom: Number(numbers[3]), word: numbers[4] }))
      for (const box of boxes) {
        expect(box.left, box.word).toBeGreaterThan(38)
        expect(box.right, box.word).toBeLessThan(595.28 - 38)
      }
      // Boxes are as high as a line may be, letters two thirds of it: the middle third is surely inked.
      const inked = boxes.map(box => ({ ...box, top: box.top + (box.bottom - box.top) * 0.36, bottom: box.bottom - (box.bottom - box.top) * 0.3 }))
      const over = inked.flatMap((a, index) => inked.slice(index + 1).filter(b => Math.min(a.right, b.right) - Math.max(a.left, b.left) > 0.4 && Math.min(a.bottom, b.bottom) - Math.max(a.top, b.top) > 0.2).map(b => `${a.word} / ${b.word}`))
      expect(over).toEqual([])
    }
  })
})

describe('the paper of an outage that never lost control', () => {
  it('is made as well', async () => {
    const path = await saved('plan.pdf', await paperOf(buildRecord({ until: 'approved' })))
    const words = flat(await text(path))
    expect(missing(words, ['Control was never lost.', 'Not yet submitted'])).toEqual([])
  }, 30_000)
})
