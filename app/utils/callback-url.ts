/** Places to which nobody is sent back after signing in. */
const NOWHERE = /^\/(sign-in|setup|api)(\/|$)/

/**
 * Where to go after signing in: a path of this very origin, else the first page. What stands in an address was
 * perhaps written by somebody who wants to lead people elsewhere.
 * @param wanted the `callbackUrl` of the address
 * @param origin scheme, host and port of this page
 */
export function callbackPath(wanted: unknown, origin: string): string {
  if (typeof wanted !== 'string' || !URL.canParse(wanted, origin)) return '/'
  const url = new URL(wanted, origin)
  // A path that begins with two slashes would be read as a host.
  if (url.origin !== origin || url.pathname.startsWith('//') || NOWHERE.test(url.pathname)) return '/'
  return url.pathname + url.search + url.hash
}
