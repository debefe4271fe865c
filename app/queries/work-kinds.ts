import type { WorkKindItem } from '~~/shared/schemas/site-view'

/** All kinds of work with their steps, by name. */
export function useWorkKinds() {
  const request = useRequestFetch()
  // A key a page: one shared by two pages would show on the second what the first was rendered with.
  return useAsyncData(`work-kinds:${useRoute().path}`, () => request<WorkKindItem[]>('/api/work-kinds'), { lazy: true })
}

/** Makes a kind of work, or changes it where it has an id. */
export function saveWorkKind(id: string | null, body: object): Promise<WorkKindItem> {
  const path: string = id === null ? '/api/work-kinds' : `/api/work-kinds/${id}`
  return $fetch<WorkKindItem>(path, { method: id === null ? 'POST' : 'PATCH', body })
}

export function deleteWorkKind(id: string): Promise<null> {
  const path: string = `/api/work-kinds/${id}`
  return $fetch<null>(path, { method: 'DELETE' })
}
