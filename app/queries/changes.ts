import type { ChangePage } from '~~/shared/schemas/changes'

/** One page of a history. @param path as `/api/sites/…/history` @param query `subject`, and `before`: the `next` of the page before it */
export function fetchChanges(path: string, query: Record<string, string>): Promise<ChangePage> {
  return $fetch<ChangePage>(path, { query })
}

/** The first page of a history. */
export function useChanges(path: string, query: Record<string, string> = {}) {
  const request = useRequestFetch()
  return useAsyncData(`changes-${path}-${JSON.stringify(query)}`, () => request<ChangePage>(path, { query }), { lazy: true })
}
