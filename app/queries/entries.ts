import type { Checkpoint } from '~~/shared/record/checkpoint'
import type { AnyEntry, StoredEntry } from '~~/shared/record/entry'
import { Unsent } from '~/offline/outbox-ports'
import type { PushResult, Trouble } from '~/offline/outbox-ports'

export interface EntriesPage { entries: StoredEntry[], size: number, phase: string, code: string | null, checkpoint: Checkpoint | null, now: string }

/** Entries of an outage after a seq; a page of at most 500. */
export function fetchEntries(outage: string, after: number): Promise<EntriesPage> {
  return $fetch<EntriesPage>(`/api/outages/${outage}/entries`, { query: { after }, retry: 0, timeout: 15_000 })
}

/**
 * Pushes signed entries; one answer an entry.
 * @param seen how the log stood when this device last saw it; null: it never did
 * @throws Unsent with the reason, when there is no answer to the entries
 */
export async function pushEntries(outage: string, entries: { entry: AnyEntry, signature: string }[], seen: Checkpoint | null): Promise<PushResult[]> {
  const answer = await $fetch.raw<{ results?: PushResult[] }>(`/api/outages/${outage}/entries`, { method: 'POST', body: { entries, seen: seen ? { size: seen.statement.size, root: seen.statement.root } : undefined }, retry: 0, timeout: 20_000, ignoreResponseError: true }).catch(() => null)
  if (answer?._data?.results) return answer._data.results
  throw new Unsent(troubleOf(answer?.status ?? 0))
}

/** Why a push has no answers, by the HTTP status; 0: none came. */
export function troubleOf(status: number): Trouble {
  if (status === 401) return 'signed-out'
  if (status === 404 || status === 403) return 'missing'
  if (status === 413) return 'too-large'
  // A gateway or a database that is away is no fault of the entries.
  return status === 0 || status === 408 || status === 429 || status >= 502 ? 'away' : 'failed'
}

/** Puts a photo or drawing: held by the server now, to be tried later, or refused for good with the reason. */
export async function putFile(outage: string, sha256: string, blob: Blob): Promise<'held' | 'later' | { refused: string }> {
  const answer = await fetch(`/api/outages/${outage}/files/${sha256}`, { method: 'PUT', body: blob, headers: { 'content-type': blob.type }, signal: AbortSignal.timeout(60_000) }).catch(() => null)
  if (answer?.ok) return 'held'
  if (answer?.status !== 422 && answer?.status !== 413) return 'later'
  const { data, message } = await answer.json().catch(() => ({})) as { data?: { reason?: string }, message?: string }
  return { refused: data?.reason ?? message ?? 'The server will not have it' }
}

/** Hashes of the photos and drawings of an outage that the server holds. */
export async function fetchHeldFiles(outage: string): Promise<ReadonlySet<string>> {
  return new Set((await $fetch<{ held: string[] }>(`/api/outages/${outage}/files`, { retry: 0, timeout: 15_000 })).held)
}

/** The server's time, ISO 8601 UTC. */
export async function fetchServerTime(): Promise<string> {
  return (await $fetch<{ time: string }>('/api/health', { retry: 0, timeout: 5000 })).time
}
