import type { Ref } from 'vue'

/**
 * The time in milliseconds since 1970, for pages that the server renders first: the browser begins with the moment
 * that the server wrote, so that both say the same, and goes on from there.
 */
export function useClock(every = 1000): Readonly<Ref<number>> {
  const now = useState('clock', () => Date.now())
  let timer: ReturnType<typeof setInterval> | undefined
  onMounted(() => {
    now.value = Date.now()
    timer = setInterval(() => { now.value = Date.now() }, every)
  })
  onBeforeUnmount(() => clearInterval(timer))
  return readonly(now)
}
