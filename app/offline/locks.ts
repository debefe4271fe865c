import type { Locks } from './outbox-ports'
import { tabLocks } from './outbox'

/** How long one tab waits for another, ms; a tab that sleeps with a lock in its hand must not hold up this one. */
const PATIENCE_MS = 20_000

/** Web Locks among all tabs of this browser, or those of one tab where it has none. */
export function browserLocks(): Locks {
  const own = tabLocks()
  if (!('locks' in navigator)) return own
  return {
    async run<T>(name: string, task: () => Promise<T>): Promise<T> {
      let begun = false
      const begin = () => { begun = true; return task() }
      try {
        return await navigator.locks.request(name, { signal: AbortSignal.timeout(PATIENCE_MS) }, begin)
      } catch (error) {
        if (begun) throw error
        return own.run(name, task)
      }
    },
  }
}
