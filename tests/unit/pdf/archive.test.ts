// Structure and bookmarks as poppler reads them, PDF/A-1b (ISO 19005-1) by Apache PDFBox Preflight, soundness by qpdf.
import { execFile } from 'node:child_process'
import { mkdtemp, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { promisify } from 'node:util'
import sharp from 'sharp'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { PaperVariant } from '../../../server/pdf/variant'
import { recordInPdf } from '../../../shared/record/verify/pdf'
import { busy } from '../../support/busy'
import { paperOf, pdfOf } from '../../support/paper'
import { preflightFaults } from '../../support/preflight'
import type { RecordWriter } from '../../support/record'
import { technician } from '../../support/record'
import { buildRecord } from '../../support/scenario'

const run = promisify(execFile)
let folder: string
let full: RecordWriter
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'holdover-archive-'))
  full = await fullRecord()
}, 60_000)
afterAll(() => rm(folder, { recursive: true, force: true }))

/** A name that would spoil markup, photos that came in two formats, one that is awaited, and all that a record can hold. */
async function fullRecord(): Promise<RecordWriter> {
  const wide = await sharp({ create: { width: 1600, height: 1200, channels: 3, background: '#3B5998' } }).jpeg().toBuffer()
  const clear = await sharp({ create: { width: 300, height: 900, channels: 4, background: { r: 160, g: 96, b: 48, alpha: 0.5 } } }).png().toBuffer()
  return buildRecord({
    ...busy, until: 'submitted', site: { ...busy.site, name: 'Quarry <&> Street' },
    during: { ...busy.during, 'hand-back': (writer) => {
      busy.during!['hand-back']!(writer)
      writer.pass(0.1).sign(technician, 'note-added', { words: 'the panel as it was found', photos: [writer.keep(wide), writer.keep(clear)] })
    } },
  })
}

