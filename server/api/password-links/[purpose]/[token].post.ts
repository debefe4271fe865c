import { passwordByLinkSchema } from '~~/shared/schemas/people'
import { useDatabase } from '~~/server/utils/database'
import { readBodyAs, readParamsAs } from '~~/server/utils/parse'
import { passwordLinkParams } from '~~/server/utils/people/link-params'
import { setPasswordByLink } from '~~/server/utils/people/password-links'

/** Chooses a password through a link; then sign in with it. */
export default defineEventHandler(async (event) => {
  const { purpose, token } = readParamsAs(event, passwordLinkParams, 'link')
  const { password } = await readBodyAs(event, passwordByLinkSchema)
  await setPasswordByLink(useDatabase(), purpose, token, password, Date.now())
  return { changed: true }
})
