/// <reference lib="webworker" />
import { cleanupOutdatedCaches, createHandlerBoundToURL, precacheAndRoute } from 'workbox-precaching'
import { NavigationRoute, registerRoute } from 'workbox-routing'
import { isShellPath, SHELL_PATH } from '~~/shared/shell-routes'

declare const self: ServiceWorkerGlobalScope

// The shell without data, its scripts, styles and fonts. No answer of /api and no page with data is ever kept.
precacheAndRoute(self.__WB_MANIFEST, { cleanURLs: false, directoryIndex: '' })
cleanupOutdatedCaches()

const shell = createHandlerBoundToURL(SHELL_PATH)
registerRoute(new NavigationRoute(async (options) => {
  if (isShellPath(options.url.pathname)) return shell(options)
  try {
    return await fetch(options.request)
  } catch {
    // No network: what is kept on this phone is all there is.
    return Response.redirect(`${SHELL_PATH}?away=1`, 302)
  }
}, { denylist: [/^\/api\//, /^\/_nuxt\//] }))

// A new version waits until a page that is safe to leave says so.
self.addEventListener('message', (event) => {
  if (event.data === 'take-over') void self.skipWaiting()
})
self.addEventListener('activate', event => event.waitUntil(self.clients.claim()))
