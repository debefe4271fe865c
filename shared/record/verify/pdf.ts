/** A PDF carries no record, or one that cannot be taken out; the words say why. */
export class NoRecordInPdf extends Error {}

export const isPdf = (bytes: Uint8Array) => String.fromCharCode(...bytes.subarray(0, 5)) === '%PDF-'

/**
 * Takes record.json out of a PDF: the stream of the first object of the type EmbeddedFile (ISO 32000-1, 7.11.4),
 * with its length given there or in another object, as it is or compressed by FlateDecode.
 * @throws NoRecordInPdf
 */
export async function recordInPdf(bytes: Uint8Array): Promise<string> {
  const text = latin1(bytes)
  if (/\/Encrypt\s+\d+\s+\d+\s+R/.test(text.slice(-2048))) throw new NoRecordInPdf('This PDF is encrypted. Take the PDF as Holdover wrote it, or record.json.')
  for (const { dictionary, begins } of streams(text)) {
    if (!/\/Type\s*\/EmbeddedFile\b/.test(dictionary)) continue
    const data = bytes.subarray(begins, begins + lengthOf(dictionary, text, begins))
    if (!/\/Filter/.test(dictionary)) return utf8(data)
    if (!/\/Filter\s*\[?\s*\/FlateDecode\s*\]?/.test(dictionary)) throw new NoRecordInPdf('The file in this PDF is packed in a way that is not known here. Take record.json itself.')
    return utf8(await inflate(data))
  }
  throw new NoRecordInPdf('This PDF carries no record. One that Holdover wrote does, unless another program saved it anew.')
}

/** Every object that holds a stream: its dictionary, and where its bytes begin. */
function* streams(text: string): Generator<{ dictionary: string, begins: number }> {
  const head = /\bobj\b/g
  for (let found = head.exec(text); found; found = head.exec(text)) {
    const stream = text.indexOf('stream', found.index)
    const end = text.indexOf('endobj', found.index)
    if (stream < 0 || end < 0 || stream > end) continue
    const word = stream + 'stream'.length
    const begins = word + (text[word] === '\r' ? 2 : 1)
    yield { dictionary: text.slice(found.index, stream), begins }
    // Bytes of a stream may look like anything; the search goes on behind it.
    const after = text.indexOf('endstream', begins)
    if (after > 0) head.lastIndex = after
  }
}

function lengthOf(dictionary: string, text: string, begins: number): number {
  const direct = /\/Length\s+(\d+)\b(?!\s+\d+\s+R)/.exec(dictionary)
  if (direct) return Number(direct[1])
  const other = /\/Length\s+(\d+)\s+(\d+)\s+R/.exec(dictionary)
  const named = other && new RegExp(`(?:^|[\\r\\n])${other[1]}\\s+${other[2]}\\s+obj\\s+(\\d+)`).exec(text)
  if (named) return Number(named[1])
  const end = text.indexOf('endstream', begins)
  return (end < 0 ? text.length : end) - begins
}

/** @throws NoRecordInPdf */
async function inflate(data: Uint8Array): Promise<Uint8Array> {
  try {
    const stream = new Blob([data as BlobPart]).stream().pipeThrough(new DecompressionStream('deflate'))
    return new Uint8Array(await new Response(stream).arrayBuffer())
  } catch {
    throw new NoRecordInPdf('The record in this PDF is damaged.')
  }
}

const utf8 = (bytes: Uint8Array) => new TextDecoder().decode(bytes)

/** A letter a byte, so that places in the text are places in the file. */
function latin1(bytes: Uint8Array): string {
  let text = ''
  for (let from = 0; from < bytes.length; from += 8192) text += String.fromCharCode(...bytes.subarray(from, from + 8192))
  return text
}
