import type { WatchAnswer } from '~~/shared/schemas/watch'

/** What the watch shows, as far as it is not known here. @param known outages that are held, each with its seq */
export function fetchWatch(known: Record<string, number>, only?: string[]): Promise<WatchAnswer> {
  return $fetch<WatchAnswer>('/api/watch/outages', { method: 'POST', body: { known, only }, retry: 0, timeout: 15_000 })
}
