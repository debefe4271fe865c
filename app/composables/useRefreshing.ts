/**
 * Reads something again while the page is in sight, and tells when it was last heard.
 * @param refresh reads it; what failed is told by `failed`
 * @param every milliseconds
 */
export function useRefreshing(refresh: () => Promise<void>, failed: () => boolean, every = 20_000) {
  const heardAt = useState('heard-at', () => Date.now())
  let timer: ReturnType<typeof setInterval> | undefined
  async function again() {
    if (document.hidden) return
    await refresh()
    if (!failed()) heardAt.value = Date.now()
  }
  onMounted(() => {
    heardAt.value = Date.now()
    timer = setInterval(again, every)
    document.addEventListener('visibilitychange', again)
  })
  onBeforeUnmount(() => {
    clearInterval(timer)
    document.removeEventListener('visibilitychange', again)
  })
  return { heardAt: readonly(heardAt) }
}
