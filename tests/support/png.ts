/** Small PNG pictures made without a library, so that their bytes never change. PNG: W3C Recommendation, third edition. */
import { crc32, deflateSync } from 'node:zlib'

const SIGNATURE = Buffer.from([0x89, 0x50, 0x4E, 0x47, 0x0D, 0x0A, 0x1A, 0x0A])

/** One chunk: length, type, data, CRC. */
export function pngChunk(type: string, data: Uint8Array): Buffer {
  const body = Buffer.concat([Buffer.from(type, 'latin1'), data])
  const frame = Buffer.alloc(8)
  frame.writeUInt32BE(data.length, 0)
  frame.writeUInt32BE(crc32(body), 4)
  return Buffer.concat([frame.subarray(0, 4), body, frame.subarray(4)])
}

/**
 * A greyscale-with-alpha PNG.
 * @param at alpha (0 to 255) of a black pixel at a place
 * @param extra chunks to stand before the picture's data
 */
export function pngOf(width: number, height: number, at: (x: number, y: number) => number, extra: Buffer[] = []): Buffer {
  const header = Buffer.alloc(13)
  header.writeUInt32BE(width, 0)
  header.writeUInt32BE(height, 4)
  header.set([8, 4, 0, 0, 0], 8)
  const rows = Buffer.alloc((width * 2 + 1) * height)
  for (let y = 0; y < height; y++) {
    for (let x = 0; x < width; x++) rows[y * (width * 2 + 1) + 2 + x * 2] = at(x, y)
  }
  return Buffer.concat([SIGNATURE, pngChunk('IHDR', header), ...extra, pngChunk('IDAT', deflateSync(rows)), pngChunk('IEND', Buffer.alloc(0))])
}

/** A hand's stroke, 600 by 200, as the signature pad gives it. @param shape changes the stroke */
export function drawnSignature(shape: number): Buffer {
  const middle = (x: number) => 100 + Math.sin(x / (18 + shape * 5)) * 60 * Math.exp(-x / 260) - x / 24
  return pngOf(600, 200, (x, y) => {
    if (x < 30 || x > 500) return 0
    const far = Math.abs(y - middle(x)) / Math.hypot(1, middle(x + 1) - middle(x))
    return far < 2.5 ? 255 : far < 3.5 ? 128 : 0
  })
}
