import { fileTypeFromBuffer } from 'file-type'
import sharp from 'sharp'
import { sha256Hex } from '../../../shared/record/canonical'
import { SIDE_MAX } from '../../../shared/pictures/limits'
import { partsFault } from '../../../shared/pictures/parts'

export type PictureMime = 'image/jpeg' | 'image/png'
export type Inspected = { mime: PictureMime, width: number, height: number } | { fault: string, field: 'body' | 'sha256' }

/** Judges a file by what it is, not by what it is called. @param sha256 the name that the signed entry gives it */
export async function inspectPicture(bytes: Uint8Array, sha256: string): Promise<Inspected> {
  const wrong = (fault: string, field: 'body' | 'sha256' = 'body'): Inspected => ({ fault, field })
  if (bytes.length === 0) return wrong('The file is empty')
  if (sha256Hex(bytes) !== sha256) return wrong('The SHA-256 of these bytes is not the one that names the file', 'sha256')
  const type = await fileTypeFromBuffer(bytes)
  if (type?.mime !== 'image/jpeg' && type?.mime !== 'image/png') return wrong('Only JPEG and PNG pictures are taken')
  const hidden = partsFault(bytes, type.mime)
  if (hidden) return wrong(hidden)
  try {
    const picture = sharp(bytes, { failOn: 'error', limitInputPixels: SIDE_MAX * SIDE_MAX })
    const { width, height, exif, xmp, iptc } = await picture.metadata()
    if (exif || xmp || iptc) return wrong('The picture carries metadata; it is stripped before a picture is signed')
    if (Math.max(width, height) > SIDE_MAX) return wrong(`The longest side is ${Math.max(width, height)} pixels; at most ${SIDE_MAX}`)
    // A file can begin as a picture and be none: only decoding all of it tells.
    await picture.stats()
    return { mime: type.mime, width, height }
  } catch {
    return wrong('This picture cannot be read')
  }
}

/** A drawn signature as it is set on paper: ink on white, no transparency, the same bytes each time. */
export async function flattened(bytes: Uint8Array): Promise<Uint8Array> {
  return sharp(bytes).flatten({ background: '#FFFFFF' }).greyscale().png({ compressionLevel: 9, adaptiveFiltering: false }).toBuffer()
}

/** Longest side of a photo on paper, pixels: about 200 to the inch. */
const PRINTED_SIDE = 480

/**
 * A photo as it is printed: small, on white, in three colours (sRGB), the same bytes each time.
 * @throws Error where the bytes are no picture
 */
export async function printed(bytes: Uint8Array): Promise<Uint8Array> {
  return sharp(bytes).resize(PRINTED_SIDE, PRINTED_SIDE, { fit: 'inside', withoutEnlargement: true }).flatten({ background: '#FFFFFF' }).toColourspace('srgb').jpeg({ quality: 72 }).toBuffer()
}
