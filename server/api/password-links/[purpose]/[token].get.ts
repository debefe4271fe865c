import { useDatabase } from '~~/server/utils/database'
import { readParamsAs } from '~~/server/utils/parse'
import { passwordLinkParams } from '~~/server/utils/people/link-params'
import { readPasswordLink } from '~~/server/utils/people/password-links'

/** Whose password a link is about. */
export default defineEventHandler((event) => {
  const { purpose, token } = readParamsAs(event, passwordLinkParams, 'link')
  return readPasswordLink(useDatabase(), purpose, token, Date.now())
})
