import { forbidden } from '~~/server/utils/errors'
import { isForeign, ownOrigin } from '~~/server/utils/origin'

/** Refuses changes that a page of another origin sends; sign-in has a token of its own against that. */
export default defineEventHandler((event) => {
  if (!event.path.startsWith('/api/') || event.path.startsWith('/api/auth/')) return
  if (isForeign(event.method, getRequestHeader(event, 'origin'), ownOrigin(getRequestURL(event).origin))) forbidden('This was sent by a page that is not Holdover\'s')
})
