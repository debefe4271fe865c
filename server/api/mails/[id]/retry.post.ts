import { z } from 'zod'
import { requireRole } from '~~/server/utils/access'
import { useDatabase } from '~~/server/utils/database'
import { tryMailAgain } from '~~/server/utils/mail/list'
import { readParamsAs } from '~~/server/utils/parse'

/** Tries a mail again that was not sent. */
export default defineEventHandler((event) => {
  requireRole(event, 'administrator')
  const { id } = readParamsAs(event, z.object({ id: z.string().uuid() }), 'mail')
  return tryMailAgain(useDatabase(), id, Date.now())
})
