import type { MaybeRefOrGetter } from 'vue'
import type { Phase } from '~~/shared/record/phases'
import type { OutagePage } from '~~/shared/schemas/outage-list'

export interface OutageListFilter { phases?: readonly Phase[], site?: string, limit?: number }

const queryOf = ({ phases = [], site, limit }: OutageListFilter, after?: string) => ({
  phase: phases.length > 0 ? phases.join(',') : undefined, site, limit, after,
})

/** The first page of a list of outages, newest first. It is read anew when the filter changes. */
export function useOutageList(filter: MaybeRefOrGetter<OutageListFilter>) {
  const request = useRequestFetch()
  return useAsyncData(
    () => `outages:${JSON.stringify(queryOf(toValue(filter)))}`,
    () => request<OutagePage>('/api/outages', { query: queryOf(toValue(filter)) }),
  )
}

/** A further page: `after` is the `next` of the one before. */
export function fetchOutages(filter: OutageListFilter, after: string): Promise<OutagePage> {
  return $fetch<OutagePage>('/api/outages', { query: queryOf(filter, after) })
}
