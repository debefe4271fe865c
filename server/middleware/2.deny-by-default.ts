import { forbidden, unauthenticated } from '~~/server/utils/errors'
import { isOpenRoute, isOpenWithTemporaryPassword } from '~~/server/utils/open-routes'

/** A route is closed unless the list says that it is open. */
export default defineEventHandler((event) => {
  const { pathname } = getRequestURL(event)
  if (!pathname.startsWith('/api/') || isOpenRoute(pathname)) return
  const person = event.context.person ?? unauthenticated()
  // An administrator knows a temporary password: nothing is done or signed under it.
  if (person.mustChangePassword && !isOpenWithTemporaryPassword(pathname)) forbidden('Choose a password of your own first')
})
