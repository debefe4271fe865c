import { onMounted, onScopeDispose } from 'vue'
import { useUpdate } from '~/stores/update'

/** While the page lives, no newer version of the program takes over in this or another tab. */
export function useHoldUpdates(): void {
  const update = useUpdate()
  let release: () => void = () => undefined
  onMounted(() => { release = update.holdOff() })
  onScopeDispose(() => release())
}
