/** The paper of a test record, made as the server makes it but with files and fonts from the disk. */
import { readFile } from 'node:fs/promises'
import { readFonts } from '../../server/pdf/fonts'
import type { FontBytes } from '../../server/pdf/fonts'
import type { RecordPaper } from '../../server/pdf/record'
import { openRecordPdf } from '../../server/pdf/record'
import { flattened, printed } from '../../server/utils/files/picture'
import type { PaperVariant } from '../../server/pdf/variant'
import { recordFacts } from '../../server/utils/hold/record-facts'
import { verifyEntries } from '../../server/utils/record/verify'
import { recordText, sealHolds } from '../../shared/record/record-document'
import { summaryOf } from '../../shared/record/summary'
import type { RecordWriter } from './record'
import { recordOf } from './record'

let fonts: Promise<FontBytes> | null = null

export function testFonts(): Promise<FontBytes> {
  fonts ??= readFonts(name => readFile(new URL(`../../node_modules/@fontsource/${name.startsWith('ibm-plex-mono') ? 'ibm-plex-mono' : 'ibm-plex-sans'}/files/${name}`, import.meta.url)))
  return fonts
}

export async function paperOf(writer: RecordWriter, variant: PaperVariant = 'record'): Promise<RecordPaper> {
  const { state, entries, files } = writer
  const now = Date.parse(entries.at(-1)!.receivedAt)
  const drawings = new Map<string, Uint8Array>()
  for (const [hash, bytes] of files) drawings.set(hash, await flattened(bytes))
  const picture = async (hash: string) => { const bytes = files.get(hash); return bytes ? printed(bytes) : null }
  return { state, entries, now, summary: summaryOf(state, entries, recordFacts(state, now), now), verified: await verifyEntries(state, entries), sealHolds: sealHolds(state, entries), drawings, held: new Set(files.keys()), picture, variant, record: recordText(recordOf(writer)) }
}

/** The bytes of a paper. */
export async function pdfOf(paper: RecordPaper): Promise<Buffer> {
  const { doc } = openRecordPdf(paper, await testFonts())
  const chunks: Uint8Array[] = []
  for await (const chunk of doc as AsyncIterable<Uint8Array>) chunks.push(chunk)
  return Buffer.concat(chunks)
}
