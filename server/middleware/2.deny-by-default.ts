import { unauthenticated } from '~~/server/utils/errors'
import { isOpenRoute } from '~~/server/utils/open-routes'

/** A route is closed unless the list says that it is open. */
export default defineEventHandler((event) => {
  const { pathname } = getRequestURL(event)
  if (pathname.startsWith('/api/') && !isOpenRoute(pathname) && !event.context.person) unauthenticated()
})
