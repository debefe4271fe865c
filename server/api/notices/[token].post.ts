import { z } from 'zod'
import { acknowledgeSchema } from '~~/shared/schemas/notices'
import { useDatabase } from '~~/server/utils/database'
import { acknowledgeNotice } from '~~/server/utils/mail/notice-links'
import { readBodyAs, readParamsAs } from '~~/server/utils/parse'

/** Says that a notice was read; answers who said so first, and when. */
export default defineEventHandler(async (event) => {
  const { token } = readParamsAs(event, z.object({ token: z.string().max(1000) }), 'notice')
  const { name } = await readBodyAs(event, acknowledgeSchema)
  return acknowledgeNotice(useDatabase(), token, name, Date.now())
})
