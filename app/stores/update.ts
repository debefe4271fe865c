import { defineStore } from 'pinia'
import { shallowRef } from 'vue'

const IN_USE = 'holdover-in-use'

/**
 * A newer version of the program that is ready on this device. It takes over only when no tab is in the
 * run of an outage: there it would change screens under somebody's hands.
 */
export const useUpdate = defineStore('update', () => {
  const waiting = shallowRef<ServiceWorker | null>(null)

  /** Lets the newer version take over and reloads this page, unless a run is open in some tab. */
  async function apply(): Promise<boolean> {
    const worker = waiting.value
    if (!worker || worker.state !== 'installed') return false
    const takeOver = async (free: unknown) => {
      if (free === null) return false
      navigator.serviceWorker.addEventListener('controllerchange', () => location.reload(), { once: true })
      worker.postMessage('take-over')
      return true
    }
    if (!('locks' in navigator)) return takeOver(true)
    return navigator.locks.request(IN_USE, { ifAvailable: true }, takeOver)
  }

  /** Holds updates off while a run is open; returns the way to let them through again. */
  function holdOff(): () => void {
    let release: () => void = () => undefined
    const held = new Promise<void>((resolve) => { release = resolve })
    if ('locks' in navigator) void navigator.locks.request(IN_USE, { mode: 'shared' }, () => held).catch(() => undefined)
    return release
  }

  return { waiting, apply, holdOff }
})
