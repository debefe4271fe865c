import { isPdf, NoRecordInPdf, recordInPdf } from './pdf'

/** More than any record that Holdover writes. */
export const RECORD_FILE_MAX = 200_000_000

/**
 * The document in a file: record.json itself, or the PDF that carries it.
 * @returns the parsed document, or what is wrong in words
 */
export async function readRecordFile(bytes: Uint8Array): Promise<{ document: unknown, fault: string }> {
  if (bytes.length === 0) return { document: null, fault: 'This file is empty.' }
  try {
    const text = isPdf(bytes) ? await recordInPdf(bytes) : new TextDecoder('utf-8', { fatal: true }).decode(bytes)
    return { document: JSON.parse(text), fault: '' }
  } catch (error) {
    return { document: null, fault: error instanceof NoRecordInPdf ? error.message : 'This is neither a record.json nor a PDF.' }
  }
}
