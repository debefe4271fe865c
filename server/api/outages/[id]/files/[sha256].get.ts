import { z } from 'zod'
import { useDatabase } from '~~/server/utils/database'
import { notFound } from '~~/server/utils/errors'
import { fileOf } from '~~/server/utils/files/keep'
import { fileStorage, readBytes } from '~~/server/utils/files/storage'
import { requireOutage } from '~~/server/utils/outages'
import { readParamsAs } from '~~/server/utils/parse'

const params = z.object({ id: z.string().uuid(), sha256: z.string().regex(/^[0-9a-f]{64}$/) })

/** A photo or drawing of an outage. Its name is its content, so it never changes. */
export default defineEventHandler(async (event) => {
  const { outage } = await requireOutage(event)
  const { sha256 } = readParamsAs(event, params, 'file')
  const file = await fileOf(useDatabase(), outage.id, sha256) ?? notFound('file')
  const bytes = await readBytes(fileStorage(), sha256) ?? notFound('file')
  setResponseHeaders(event, {
    'content-type': file.mime,
    'content-length': bytes.length,
    'content-disposition': `inline; filename="${sha256.slice(0, 12)}.${file.mime === 'image/png' ? 'png' : 'jpg'}"`,
    'cache-control': 'private, max-age=31536000, immutable',
    'x-content-type-options': 'nosniff',
    'content-security-policy': 'default-src \'none\'; sandbox',
  })
  return bytes
})
