import { sha256Hex } from '~~/shared/record/canonical'
import { keptSize } from '~~/shared/pictures/limits'
import { strip } from '~~/shared/pictures/parts'

/** A picture as it is kept and sent, and the hash by which the signed entry names it. */
export interface EncodedPicture { sha256: string, blob: Blob }

const QUALITY = 0.85

/**
 * A photo made ready on the phone: turned upright, at most 2,048 pixels long, coded anew as JPEG and
 * stripped of all metadata before it is hashed.
 * @throws Error where the file is no picture that this browser can read
 */
export async function encodePhoto(file: Blob): Promise<EncodedPicture> {
  return encode(file, 'image/jpeg')
}

/** A drawn signature made ready in the same way, as PNG: its ground stays transparent. */
export async function encodeSignature(drawing: Blob): Promise<EncodedPicture> {
  return encode(drawing, 'image/png')
}

async function encode(file: Blob, kind: 'image/jpeg' | 'image/png'): Promise<EncodedPicture> {
  const bitmap = await createImageBitmap(file, { imageOrientation: 'from-image' }).catch(() => {
    throw new Error('This file is no picture that can be read here')
  })
  try {
    const bytes = strip(new Uint8Array(await (await drawn(bitmap, kind)).arrayBuffer()), kind)
    return { sha256: sha256Hex(bytes), blob: new Blob([bytes.slice()], { type: kind }) }
  } finally {
    bitmap.close()
  }
}

function drawn(bitmap: ImageBitmap, kind: 'image/jpeg' | 'image/png'): Promise<Blob> {
  const { width, height } = keptSize(bitmap.width, bitmap.height)
  const canvas = Object.assign(document.createElement('canvas'), { width, height })
  const context = canvas.getContext('2d')
  if (!context) throw new Error('This browser cannot draw pictures')
  if (kind === 'image/jpeg') {
    // JPEG knows no transparency; what is see-through becomes white, not black.
    context.fillStyle = '#FFFFFF'
    context.fillRect(0, 0, width, height)
  }
  context.drawImage(bitmap, 0, 0, width, height)
  return new Promise((resolve, reject) => {
    canvas.toBlob(blob => blob ? resolve(blob) : reject(new Error('This browser cannot code pictures')), kind, QUALITY)
  })
}
