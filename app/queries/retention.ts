import type { DeletionFile, SignedDeletion } from '~~/shared/record/deletion'
import type { DeletedPage, DuePage, RecordRetention, RetentionSettings } from '~~/shared/schemas/retention'

/** How long records are kept: the organisation's years, and each site's own. */
export function useRetentionSettings() {
  const request = useRequestFetch()
  return useAsyncData('retention-settings', () => request<RetentionSettings>('/api/retention'))
}

export function saveOrganisationYears(years: number): Promise<RetentionSettings> {
  return $fetch<RetentionSettings>('/api/retention', { method: 'PUT', body: { years } })
}

/** @param years null: as all sites */
export function saveSiteYears(site: string, years: number | null): Promise<RetentionSettings> {
  const path: string = `/api/sites/${site}/retention`
  return $fetch<RetentionSettings>(path, { method: 'PUT', body: { years } })
}

/** The first page of the records whose retention is over. */
export function useDue() {
  const request = useRequestFetch()
  return useAsyncData('retention-due', () => request<DuePage>('/api/retention/due'))
}

/** A further page: `after` is the `next` of the one before. */
export const fetchDue = (after: string) => $fetch<DuePage>('/api/retention/due', { query: { after } })

/** The first page of the records that were deleted. */
export function useDeleted() {
  const request = useRequestFetch()
  return useAsyncData('retention-deleted', () => request<DeletedPage>('/api/retention/deleted'))
}

export const fetchDeleted = (after: string) => $fetch<DeletedPage>('/api/retention/deleted', { query: { after } })

export function fetchRetention(outage: string): Promise<RecordRetention> {
  const path: string = `/api/outages/${outage}/retention`
  return $fetch<RecordRetention>(path)
}

export function saveHold(outage: string, body: { held: boolean, reason: string }): Promise<RecordRetention> {
  const path: string = `/api/outages/${outage}/hold`
  return $fetch<RecordRetention>(path, { method: 'PUT', body })
}

/** What stays of a deleted record; null where none was deleted, or it is not theirs to see. */
export async function fetchDeletion(outage: string): Promise<DeletionFile | null> {
  const path: string = `/api/outages/${outage}/deletion`
  try {
    return await $fetch<DeletionFile>(path)
  } catch (error) {
    if ((error as { status?: number }).status === 404) return null
    throw error
  }
}

export function deleteRecord(outage: string, body: SignedDeletion): Promise<DeletionFile> {
  const path: string = `/api/outages/${outage}/deletion`
  return $fetch<DeletionFile>(path, { method: 'POST', body })
}
