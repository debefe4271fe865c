import type { Ref } from 'vue'
import { onMounted, onScopeDispose, readonly, ref } from 'vue'

/** The time by the server's clock, renewed every second. @param skew this device's difference from the server, ms */
export function useNow(skew: Readonly<Ref<number>>): Readonly<Ref<number>> {
  const now = ref(Date.now() - skew.value)
  const timer = ref<ReturnType<typeof setInterval>>()
  onMounted(() => { timer.value = setInterval(() => { now.value = Date.now() - skew.value }, 1000) })
  onScopeDispose(() => clearInterval(timer.value))
  return readonly(now)
}