describe.each<PaperVariant>(['record', 'a1b'])('the paper for %s', (variant) => {
  let path: string
  let bytes: Buffer
  let pages: string[]
  beforeAll(async () => {
    path = join(folder, `${variant}.pdf`)
    bytes = await pdfOf(await paperOf(full, variant))
    await writeFile(path, bytes)
    pages = (await run('pdftotext', ['-layout', path, '-'])).stdout.split('\f').slice(0, -1)
  }, 60_000)

  it('is sound', async () => {
    expect((await run('qpdf', ['--check', path])).stdout).toContain('No syntax or stream encoding errors found')
  })

  it('has code, root and its place on every page, and how to verify on the last', () => {
    pages.forEach((page, index) => {
      expect(page, `page ${index + 1}`).toContain(`page ${index + 1} of ${pages.length}`)
      expect(page).toMatch(/Q027-0041 · not sealed, root [0-9a-f]{4}/)
    })
    for (const words of ['How to verify this record', '/verify', 'scripts/verify.mjs', 'By hand']) expect(pages.at(-1)).toContain(words)
    expect(pages.slice(0, -1).join('')).not.toContain('How to verify this record')
  })

  it('prints photos that came, each with its entry and hash, and says which is awaited', async () => {
    const images = (await run('pdfimages', ['-list', path])).stdout.split('\n').filter(line => / image .* jpeg /.test(line)).map(line => line.trim().split(/\s+/))
    expect(images.map(([, , , width, height]) => [Number(width), Number(height)])).toEqual([[480, 360], [160, 480]])
    expect(pages.join('')).toMatch(/No\. \d+, \d\d:\d\d:\d\d, Ada Quill: Note, the/)
    expect(pages.join('')).toContain('awaited')
  })

  it('is tagged: headings, tables with heads, figures with words, lists with labels', async () => {
    const structure = (await run('pdfinfo', ['-struct', path], { maxBuffer: 50_000_000 })).stdout
    const count = (pattern: RegExp) => structure.match(pattern)?.length ?? 0
    expect(structure.startsWith('Document\n  H1 (block)')).toBe(true)
    expect(count(/^ {4}H2 /gm)).toBeGreaterThan(12)
    expect(count(/^ {4}H3 /gm)).toBeGreaterThan(5)
    expect(count(/ TH:\n +\/Scope \/Column/g)).toBeGreaterThan(40)
    expect(count(/ TH:\n +\/Scope \/Row/g)).toBeGreaterThan(5)
    expect(count(/\/ColSpan 6/g)).toBeGreaterThan(0)
    expect(count(/ LI \(block\)\n +Lbl \(block\)\n +LBody \(block\)/g)).toBeGreaterThan(10)
    // Every figure says in words what it shows.
    const { stdout } = await run('qpdf', ['--json=2', '--json-key=qpdf', path], { maxBuffer: 100_000_000 })
    const objects = Object.values((JSON.parse(stdout) as { qpdf: [unknown, Record<string, { value?: Record<string, unknown> }>] }).qpdf[1])
    const figures = objects.flatMap(({ value }) => value?.['/S'] === '/Figure' ? [String(value['/Alt'] ?? '')] : [])
    expect(figures.length).toBe(count(/ Figure/g))
    expect(figures.filter(words => !/^u:(Disc|Product temperatures|Photo of entry \d+|Drawn signature of)/.test(words))).toEqual([])
  })

  it('has bookmarks for its parts, and folded ones for what is in them', async () => {
    const { stdout } = await run('qpdf', ['--json=2', '--json-key=outlines', path], { maxBuffer: 50_000_000 })
    interface Item { title: string, open: boolean, kids: Item[] }
    const { outlines } = JSON.parse(stdout) as { outlines: Item[] }
    const titles = outlines.map(item => item.title)
    expect(titles).toEqual(expect.arrayContaining(['Summary', 'What to look at', 'Plan', 'Points', 'Every signed entry', 'Photos', 'How to verify this record']))
    expect(outlines.find(item => item.title === 'Plan')).toMatchObject({ open: false, kids: [{ title: 'Steps of the work' }, { title: 'Points in their order' }] })
  })

  it('names itself in both places alike', async () => {
    const { stdout } = await run('qpdf', ['--qdf', '--object-streams=disable', path, '-'], { maxBuffer: 100_000_000, encoding: 'latin1' })
    expect(stdout).toContain('Record of a controller outage Q027-0041: Quarry &lt;&amp;&gt; Street, rack A controller</rdf:li>')
    expect((await run('pdfinfo', [path])).stdout).toMatch(/^Title: +Record of a controller outage Q027-0041: Quarry <&> Street, rack A controller$/m)
    const [, part, conformance] = /<pdfaid:part>(\d)<\/pdfaid:part>\s*<pdfaid:conformance>(\w)</.exec(stdout)!
    expect(`${part}${conformance}`).toBe(variant === 'record' ? '3A' : '1B')
    expect(/\/Lang \(en\)/.test(stdout) && /\/DisplayDocTitle true/.test(stdout)).toBe(true)
  })

  it(variant === 'record' ? 'carries the record' : 'carries no file, and is valid PDF/A-1b by PDFBox Preflight', async () => {
    if (variant === 'record') {
      expect(JSON.parse(await recordInPdf(bytes)).format).toBe('holdover-record')
    } else {
      await expect(recordInPdf(bytes)).rejects.toThrow()
      expect(await preflightFaults(path)).toBe('')
    }
  }, 120_000)
})

describe('the paper of a sealed record', () => {
  it('bears the sealed root on each page, and is valid PDF/A-1b by PDFBox Preflight', async () => {
    const path = join(folder, 'sealed.pdf')
    await writeFile(path, await pdfOf(await paperOf(buildRecord(), 'a1b')))
    const pages = (await run('pdftotext', ['-layout', path, '-'])).stdout.split('\f').slice(0, -1)
    expect(pages.filter(page => !/Q027-0041 · seal [0-9a-f]{4} /.test(page))).toEqual([])
    expect(await preflightFaults(path)).toBe('')
  }, 120_000)

  it('is found at fault where it is none: a file with an attachment is no PDF/A-1b', async () => {
    const path = join(folder, 'attached.pdf')
    const text = (await pdfOf(await paperOf(buildRecord({ until: 'approved' }), 'record')))
    await writeFile(path, text)
    expect(await preflightFaults(path)).toContain('not a valid PDF/A-1b file')
  }, 120_000)
})
