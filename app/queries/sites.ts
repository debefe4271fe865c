import type { ImportPreview } from '~~/shared/import/preview'
import type { ResourceItem, ResourceName, SiteItem, SiteLine, SiteView } from '~~/shared/schemas/site-view'
import type { ChangeItem } from '~~/shared/schemas/changes'
import type { SiteLimits } from '~~/shared/schemas/equipment'
import { readFault } from '~/utils/api-error'

/** The sites that the person may see, by name. */
export function useSites() {
  const request = useRequestFetch()
  return useAsyncData('sites', () => request<SiteLine[]>('/api/sites'), { lazy: true })
}

/** A site with all its equipment. A site that is not theirs is the page of an address that leads nowhere. */
export async function useSite(id: string) {
  const request = useRequestFetch()
  const path: string = `/api/sites/${id}`
  // A key a page: one shared by two pages would show on the second what the first was rendered with.
  const answer = await useAsyncData(`site-${id}:${useRoute().path}`, () => request<SiteView>(path), { lazy: true })
  const missing = () => readFault(answer.error.value).status === 404
  const gone = () => createError({ status: 404, statusText: 'Not Found', message: 'There is no such site', fatal: true })
  if (answer.error.value && missing()) throw gone()
  if (import.meta.client) watch(answer.error, fault => fault && missing() && showError(gone()))
  return answer
}

export function createSite(body: object): Promise<SiteItem> {
  return $fetch<SiteItem>('/api/sites', { method: 'POST', body })
}

export function updateSite(id: string, body: object): Promise<SiteItem> {
  const path: string = `/api/sites/${id}`
  return $fetch<SiteItem>(path, { method: 'PATCH', body })
}

/** Adds a thing of a site's equipment, or changes it where it has an id. */
export function saveItem(site: string, resource: ResourceName, id: string | null, body: object): Promise<ResourceItem> {
  const path: string = `/api/sites/${site}/${resource}${id === null ? '' : `/${id}`}`
  return $fetch<ResourceItem>(path, { method: id === null ? 'POST' : 'PATCH', body })
}

export function deleteItem(site: string, resource: ResourceName, id: string): Promise<null> {
  const path: string = `/api/sites/${site}/${resource}/${id}`
  return $fetch<null>(path, { method: 'DELETE' })
}

export function previewPoints(controller: string, text: string): Promise<ImportPreview> {
  const path: string = `/api/controllers/${controller}/points/preview`
  return $fetch<ImportPreview>(path, { method: 'POST', body: { text } })
}

export function importPoints(controller: string, text: string): Promise<ImportPreview> {
  const path: string = `/api/controllers/${controller}/points/import`
  return $fetch<ImportPreview>(path, { method: 'POST', body: { text } })
}

export interface SiteLimitsAnswer extends SiteLimits { changes: ChangeItem[] }

/** How a site judges more strictly than its rulebook, with who changed that when. */
export function useSiteLimits(id: string) {
  const request = useRequestFetch()
  const path: string = `/api/sites/${id}/limits`
  return useAsyncData(`site-limits-${id}`, () => request<SiteLimitsAnswer>(path), { lazy: true })
}

export function saveSiteLimits(id: string, body: SiteLimits): Promise<SiteLimits> {
  const path: string = `/api/sites/${id}/limits`
  return $fetch<SiteLimits>(path, { method: 'PUT', body })
}
