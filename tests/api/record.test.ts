// What readers of a record get over HTTP, on the built server; promises of this project's own, no published source.
import { execFile } from 'node:child_process'
import { mkdtemp, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { promisify } from 'node:util'
import sharp from 'sharp'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { foldLog } from '../../shared/record/fold'
import type { RecordDocument } from '../../shared/record/record-document'
import { sha256Hex } from '../../shared/record/canonical'
import { drawnSignature } from '../support/png'
import type { Phone } from '../support/phone'
import type { World } from '../support/world'
import { startWorld } from '../support/world'

const run = promisify(execFile)
let world: World
let phone: Phone
let outage: string
let folder: string

beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'holdover-record-'))
  world = await startWorld()
  phone = await world.phoneOf('technician')
  outage = await world.open(phone, world.server.now() - 5 * 60_000)
  const caseId = world.snapshot.cases[0]!.id
  const { result } = await phone.act(outage, 'reading-taken', { round: 0, caseId, value: 36.4, unit: 'F', method: 'product', instrumentId: null, words: '=1+1' })
  expect(result.status).toBe('accepted')
}, 120_000)
afterAll(async () => {
  await world.server.stop()
  await rm(folder, { recursive: true, force: true })
})

const put = (bytes: Uint8Array, hash = sha256Hex(bytes), who: 'technician' | 'auditor' | 'stranger' = 'technician') => world.people[who].client.fetch(`/api/outages/${outage}/files/${hash}`, { method: 'PUT', body: new Uint8Array(bytes), headers: { 'content-type': 'image/jpeg' } })
const reasonOf = async (answer: Response) => (await answer.json() as { data: { field?: string, reason: string } }).data

describe('a photo or drawing', () => {
  const drawing = drawnSignature(0)
  const path = () => `/api/outages/${outage}/files/${sha256Hex(drawing)}`

  it('is kept once and answers the same again', async () => {
    expect((await put(drawing)).status).toBe(201)
    const again = await put(drawing)
    expect(again.status).toBe(200)
    expect(await again.json()).toEqual({ sha256: sha256Hex(drawing), mime: 'image/png', size: drawing.length })
  })

  it('is among those that are held', async () => {
    const answer = await world.people.auditor.client.fetch(`/api/outages/${outage}/files`)
    expect(await answer.json()).toEqual({ held: [sha256Hex(drawing)] })
  })

  it('comes back byte for byte, by its own kind, never to change, to the site\'s people alone', async () => {
    const answer = await world.people.auditor.client.fetch(path())
    expect(Buffer.from(await answer.arrayBuffer()).equals(drawing)).toBe(true)
    expect(Object.fromEntries(['content-type', 'cache-control', 'x-content-type-options', 'content-disposition'].map(name => [name, answer.headers.get(name)]))).toEqual({
      'content-type': 'image/png', 'cache-control': 'private, max-age=31536000, immutable', 'x-content-type-options': 'nosniff', 'content-disposition': `inline; filename="${sha256Hex(drawing).slice(0, 12)}.png"`,
    })
    expect((await world.people.stranger.client.fetch(path())).status).toBe(404)
    expect((await world.people.auditor.client.fetch(path().replace(/.$/, 'z'))).status).toBe(404)
  })

  it('is not kept under another name, with metadata, or when it is no picture', async () => {
    const other = await put(drawnSignature(1), 'a'.repeat(64))
    expect(other.status).toBe(422)
    expect((await reasonOf(other)).field).toBe('sha256')
    const exif = await put(await sharp(drawing).flatten().jpeg().withExif({ IFD0: { Copyright: 'somebody' } }).toBuffer())
    expect(exif.status).toBe(422)
    expect((await reasonOf(exif)).reason).toContain('EXIF')
    expect((await put(Buffer.from('no picture'))).status).toBe(422)
    expect((await put(Buffer.alloc(0))).status).toBe(422)
  })

  it('is not kept above 10 MB, said or unsaid', async () => {
    const large = Buffer.alloc(10_000_001, 1)
    expect((await put(large)).status).toBe(413)
    const stream = new ReadableStream<Uint8Array>({
      start(controller) {
        for (let at = 0; at < large.length; at += 1_000_000) controller.enqueue(large.subarray(at, at + 1_000_000))
        controller.close()
      },
    })
    const answer = await world.people.technician.client.fetch(`/api/outages/${outage}/files/${sha256Hex(large)}`, { method: 'PUT', body: stream, duplex: 'half' } as RequestInit)
    expect(answer.status).toBe(413)
  })

  it('is put by those who work there, not by those who only read', async () => {
    expect((await put(drawnSignature(2), undefined, 'auditor')).status).toBe(403)
    expect((await put(drawnSignature(2), undefined, 'stranger')).status).toBe(404)
  })
})

describe('the record as a file', () => {
  const get = (extension: string, who: 'auditor' | 'stranger' = 'auditor') => world.people[who].client.fetch(`/api/outages/${outage}/record.${extension}`)

  it.each(['pdf', 'csv', 'json'])('is not there for others: %s', async (extension) => {
    expect((await get(extension, 'stranger')).status).toBe(404)
  })

  it('is the same PDF twice, named by its code, with what was entered', async () => {
    const [first, second] = [await get('pdf'), await get('pdf')]
    expect(first.headers.get('content-type')).toBe('application/pdf')
    expect(first.headers.get('content-disposition')).toBe('inline; filename="Q101-0001.pdf"')
    const bytes = Buffer.from(await first.arrayBuffer())
    expect(bytes.equals(Buffer.from(await second.arrayBuffer()))).toBe(true)
    const path = join(folder, 'record.pdf')
    await writeFile(path, bytes)
    const { stdout } = await run('pdftotext', ['-layout', path, '-'])
    const words = stdout.replace(/\s+/g, ' ')
    expect(['Q101-0001', 'Mill Lane', '36.4 °F', 'not sealed', 'technician'].filter(part => !words.includes(part))).toEqual([])
    expect(words.match(/ok [0-9a-f]{4}…[0-9a-f]{2}/g)!.length).toBeGreaterThanOrEqual(5)
  })

  it('is a PDF for long keeping too, without the attached record', async () => {
    const bytes = Buffer.from(await (await get('pdf?variant=a1b')).arrayBuffer())
    expect(bytes.subarray(0, 8).toString('latin1')).toBe('%PDF-1.4')
    expect(bytes.includes('record.json')).toBe(false)
    expect((await get('pdf?variant=a4')).status).toBe(422)
  })

  it('is CSV whose words no spreadsheet takes for a formula', async () => {
    const answer = await get('csv')
    expect(answer.headers.get('content-type')).toBe('text/csv; charset=utf-8')
    const text = Buffer.from(await answer.arrayBuffer()).toString('utf8')
    expect(text.startsWith('\uFEFFseq,round,case,')).toBe(true)
    expect(text).toMatch(/,36\.4,F,36\.4,41,F,product,,,[^,]+,within its limit,accepted,no,no,'=1\+1\r\n$/)
  })

  it('is JSON that folds to what the server holds', async () => {
    const document = await (await get('json')).json() as RecordDocument
    expect(document).toMatchObject({ format: 'holdover-record', version: 2, outage: { code: 'Q101-0001', phase: 'dark' }, sealed: null })
    const { body } = await world.people.auditor.client.send('GET', `/api/outages/${outage}`)
    expect(JSON.parse(JSON.stringify(foldLog(outage, document.entries)))).toEqual(body)
  })
})
