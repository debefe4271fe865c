import { useUpdate } from '~/stores/update'
import { isRunPath } from '~/utils/safe-to-leave'

const ASK_EVERY_MS = 30 * 60_000

/** Registers the service worker; a new version waits for a page that is safe to leave (stores/update). */
export default defineNuxtPlugin((nuxtApp) => {
  if (import.meta.dev || !('serviceWorker' in navigator)) return
  const update = useUpdate()
  const router = useRouter()

  nuxtApp.hook('app:mounted', async () => {
    const registration = await navigator.serviceWorker.register('/sw.js', { updateViaCache: 'none' }).catch(() => null)
    if (!registration) return
    const look = () => { update.waiting = navigator.serviceWorker.controller ? registration.waiting : null }
    look()
    registration.addEventListener('updatefound', () => registration.installing?.addEventListener('statechange', look))
    const ask = () => { void registration.update().catch(() => undefined) }
    setInterval(ask, ASK_EVERY_MS)
    document.addEventListener('visibilitychange', () => { if (!document.hidden) ask() })
  })
  router.afterEach((to, from) => {
    if (to.path !== from.path && !isRunPath(to.path)) void update.apply()
  })
})
