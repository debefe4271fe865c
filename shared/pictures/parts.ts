/**
 * The parts of a picture file, and which of them only code the picture. All others tell of a place, a
 * time, a camera or a person: the phone takes them out, the server refuses what still has them.
 * JPEG segments by ITU-T T.81, annex B; PNG chunks by the W3C PNG specification, third edition.
 */
export interface PicturePart {
  /** from the first byte of the marker or length to just behind the part; a JPEG scan's coded data belongs to it */
  start: number
  end: number
  /** what it carries beside the picture, in words; null: it codes the picture */
  carries: string | null
}

export interface PictureParts {
  parts: PicturePart[]
  /** just behind the end of the picture; null where the file is cut off or damaged */
  end: number | null
}

/** Frames, tables, scans, restart intervals, JFIF and Adobe's colour transform. */
const JPEG_CODING: ReadonlySet<number> = new Set([0xC0, 0xC1, 0xC2, 0xC4, 0xDA, 0xDB, 0xDD, 0xE0, 0xEE])
const PNG_CODING: ReadonlySet<string> = new Set(['IHDR', 'PLTE', 'IDAT', 'IEND', 'tRNS', 'gAMA', 'cHRM', 'sRGB', 'iCCP', 'sBIT', 'bKGD', 'pHYs'])
const START_OF_SCAN = 0xDA
const END_OF_IMAGE = 0xD9
/** Bytes of a PNG file before its first chunk, and of a JPEG file before its first segment. */
export const PNG_START = 8
export const JPEG_START = 2

const latin = (bytes: Uint8Array, from: number, to: number) => String.fromCharCode(...bytes.subarray(from, to))

export function jpegParts(bytes: Uint8Array): PictureParts {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength)
  const parts: PicturePart[] = []
  let at = JPEG_START
  while (at + 4 <= bytes.length && bytes[at] === 0xFF) {
    const marker = bytes[at + 1]!
    if (marker === 0xFF) { at++; continue }
    let end = at + 2 + view.getUint16(at + 2)
    const carries = jpegCarries(marker, latin(bytes, at + 4, Math.min(end, at + 36)))
    if (marker === START_OF_SCAN) end = scanEnd(bytes, end)
    if (end > bytes.length) break
    parts.push({ start: at, end, carries })
    at = end
    if (bytes[at] === 0xFF && bytes[at + 1] === END_OF_IMAGE) return { parts, end: at + 2 }
  }
  return { parts, end: null }
}

function jpegCarries(marker: number, name: string): string | null {
  if (JPEG_CODING.has(marker) || (marker === 0xE2 && name.startsWith('ICC_PROFILE\0'))) return null
  if (marker === 0xE1) return name.startsWith('Exif') ? 'EXIF' : 'XMP'
  if (marker === 0xED) return 'IPTC'
  return marker === 0xFE ? 'a comment' : `a segment of another kind (${marker.toString(16)})`
}

/** Where a scan's coded data ends: at the next marker that is neither a stuffed byte nor a restart. */
function scanEnd(bytes: Uint8Array, from: number): number {
  for (let at = bytes.indexOf(0xFF, from); at !== -1 && at + 1 < bytes.length; at = bytes.indexOf(0xFF, at + 2)) {
    const next = bytes[at + 1]!
    if (next !== 0x00 && !(next >= 0xD0 && next <= 0xD7)) return at
  }
  return bytes.length
}

export function pngParts(bytes: Uint8Array): PictureParts {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength)
  const parts: PicturePart[] = []
  let at = PNG_START
  while (at + 12 <= bytes.length) {
    const type = latin(bytes, at + 4, at + 8)
    const end = at + 12 + view.getUint32(at)
    if (end > bytes.length) break
    parts.push({ start: at, end, carries: pngCarries(type) })
    at = end
    if (type === 'IEND') return { parts, end }
  }
  return { parts, end: null }
}

function pngCarries(type: string): string | null {
  if (PNG_CODING.has(type)) return null
  if (type === 'eXIf') return 'EXIF'
  return ['tEXt', 'zTXt', 'iTXt'].includes(type) ? 'text' : `a chunk of another kind (${type.replace(/[^A-Za-z]/g, '?')})`
}

/** The picture alone: the same coded picture without any part that carries something else. */
export function strip(bytes: Uint8Array, kind: 'image/jpeg' | 'image/png'): Uint8Array {
  const [start, { parts, end }] = kind === 'image/jpeg' ? [JPEG_START, jpegParts(bytes)] : [PNG_START, pngParts(bytes)]
  if (end === null) throw new RangeError('This picture is damaged')
  const kept = parts.filter(part => part.carries === null)
  const tail = parts.at(-1)?.end ?? start
  const pieces = [bytes.subarray(0, start), ...kept.map(part => bytes.subarray(part.start, part.end)), bytes.subarray(tail, end)]
  const picture = new Uint8Array(pieces.reduce((sum, piece) => sum + piece.length, 0))
  let at = 0
  for (const piece of pieces) {
    picture.set(piece, at)
    at += piece.length
  }
  return picture
}

/** Why a file is not the picture alone, in words; null: it is. */
export function partsFault(bytes: Uint8Array, kind: 'image/jpeg' | 'image/png'): string | null {
  const { parts, end } = kind === 'image/jpeg' ? jpegParts(bytes) : pngParts(bytes)
  const carrying = parts.find(part => part.carries !== null)
  if (carrying) return `The picture carries ${carrying.carries}; metadata is stripped before a picture is signed`
  if (end === null) return 'This picture is damaged or cut off'
  return end === bytes.length ? null : 'Something stands behind the picture; send the picture alone'
}
