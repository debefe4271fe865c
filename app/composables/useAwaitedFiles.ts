import { computed, onScopeDispose, shallowRef, watch } from 'vue'
import { fetchHeldFiles } from '~/queries/entries'

/** How often it is asked again while something is awaited, ms. */
const AGAIN_MS = 20_000

/** Photos and drawings that entries name and the server does not hold yet. None while that is not known: then the server judges. */
export function useAwaitedFiles(outage: string, files: () => readonly string[]) {
  const held = shallowRef<ReadonlySet<string> | null>(null)
  const awaited = computed(() => held.value === null ? [] : files().filter(file => !held.value!.has(file)))
  let timer: ReturnType<typeof setTimeout> | undefined
  async function look(): Promise<void> {
    clearTimeout(timer)
    held.value = await fetchHeldFiles(outage).catch(() => held.value)
    if (held.value === null || awaited.value.length > 0) timer = setTimeout(() => void look(), AGAIN_MS)
  }
  watch(() => files().length, () => void look(), { immediate: true })
  onScopeDispose(() => clearTimeout(timer))
  return awaited
}
