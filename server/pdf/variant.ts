import PDFDocument from 'pdfkit'
import type { Paper } from './sheet'
import { paperSize } from './sheet'

type Document = PDFKit.PDFDocument

/**
 * What a paper is made for. `record` carries record.json and the marks of PDF/A-3a as pdfkit writes them, which nothing
 * here validates; `a1b` carries no file and is checked against PDF/A-1b (ISO 19005-1) by the tests.
 */
export const PAPER_VARIANTS = ['record', 'a1b'] as const
export type PaperVariant = (typeof PAPER_VARIANTS)[number]

const MARKS = {
  record: { pdfVersion: '1.7', subset: 'PDF/A-3a' },
  a1b: { pdfVersion: '1.4', subset: 'PDF/A-1b' },
} as const

/** What pdfkit's types leave out. */
interface Inner { info: Record<string, unknown>, _addInfo: () => void }

/** An empty document of a variant. @param date Unix ms, so that the same record makes the same bytes */
export function openDocument(variant: PaperVariant, paper: Paper, { title, subject, date }: { title: string, subject: string, date: number }): Document {
  const doc = new PDFDocument({
    ...MARKS[variant], autoFirstPage: false, size: paperSize(paper), margin: 0, tagged: true, lang: 'en', displayTitle: true,
    // Without a font of its own the constructor would load a standard one that the paper does not use.
    font: null as never,
    // No ModDate: pdfkit writes none into the XMP, and the two must say the same (ISO 19005-1, 6.7.3).
    info: { Title: printable(title), Author: 'Holdover', Subject: printable(subject), Creator: 'Holdover', Producer: 'Holdover', CreationDate: new Date(date) },
  })
  escapeMetadata(doc)
  return doc
}

/** Attaches record.json, with dates of its own. */
export function attachRecord(doc: Document, text: string, date: number): void {
  doc.file(Buffer.from(text), { name: 'record.json', type: 'application/json', description: 'The record with all that it is verified by', creationDate: new Date(date), modifiedDate: new Date(date), relationship: 'Data' } as never)
}

/** pdfkit writes title and subject into the XMP as they are; an ampersand in a name would spoil it. */
function escapeMetadata(doc: Document): void {
  const inner = doc as unknown as Inner
  const addInfo = inner._addInfo.bind(doc)
  inner._addInfo = () => {
    const plain = inner.info
    inner.info = Object.fromEntries(Object.entries(plain).map(([name, value]) => [name, typeof value === 'string' ? escaped(value) : value]))
    addInfo()
    inner.info = plain
  }
}

const escaped = (text: string) => text.replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('>', '&gt;')

/** Without what XML 1.0 has no place for. */
function printable(text: string): string {
  // eslint-disable-next-line no-control-regex -- finding control characters is what this is for
  return text.toWellFormed().replace(/[\u0000-\u001F\u007F-\u009F\uFFFE\uFFFF]/gu, ' ')
}
