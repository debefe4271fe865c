import { z } from 'zod'
import { useDatabase } from '~~/server/utils/database'
import { readNotice } from '~~/server/utils/mail/notice-links'
import { readParamsAs } from '~~/server/utils/parse'

/** A notice to a shop's contact or a monitoring centre, by its link. */
export default defineEventHandler((event) => {
  const { token } = readParamsAs(event, z.object({ token: z.string().max(1000) }), 'notice')
  return readNotice(useDatabase(), token, Date.now())
})
