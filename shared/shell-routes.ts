/**
 * Pages that are drawn in the browser alone and come without data: one shell for all of them, which the
 * service worker keeps, so that they open without a network. Each stands for itself and all below it.
 */
export const SHELL_ROUTES = ['/outages', '/verify'] as const

/** The address under which the shell is kept; it is the same for all of them. */
export const SHELL_PATH = SHELL_ROUTES[0]

/** @param path without query */
export function isShellPath(path: string): boolean {
  return SHELL_ROUTES.some(route => path === route || path.startsWith(`${route}/`))
}
