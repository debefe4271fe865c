import type { NoticeView } from '~~/shared/schemas/notices'

/** A notice by the token of its link. */
export function useNotice(token: string) {
  const request = useRequestFetch()
  const path: string = `/api/notices/${encodeURIComponent(token)}`
  return useAsyncData(`notice-${token}`, () => request<NoticeView>(path))
}

export function acknowledgeNotice(token: string, name: string): Promise<NoticeView> {
  const path: string = `/api/notices/${encodeURIComponent(token)}`
  return $fetch<NoticeView>(path, { method: 'POST', body: { name } })
}
