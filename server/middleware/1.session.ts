import { getToken } from '#auth'
import { resolvePerson } from '~~/server/utils/people/session'

/** Puts the person of the session, read afresh from the database, beside the request. */
export default defineEventHandler(async (event) => {
  // The sign-in limits need the address; whatever a client claims under this name is overwritten.
  event.node.req.headers['x-holdover-address'] = getRequestIP(event, { xForwardedFor: process.env.HOLDOVER_TRUST_PROXY === '1' }) ?? 'unknown'
  if (!event.path.startsWith('/api/') || event.path.startsWith('/api/auth/') || event.path.startsWith('/api/health')) return
  const token = await getToken({ event, secret: useRuntimeConfig().authSecret }).catch(() => null)
  event.context.person = await resolvePerson(token)
  event.context.sessionVersion = token?.sessionVersion
})
