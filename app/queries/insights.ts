import type { MaybeRefOrGetter } from 'vue'
import type { InsightAnswer, InsightQuery, TimesAccepted } from '~~/shared/schemas/insights'

/** The insights of a choice; they are read anew when it changes. */
export function useInsights(choice: MaybeRefOrGetter<InsightQuery>) {
  const request = useRequestFetch()
  return useAsyncData(() => `insights:${JSON.stringify(toValue(choice))}`, () => request<InsightAnswer>('/api/insights', { query: toValue(choice) }))
}

/** Takes corrections over into a kind of work. */
export function acceptTimes(body: TimesAccepted): Promise<{ done: boolean }> {
  return $fetch<{ done: boolean }>('/api/insights/times', { method: 'POST', body })
}
