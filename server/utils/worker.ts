import { readFile } from 'node:fs/promises'
import { dirname, join, resolve } from 'node:path'

/**
 * Served in place of the worker when HOLDOVER_WORKER=0: it takes away what the worker kept of the program
 * and then itself. What people signed lies in IndexedDB, which it does not touch.
 */
export const WORKER_OFF = `self.addEventListener('install', () => self.skipWaiting())
self.addEventListener('activate', event => event.waitUntil((async () => {
  for (const name of await caches.keys()) await caches.delete(name)
  await self.registration.unregister()
})()))
`

/** The service worker's text: the built one, or the one that takes itself away. Null where there is none, as while developing. */
export async function workerText(switchedOff: boolean): Promise<string | null> {
  if (switchedOff) return WORKER_OFF
  const built = join(dirname(resolve(process.argv[1] ?? '.')), '../public/holdover-worker.js')
  return readFile(built, 'utf8').catch(() => null)
}
