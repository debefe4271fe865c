import type { RecordItem } from '~~/shared/schemas/record-filter'
import type { RecordSearch } from '~/queries/records'
import { fetchRecords, useRecordPage } from '~/queries/records'
import { readFault } from '~/utils/api-error'
import { searchFault, searchOf } from '~/utils/record-search'
import type { SearchField } from '~/utils/record-search'

/** The search that stands in the address, what it finds, and further pages; `ready` once the first page has come. */
export function useRecordSearch() {
  const route = useRoute()
  const router = useRouter()
  const search = computed(() => searchOf(route.query) as RecordSearch)
  const fault = computed(() => searchFault(search.value))
  /** What is asked of the server: without a last day that lies before the first. */
  const asked = computed<RecordSearch>(() => fault.value === null ? search.value : Object.fromEntries(Object.entries(search.value).filter(([field]) => field !== 'to')))
  const ready = useRecordPage(asked)
  const { data: first, error, status, refresh } = ready

  const more = shallowRef<RecordItem[]>([])
  const next = ref<string | null>(first.value?.next ?? null)
  const busy = ref(false)
  const trouble = ref('')
  watch(first, (page) => {
    more.value = []
    trouble.value = ''
    next.value = page?.next ?? null
  })

  async function showMore() {
    const after = next.value
    if (!after || busy.value) return
    const search = asked.value
    busy.value = true
    trouble.value = ''
    try {
      const page = await fetchRecords(search, after)
      // The search may have changed while the page was on its way.
      if (search === asked.value) {
        more.value = [...more.value, ...page.items]
        next.value = page.next
      }
    } catch (error) {
      trouble.value = readFault(error).reason
    }
    busy.value = false
  }

  /** Asks for other things; an empty text takes a field away. */
  function change(fields: Partial<Record<SearchField | 'sort', string>>) {
    void router.replace({ query: searchOf({ ...route.query, ...fields }) })
  }

  return {
    ready, search, fault, error, status, refresh, next: readonly(next), busy: readonly(busy), trouble: readonly(trouble), showMore, change,
    clear: () => void router.replace({ query: {} }),
    items: computed(() => [...first.value?.items ?? [], ...more.value]),
    count: computed(() => first.value?.count ?? null),
    isRead: computed(() => first.value !== null && first.value !== undefined),
  }
}
