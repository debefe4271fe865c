import { z } from 'zod'
import { requirePerson } from '~~/server/utils/access'
import { useDatabase } from '~~/server/utils/database'
import { itemOf } from '~~/server/utils/exports/ask'
import { dropExport } from '~~/server/utils/exports/file'
import { fileStorage } from '~~/server/utils/files/storage'
import { readParamsAs } from '~~/server/utils/parse'

/** Cancels an export, or takes its file away. */
export default defineEventHandler(async (event) => {
  const person = requirePerson(event)
  const { id } = readParamsAs(event, z.object({ id: z.string().uuid() }), 'export')
  return itemOf(await dropExport(useDatabase(), fileStorage(), person, id, Date.now()))
})
