/** Reading what is handed in: files, PDFs (ISO 32000-1, 7.3.8 and 7.11.4) and a root as somebody copied it. */
import { deflateSync } from 'node:zlib'
import { beforeAll, describe, expect, it } from 'vitest'
import { recordInPdf as plainly } from '../../../scripts/verify.mjs'
import { recordText } from '../../../shared/record/record-document'
import { readRoot, verifyRecord, webSignatures } from '../../../shared/record/verify'
import { recordInPdf } from '../../../shared/record/verify/pdf'
import { readRecordFile } from '../../../shared/record/verify/read'
import { paperOf, pdfOf } from '../../support/paper'
import type { RecordWriter } from '../../support/record'
import { recordOf } from '../../support/record'
import { storyTo } from '../record/store'

let writer: RecordWriter
let pdf: Buffer
beforeAll(async () => {
  writer = storyTo('approved')
  pdf = await pdfOf(await paperOf(writer))
}, 60_000)

/** A PDF as another program might write it. */
function pdfWith(dictionary: (length: number) => string, data: Buffer, more = ''): Buffer {
  return Buffer.concat([Buffer.from(`%PDF-1.7\n1 0 obj\n<< /Type /Catalog >>\nendobj\n2 0 obj\n${dictionary(data.length)}\nstream\r\n`, 'latin1'), data, Buffer.from(`\r\nendstream\nendobj\n${more}trailer\n<< /Root 1 0 R >>\n`, 'latin1')])
}

describe('a PDF', () => {
  it('carries record.json to the letter', async () => {
    expect(await recordInPdf(pdf)).toBe(recordText(recordOf(writer)))
    expect(plainly(pdf)).toBe(recordText(recordOf(writer)))
  })

  it.each([
    ['not compressed', (length: number) => `<< /Type /EmbeddedFile /Length ${length} >>`, Buffer.from('{"ä":1}'), ''],
    ['with the filter in an array', (length: number) => `<</Filter[/FlateDecode]/Length ${length}/Type/EmbeddedFile>>`, deflateSync('{"ä":1}'), ''],
    ['with its length in another object', () => '<< /Type /EmbeddedFile /Filter /FlateDecode /Length 3 0 R >>', deflateSync('{"ä":1}'), `3 0 obj\n${deflateSync('{"ä":1}').length}\nendobj\n`],
  ])('is read where the file is %s', async (_what, dictionary, data, more) => {
    expect(await recordInPdf(pdfWith(dictionary, data, more))).toBe('{"ä":1}')
  })

  it.each([
    ['carries none', pdfWith(length => `<< /Length ${length} >>`, Buffer.from('/Type /EmbeddedFile')), 'carries no record'],
    ['is damaged', pdfWith(length => `<< /Type /EmbeddedFile /Filter /FlateDecode /Length ${length} >>`, Buffer.from('no deflate')), 'is damaged'],
    ['is encrypted', Buffer.from('%PDF-1.7\ntrailer << /Encrypt 9 0 R >>'), 'is encrypted'],
    ['is packed otherwise', pdfWith(length => `<< /Type /EmbeddedFile /Filter /LZWDecode /Length ${length} >>`, Buffer.from('x')), 'not known here'],
  ])('that %s says so', async (_what, bytes, words) => {
    expect((await readRecordFile(bytes)).fault).toContain(words)
  })
})

describe('a file', () => {
  it('that is the record verifies by WebCrypto, as the page does it', async () => {
    const { document } = await readRecordFile(Buffer.from(recordText(recordOf(writer))))
    expect(await verifyRecord(document, { check: await webSignatures() })).toMatchObject({ verdict: 'not-sealed', faults: [], facts: { size: writer.entries.length } })
  })

  it.each([['is empty', '', 'empty'], ['is a text', 'hello', 'neither'], ['is no UTF-8', '\xFF\xFE{}', 'neither']])('that %s says so', async (_what, text, words) => {
    expect((await readRecordFile(Buffer.from(text, 'latin1'))).fault).toContain(words)
  })

  it.each([[null], [[]], [{}], [{ format: 'holdover-record' }], [{ format: 'holdover-record', version: 1, entries: [] }], ['text'], [7]])('with %j in it is no record', async (document) => {
    expect((await verifyRecord(document, { check: () => true })).verdict).toBe('no-record')
  })

  it('of a newer version is not guessed at', async () => {
    expect(await verifyRecord({ ...recordOf(writer), version: 3 }, { check: () => true })).toMatchObject({ verdict: 'no-record', faults: [{ field: 'version' }] })
  })

  it('of version 1 is still read', async () => {
    const { versions: _versions, refusals: _refusals, checkpoints: _checkpoints, ...old } = recordOf(writer)
    expect(await verifyRecord({ ...old, version: 1 }, { check: await webSignatures() })).toMatchObject({ verdict: 'not-sealed', faults: [] })
  })
})

describe('a root', () => {
  const root = 'c464c296ab8e1d35ac8f91e2500f68a1cfd01c8fe0f651ef0562fe2b391059cf'
  it.each([root, root.toUpperCase(), ` ${root}\n`, root.replace(/(.{8})/g, '$1 '), root.replace(/(.{4})/g, '$1:'), `0x${root}`])('is read from "%s"', (text) => {
    expect(readRoot(text)).toEqual({ root, fault: '' })
  })
  it.each([['', ''], ['  ', ''], [root.slice(1), '63'], [`${root}0`, '65'], [`${root.slice(1)}g`, '“g”'], [`${root.slice(0, 8)}…${root.slice(-4)}`, 'shortened']])('"%s" is none', (text, words) => {
    expect(readRoot(text).root).toBe(null)
    expect(readRoot(text).fault).toContain(words)
  })
})
