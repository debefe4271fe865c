import { inflateSync } from 'node:zlib'

/** Faces that the paper is set in. Plex comes as one file per script; a face is all of them together. */
export const FACES = {
  plain: { family: 'ibm-plex-sans', weight: 400 },
  semibold: { family: 'ibm-plex-sans', weight: 600 },
  bold: { family: 'ibm-plex-sans', weight: 700 },
  mono: { family: 'ibm-plex-mono', weight: 400 },
} as const
export type Face = keyof typeof FACES

/** The scripts of each family, tried in this order for every letter. */
const SCRIPTS: Record<(typeof FACES)[Face]['family'], readonly string[]> = {
  'ibm-plex-sans': ['latin', 'latin-ext', 'cyrillic', 'greek', 'vietnamese'],
  'ibm-plex-mono': ['latin'],
}

/** Names of the files of a face, most usual script first. */
export function fontFiles(face: Face): string[] {
  const { family, weight } = FACES[face]
  return SCRIPTS[family].map(script => `${family}-${script}-${weight}-normal.woff`)
}

/** Bytes of the font files by name. */
export type FontBytes = ReadonlyMap<string, Uint8Array>

/** Reads every font file once. @param read gives the bytes of a file by name; null: there is no such file */
export async function readFonts(read: (name: string) => Promise<Uint8Array | null>): Promise<FontBytes> {
  const names = [...new Set((Object.keys(FACES) as Face[]).flatMap(fontFiles))]
  const bytes = new Map<string, Uint8Array>()
  for (const name of names) {
    const file = await read(name)
    if (!file) throw new Error(`The font file ${name} is missing from the build`)
    bytes.set(name, unpackWoff(file))
  }
  return bytes
}

const WOFF = 0x774F4646
const HEADER = 12
const RECORD = 16
/** Bytes kept free at the end, since the reader of fonts looks past an empty last glyph. */
const TAIL = 16

/**
 * A WOFF 1.0 file as the plain font that it packs (W3C WOFF File Format 1.0, section 3).
 * @throws RangeError when the bytes are no WOFF file
 */
export function unpackWoff(file: Uint8Array): Uint8Array {
  const source = Buffer.from(file.buffer, file.byteOffset, file.byteLength)
  if (source.length < 44 || source.readUInt32BE(0) !== WOFF) throw new RangeError('This is not a WOFF file')
  const count = source.readUInt16BE(12)
  const tables = Array.from({ length: count }, (_, index) => {
    const at = 44 + index * 20
    const [offset, packed, length] = [source.readUInt32BE(at + 4), source.readUInt32BE(at + 8), source.readUInt32BE(at + 12)]
    const data = source.subarray(offset, offset + packed)
    return { tag: source.subarray(at, at + 4), checksum: source.subarray(at + 16, at + 20), length, data: packed < length ? inflateSync(data) : data }
  })
  const padded = (length: number) => Math.ceil(length / 4) * 4
  const font = Buffer.alloc(HEADER + RECORD * count + tables.reduce((sum, table) => sum + padded(table.length), 0) + TAIL)
  source.copy(font, 0, 4, 8)
  const power = Math.floor(Math.log2(count))
  font.writeUInt16BE(count, 4)
  font.writeUInt16BE(2 ** power * 16, 6)
  font.writeUInt16BE(power, 8)
  font.writeUInt16BE(count * 16 - 2 ** power * 16, 10)
  let offset = HEADER + RECORD * count
  for (const [index, { tag, checksum, length, data }] of tables.entries()) {
    const at = HEADER + RECORD * index
    tag.copy(font, at)
    checksum.copy(font, at + 4)
    font.writeUInt32BE(offset, at + 8)
    font.writeUInt32BE(length, at + 12)
    data.copy(font, offset)
    offset += padded(length)
  }
  return font
}
