import type { Ref } from 'vue'
import { computed, ref, shallowRef, watch } from 'vue'
import { readFault } from '~/utils/api-error'

/**
 * A list that is read a page at a time.
 * @param first its first page, which may be read anew
 * @param fetchPage a further page, from the `next` of the one before
 */
export function usePages<T>(first: Ref<{ items: T[], next: string | null } | null | undefined>, fetchPage: (after: string) => Promise<{ items: T[], next: string | null }>) {
  const more = shallowRef<T[]>([])
  const next = ref<string | null>(first.value?.next ?? null)
  const busy = ref(false)
  const trouble = ref('')
  watch(first, (page) => {
    more.value = []
    next.value = page?.next ?? null
  })
  const rows = computed(() => [...first.value?.items ?? [], ...more.value])

  async function showMore(): Promise<void> {
    const after = next.value
    if (after === null || busy.value) return
    const asked = first.value
    busy.value = true
    trouble.value = ''
    try {
      const page = await fetchPage(after)
      // The list may have been read anew while the page was on its way.
      if (asked === first.value) {
        more.value = [...more.value, ...page.items]
        next.value = page.next
      }
    } catch (fault) {
      trouble.value = readFault(fault).reason
    }
    busy.value = false
  }

  return { rows, next, busy, trouble, showMore }
}
