import type { Snapshot } from '~~/shared/record/snapshot'
import type { OutageState } from '~~/shared/record/state'
import type { OutageItem, OutagePage } from '~~/shared/schemas/outage-list'
import type { StepPlan } from '~~/shared/schemas/work'

export interface ControllerItem { id: string, name: string, place: string, site: { id: string, code: string, name: string, timeZone: string } }
export interface WorkKindItem { id: string, name: string, steps: StepPlan[], rollBack: StepPlan[] }

/** What an outage can be opened of, and for which work. */
export const fetchControllers = () => $fetch<ControllerItem[]>('/api/controllers')
export const fetchWorkKinds = () => $fetch<WorkKindItem[]>('/api/work-kinds')
export const fetchSnapshot = (controller: string) => $fetch<Snapshot>(`/api/controllers/${controller}/snapshot`)

/** Planned outages that a controller had before, newest first; of the site's last hundred. */
export async function fetchEarlier({ id, site }: ControllerItem): Promise<OutageItem[]> {
  const { items } = await $fetch<OutagePage>('/api/outages', { query: { site: site.id, limit: 100 } })
  return items.filter(item => item.controller.id === id && item.planned)
}

export function fetchState(outage: string): Promise<OutageState> {
  const path: string = `/api/outages/${outage}`
  return $fetch<OutageState>(path)
}
