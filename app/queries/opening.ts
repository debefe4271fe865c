import type { Snapshot } from '~~/shared/record/snapshot'
import type { OutageState } from '~~/shared/record/state'
import type { OutageItem, OutagePage } from '~~/shared/schemas/outage-list'
import type { WorkKindItem } from '~~/shared/schemas/site-view'

export interface ControllerItem { id: string, name: string, place: string, site: { id: string, code: string, name: string, timeZone: string } }

/** What an outage can be opened of, and for which work. */
export const fetchControllers = () => $fetch<ControllerItem[]>('/api/controllers', { retry: 0, timeout: 8000 })
export const fetchWorkKinds = () => $fetch<WorkKindItem[]>('/api/work-kinds', { retry: 0, timeout: 8000 })
export const fetchSnapshot = (controller: string) => $fetch<Snapshot>(`/api/controllers/${controller}/snapshot`, { retry: 0, timeout: 8000 })

/** All equipment of the person's sites with its tag; null where it is as `tag` says. Throws where it cannot be had. */
export async function fetchEquipment(tag: string | null): Promise<{ items: Snapshot[], tag: string } | null> {
  const answer = await fetch('/api/equipment', { headers: tag ? { 'if-none-match': tag } : {}, cache: 'no-store' })
  if (answer.status === 304) return null
  if (!answer.ok) throw new Error(`The server answered ${answer.status}`)
  return { items: (await answer.json() as { items: Snapshot[] }).items, tag: answer.headers.get('etag') ?? '' }
}

/** Planned outages that a controller had before, newest first; of the site's last hundred. */
export async function fetchEarlier({ id, site }: ControllerItem): Promise<OutageItem[]> {
  const { items } = await $fetch<OutagePage>('/api/outages', { query: { site: site.id, limit: 100 } })
  return items.filter(item => item.controller.id === id && item.planned)
}

export function fetchState(outage: string): Promise<OutageState> {
  const path: string = `/api/outages/${outage}`
  return $fetch<OutageState>(path)
}
