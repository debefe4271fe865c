import { forgotSchema } from '~~/shared/schemas/people'
import { useDatabase } from '~~/server/utils/database'
import { conflict, tooMany } from '~~/server/utils/errors'
import { isMailOn } from '~~/server/utils/mail/settings'
import { readBodyAs } from '~~/server/utils/parse'
import { mayReset, resetWait } from '~~/server/utils/people/limits'
import { askForPassword } from '~~/server/utils/people/password-links'

/** Asks for a link to a new password. The answer is the same, and as quick, whether there is such an account or not. */
export default defineEventHandler(async (event) => {
  const { email } = await readBodyAs(event, forgotSchema)
  if (!isMailOn()) return conflict('Mail is off here: ask an administrator for a temporary password')
  const address = getRequestIP(event, { xForwardedFor: process.env.HOLDOVER_TRUST_PROXY === '1' }) ?? 'unknown'
  const wait = await resetWait(address)
  if (wait > 0) return tooMany(`Too many letters were asked for from here; wait ${Math.ceil(wait / 60)} minutes`, wait)
  const granted = await mayReset(email)
  if (granted) event.waitUntil(askForPassword(useDatabase(), email, Date.now()).catch(error => console.error('A link to a new password could not be written:', error)))
  setResponseStatus(event, 202)
  return { asked: true }
})
