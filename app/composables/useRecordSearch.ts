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

  /** Pages after the first, and where to go on from the last of them; null: only the first is there. */
  const further = shallowRef<{ items: RecordItem[], next: string | null } | null>(null)
  const next = computed(() => further.value ? further.value.next : first.value?.next ?? null)
  const busy = ref(false)
  const trouble = ref('')
  watch(first, () => {
    further.value = null
    trouble.value = ''
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
      if (search === asked.value) further.value = { items: [...further.value?.items ?? [], ...page.items], next: page.next }
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
    ready, search, fault, error, status, refresh, next, busy: readonly(busy), trouble: readonly(trouble), showMore, change,
    clear: () => void router.replace({ query: {} }),
    items: computed(() => [...first.value?.items ?? [], ...further.value?.items ?? []]),
    count: computed(() => first.value?.count ?? null),
    isRead: computed(() => first.value !== null && first.value !== undefined),
  }
}
