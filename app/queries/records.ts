import type { MaybeRefOrGetter } from 'vue'
import type { RecordChoices, RecordPage } from '~~/shared/schemas/record-filter'

/** A search as its address and the API write it: names of fields and texts. */
export type RecordSearch = Readonly<Record<string, string>>

/** The first page of a search for records. It is read anew when the search changes. */
export function useRecordPage(search: MaybeRefOrGetter<RecordSearch>) {
  const request = useRequestFetch()
  return useAsyncData(() => `records:${JSON.stringify(toValue(search))}`, () => request<RecordPage>('/api/records', { query: toValue(search) }))
}

/** A further page: `after` is the `next` of the one before. */
export function fetchRecords(search: RecordSearch, after: string): Promise<RecordPage> {
  return $fetch<RecordPage>('/api/records', { query: { ...search, after } })
}

/** What a search may name. */
export function useRecordChoices() {
  const request = useRequestFetch()
  return useAsyncData('record-choices', () => request<RecordChoices>('/api/records/choices'))
}
