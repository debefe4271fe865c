/** Opens a ZIP by its central directory (PKWARE APPNOTE 6.3.10, sections 4.3.7, 4.3.12 and 4.3.16), sharing no code with what wrote it. */
import { crc32, inflateRawSync } from 'node:zlib'

const END = 0x06054b50
const CENTRAL = 0x02014b50
const LOCAL = 0x04034b50

/**
 * Files of a ZIP by name, in the order of its directory.
 * @throws Error where it is cut, holds a name twice, or a file is not what its checksum says
 */
export function unzip(zip: Buffer): Map<string, Buffer> {
  const end = zip.lastIndexOf(Buffer.from('504b0506', 'hex'))
  if (end < 0 || zip.readUInt32LE(end) !== END) throw new Error('The ZIP has no end')
  const files = new Map<string, Buffer>()
  let at = zip.readUInt32LE(end + 16)
  for (let left = zip.readUInt16LE(end + 10); left > 0; left--) {
    if (zip.readUInt32LE(at) !== CENTRAL) throw new Error('The directory of the ZIP is cut')
    const [nameLength, extraLength, commentLength] = [28, 30, 32].map(offset => zip.readUInt16LE(at + offset)) as [number, number, number]
    const name = zip.toString('utf8', at + 46, at + 46 + nameLength)
    if (files.has(name)) throw new Error(`${name} stands twice in the ZIP`)
    files.set(name, bytesOf(zip, at, name))
    at += 46 + nameLength + extraLength + commentLength
  }
  return files
}

function bytesOf(zip: Buffer, entry: number, name: string): Buffer {
  const local = zip.readUInt32LE(entry + 42)
  if (zip.readUInt32LE(local) !== LOCAL) throw new Error(`${name} is not where the directory says`)
  const from = local + 30 + zip.readUInt16LE(local + 26) + zip.readUInt16LE(local + 28)
  const packed = zip.subarray(from, from + zip.readUInt32LE(entry + 20))
  const bytes = zip.readUInt16LE(entry + 10) === 0 ? Buffer.from(packed) : inflateRawSync(packed)
  if (bytes.length !== zip.readUInt32LE(entry + 24) || crc32(bytes) !== zip.readUInt32LE(entry + 16)) throw new Error(`${name} is not what its checksum says`)
  return bytes
}
