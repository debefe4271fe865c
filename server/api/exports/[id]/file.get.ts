import { z } from 'zod'
import { requirePerson } from '~~/server/utils/access'
import { useDatabase } from '~~/server/utils/database'
import { openExport } from '~~/server/utils/exports/file'
import { fileStorage } from '~~/server/utils/files/storage'
import { readParamsAs } from '~~/server/utils/parse'

const TYPES = { 'pdf': 'application/zip', 'readings': 'text/csv; charset=utf-8', 'json-lines': 'application/jsonl; charset=utf-8' } as const

/** The file of a finished export, streamed. */
export default defineEventHandler(async (event) => {
  const person = requirePerson(event)
  const { id } = readParamsAs(event, z.object({ id: z.string().uuid() }), 'export')
  const { row, bytes, stream } = await openExport(useDatabase(), fileStorage(), person, id, Date.now())
  setResponseHeaders(event, { 'content-type': TYPES[row.kind], 'content-length': bytes, 'content-disposition': `attachment; filename="${row.fileName}"`, 'cache-control': 'private, no-store' })
  return sendStream(event, stream)
})
