import type { AlertRules } from '~~/shared/schemas/alert-rules'
import type { AlertList, SiteAlerts } from '~~/shared/schemas/alerts'

/** Open alerts of the outages that one may see. */
export function useOpenAlerts() {
  const request = useRequestFetch()
  return useAsyncData('alerts', () => request<AlertList>('/api/alerts'), { lazy: true })
}

/** Says that one has seen an alert. The first who did so counts; who that was comes back. */
export function acknowledgeAlert(outage: string, key: string): Promise<{ key: string, name: string, at: string }> {
  const path: string = `/api/outages/${outage}/alerts/acknowledge`
  return $fetch<{ key: string, name: string, at: string }>(path, { method: 'POST', body: { key } })
}

/** Who is told of a site's alerts, whom the rules may name, and who changed them when. */
export function useSiteAlerts(id: string) {
  const request = useRequestFetch()
  const path: string = `/api/sites/${id}/alerts`
  return useAsyncData(`site-alerts-${id}`, () => request<SiteAlerts>(path), { lazy: true })
}

export function saveSiteAlerts(id: string, body: AlertRules): Promise<AlertRules> {
  const path: string = `/api/sites/${id}/alerts`
  return $fetch<AlertRules>(path, { method: 'PUT', body })
}
