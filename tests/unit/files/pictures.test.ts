// JPEG segments: ITU-T T.81, annex B. PNG chunks: W3C PNG specification, third edition. Files are made by sharp and by hand.
import sharp from 'sharp'
import { beforeAll, describe, expect, it } from 'vitest'
import { flattened, inspectPicture } from '../../../server/utils/files/picture'
import { sha256Hex } from '../../../shared/record/canonical'
import { keptSize } from '../../../shared/pictures/limits'
import { partsFault, strip } from '../../../shared/pictures/parts'
import { drawnSignature, pngChunk, pngOf } from '../../support/png'

const inspect = (bytes: Uint8Array) => inspectPicture(bytes, sha256Hex(bytes))
const noise = (width = 60, height = 40) => sharp(Buffer.from(Array.from({ length: width * height * 3 }, (_, index) => (index * 7919) % 251)), { raw: { width, height, channels: 3 } })
/** A segment put behind a JPEG's start. */
const withSegment = (jpeg: Buffer, marker: number, body: string) => {
  const head = Buffer.from([0xFF, marker, 0, 0])
  head.writeUInt16BE(body.length + 2, 2)
  return Buffer.concat([jpeg.subarray(0, 2), head, Buffer.from(body, 'latin1'), jpeg.subarray(2)])
}

let jpeg: Buffer
let progressive: Buffer
let withExif: Buffer
beforeAll(async () => {
  jpeg = await noise().jpeg().toBuffer()
  progressive = await noise().jpeg({ progressive: true }).toBuffer()
  withExif = await noise().jpeg().withExif({ IFD0: { Copyright: 'somebody' } }).toBuffer()
})

describe('a picture alone', () => {
  it('is taken as JPEG, progressive too, and as PNG', async () => {
    expect(await inspect(jpeg)).toEqual({ mime: 'image/jpeg', width: 60, height: 40 })
    expect(await inspect(progressive)).toMatchObject({ mime: 'image/jpeg' })
    expect(await inspect(drawnSignature(0))).toEqual({ mime: 'image/png', width: 600, height: 200 })
  })

  it('may have a colour profile', async () => {
    expect(await inspect(await noise().jpeg().withIccProfile('p3').toBuffer())).toMatchObject({ mime: 'image/jpeg' })
  })

  it('is up to 2,048 pixels long, not more', async () => {
    const long = (width: number) => sharp({ create: { width, height: 2, channels: 3, background: '#888' } }).png().toBuffer()
    expect(await inspect(await long(2048))).toMatchObject({ width: 2048 })
    expect(await inspect(await long(2049))).toMatchObject({ fault: expect.stringContaining('2049') })
  })
})

describe('what is refused', () => {
  it('is a file with another name than its SHA-256', async () => {
    expect(await inspectPicture(jpeg, 'a'.repeat(64))).toMatchObject({ field: 'sha256' })
  })

  it('is anything that is no JPEG or PNG, whatever it is called', async () => {
    for (const other of [Buffer.from('<svg xmlns="http://www.w3.org/2000/svg"/>'), Buffer.from('hello'), await noise().webp().toBuffer(), await noise().gif().toBuffer()]) {
      expect(await inspect(other)).toMatchObject({ fault: 'Only JPEG and PNG pictures are taken' })
    }
    expect(await inspect(Buffer.alloc(0))).toMatchObject({ fault: 'The file is empty' })
  })

  it('is a JPEG with EXIF, XMP, IPTC, a comment or a segment that nobody knows', async () => {
    expect(await inspect(withExif)).toMatchObject({ fault: expect.stringContaining('EXIF') })
    for (const [marker, body, word] of [[0xE1, 'http://ns.adobe.com/xap/1.0/\0<x/>', 'XMP'], [0xED, 'Photoshop 3.0\0', 'IPTC'], [0xFE, 'taken at home', 'comment'], [0xE5, 'whatever', 'another kind'], [0xE2, 'MPF\0', 'another kind']] as const) {
      expect(await inspect(withSegment(jpeg, marker, body))).toMatchObject({ fault: expect.stringContaining(word) })
    }
  })

  it('is a PNG with text, EXIF, a time, or a chunk that nobody knows', async () => {
    for (const [type, word] of [['tEXt', 'text'], ['zTXt', 'text'], ['iTXt', 'text'], ['eXIf', 'EXIF'], ['tIME', 'tIME'], ['prVt', 'prVt']] as const) {
      expect(await inspect(pngOf(8, 8, () => 255, [pngChunk(type, Buffer.from('Comment\0hello'))]))).toMatchObject({ fault: expect.stringContaining(word) })
    }
  })

  it('is a picture with something behind it, cut off, or broken inside', async () => {
    const png = drawnSignature(1)
    for (const picture of [jpeg, png]) {
      expect(await inspect(Buffer.concat([picture, Buffer.from('a film')]))).toMatchObject({ fault: expect.stringContaining('behind') })
      expect(await inspect(picture.subarray(0, picture.length - 20))).toMatchObject({ fault: expect.stringContaining('cut off') })
    }
    const broken = Buffer.from(png)
    broken.fill(0x55, 60, 90)
    expect(await inspect(broken)).toHaveProperty('fault')
  })
})

describe('stripping on the phone', () => {
  it('leaves what the server takes, and the same picture', async () => {
    const dirty = [withExif, withSegment(progressive, 0xFE, 'taken at home'), pngOf(8, 8, x => x * 30, [pngChunk('tEXt', Buffer.from('Comment\0hello'))]), Buffer.concat([jpeg, Buffer.from('a film')])]
    for (const bytes of dirty) {
      const kind = bytes[0] === 0xFF ? 'image/jpeg' as const : 'image/png' as const
      expect(partsFault(bytes, kind)).not.toBeNull()
      const clean = strip(bytes, kind)
      expect(await inspect(clean)).toMatchObject({ mime: kind })
      expect((await sharp(clean).raw().toBuffer()).equals(await sharp(bytes).raw().toBuffer())).toBe(true)
    }
  })

  it('changes nothing where there is nothing to take out', () => {
    expect(Buffer.from(strip(jpeg, 'image/jpeg')).equals(jpeg)).toBe(true)
  })

  it('says so where a picture is damaged', () => {
    expect(() => strip(jpeg.subarray(0, 100), 'image/jpeg')).toThrow(RangeError)
  })

  it.each([[4032, 3024, 2048, 1536], [3024, 4032, 1536, 2048], [2048, 10, 2048, 10], [640, 480, 640, 480], [9000, 1, 2048, 1]])('keeps %i × %i as %i × %i', (width, height, keptWidth, keptHeight) => {
    expect(keptSize(width, height)).toEqual({ width: keptWidth, height: keptHeight })
  })
})

describe('a drawn signature on paper', () => {
  it('has a white ground, no transparency, and the same bytes each time', async () => {
    const [first, second] = [await flattened(drawnSignature(0)), await flattened(drawnSignature(0))]
    expect(Buffer.from(first).equals(Buffer.from(second))).toBe(true)
    expect(await sharp(first).metadata()).toMatchObject({ hasAlpha: false, width: 600 })
    expect([...(await sharp(first).raw().toBuffer()).subarray(0, 1)]).toEqual([255])
  })
})
