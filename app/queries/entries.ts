import type { AnyEntry, StoredEntry } from '~~/shared/record/entry'
import { Unreachable } from '~/offline/outbox'
import type { PushResult } from '~/offline/outbox'

export interface EntriesPage { entries: StoredEntry[], size: number, phase: string, code: string | null, now: string }

/** Entries of an outage after a seq; a page of at most 500. */
export function fetchEntries(outage: string, after: number): Promise<EntriesPage> {
  return $fetch<EntriesPage>(`/api/outages/${outage}/entries`, { query: { after }, retry: 0, timeout: 15_000 })
}

/**
 * Pushes signed entries; one answer an entry.
 * @throws Unreachable when the network, the server or the database is away, or the session has ended
 */
export async function pushEntries(outage: string, entries: { entry: AnyEntry, signature: string }[]): Promise<PushResult[]> {
  try {
    const answer = await $fetch.raw<{ results?: PushResult[] }>(`/api/outages/${outage}/entries`, { method: 'POST', body: { entries }, retry: 0, timeout: 20_000, ignoreResponseError: true })
    if (answer._data?.results) return answer._data.results
    throw new Unreachable(answer.status === 401 ? 'Sign in again to send what is kept' : `The server answered ${answer.status}`)
  } catch (error) {
    throw error instanceof Unreachable ? error : new Unreachable('The server cannot be reached')
  }
}

/** Puts a photo or drawing; false when it must be tried later. */
export async function putFile(outage: string, sha256: string, blob: Blob): Promise<boolean> {
  const answer = await fetch(`/api/outages/${outage}/files/${sha256}`, { method: 'PUT', body: blob, headers: { 'content-type': blob.type }, signal: AbortSignal.timeout(60_000) }).catch(() => null)
  return answer !== null && (answer.ok || answer.status === 422 || answer.status === 413)
}

/** The server's time, ISO 8601 UTC. */
export async function fetchServerTime(): Promise<string> {
  return (await $fetch<{ time: string }>('/api/health', { retry: 0, timeout: 5000 })).time
}
