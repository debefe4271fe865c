/**
 * A process of its own that makes the paper of one record as the server does, and reports what it took.
 * Arguments: path of record.json; `bare` for the words of its entries by pdfkit alone, without any layout of ours.
 */
import { readFile } from 'node:fs/promises'
import PDFDocument from 'pdfkit'
import { openRecordPdf } from '~~/server/pdf/record'
import type { RecordPaper } from '~~/server/pdf/record'
import { recordFacts } from '~~/server/utils/hold/record-facts'
import { verifyEntries } from '~~/server/utils/record/verify'
import { foldLog } from '~~/shared/record/fold'
import type { RecordDocument } from '~~/shared/record/record-document'
import { sealHolds } from '~~/shared/record/record-document'
import { summaryOf } from '~~/shared/record/summary'
import { signatureDigits } from '~~/shared/record/summary-words'
import { clockWords } from '~~/shared/charts/words'
import { happenedAt, isoTime } from '~~/shared/record/entry'
import { nameOf } from '~~/shared/record/select'
import { told } from '~~/shared/record/words'
import { testFonts } from '../tests/support/paper'

async function readPaperOf(path: string): Promise<RecordPaper> {
  const record = await readFile(path, 'utf8')
  const { entries, outage } = JSON.parse(record) as RecordDocument
  const state = foldLog(outage.id, entries)
  const now = Date.parse(entries.at(-1)!.receivedAt)
  const summary = summaryOf(state, entries, recordFacts(state, now), now)
  return { state, entries, summary, now, verified: await verifyEntries(state, entries), sealHolds: sealHolds(state, entries), drawings: new Map(), held: new Set(), picture: async () => null, variant: 'record', record }
}

/** The words of every entry by pdfkit alone, one under another. */
async function bare({ state, entries, summary }: RecordPaper): Promise<PDFKit.PDFDocument> {
  const doc = new PDFDocument({ size: 'A4', margin: 44, font: null as never })
  doc.registerFont('words', Buffer.from((await testFonts()).get('ibm-plex-sans-latin-400-normal.woff')!))
  doc.font('words').fontSize(8.5)
  for (const stored of entries) {
    const { did, seen } = told(state, stored.entry)
    doc.text(`${stored.seq} ${clockWords(isoTime(happenedAt(stored.entry)), summary.heading.timeZone, true)} ${did} ${seen} ${nameOf(state, stored.entry.by)} ok ${signatureDigits(stored.signature)}`)
  }
  doc.end()
  return doc
}

const [path, how] = process.argv.slice(2)
const fonts = await testFonts()
const paper = await readPaperOf(path!)
const began = performance.now()
const doc = how === 'bare' ? await bare(paper) : openRecordPdf(paper, fonts).doc
let bytes = 0
for await (const chunk of doc as AsyncIterable<Uint8Array>) bytes += chunk.length
const ms = performance.now() - began
// All pages are written by now: the next one would be this.
const pages = doc.bufferedPageRange().start
process.stdout.write(`${JSON.stringify({ pages, bytes, ms: Math.round(ms), peakMb: Math.round(process.resourceUsage().maxRSS / 1024) })}\n`)
