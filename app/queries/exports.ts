import type { ExportAsked, ExportItem } from '~~/shared/schemas/exports'

/** One's own exports, the latest first. */
export function useExports() {
  const request = useRequestFetch()
  return useAsyncData('exports', () => request<{ items: ExportItem[] }>('/api/exports'))
}

/** Asks for an export; a job makes it. */
export function askExport(body: ExportAsked): Promise<ExportItem> {
  return $fetch<ExportItem>('/api/exports', { method: 'POST', body })
}

/** Cancels an export, or takes its file away. */
export function dropExport(id: string): Promise<ExportItem> {
  const path: string = `/api/exports/${id}`
  return $fetch<ExportItem>(path, { method: 'DELETE' })
}
