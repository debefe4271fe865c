import { onMounted, onScopeDispose } from 'vue'
import { useSigner } from '~/stores/signer'

const LOOK_MS = 5000

/** Keeps the quiet time of the person: any touch or key renews it; when it is over, signing locks. */
export function useIdleLock(): void {
  const signer = useSigner()
  const touch = () => signer.touch()
  const look = () => signer.lockIdle()
  let timer: ReturnType<typeof setInterval> | undefined

  onMounted(() => {
    for (const name of ['pointerdown', 'keydown'] as const) document.addEventListener(name, touch, { capture: true, passive: true })
    // A phone in a pocket runs no timers: it is looked at again as soon as it is taken out.
    document.addEventListener('visibilitychange', look)
    timer = setInterval(look, LOOK_MS)
  })
  onScopeDispose(() => {
    clearInterval(timer)
    if (!import.meta.client) return
    for (const name of ['pointerdown', 'keydown'] as const) document.removeEventListener(name, touch, { capture: true })
    document.removeEventListener('visibilitychange', look)
  })
}
