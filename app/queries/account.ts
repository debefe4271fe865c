import type { Account, DeviceItem } from '~~/shared/schemas/people'

/** Who is signed in, with the sites that are theirs. */
export function useAccount() {
  const request = useRequestFetch()
  return useAsyncData('account', () => request<Account>('/api/account'))
}

/** The signing devices of who is signed in, or, for an administrator, of another person; oldest first. */
export function useDevices(personId?: string) {
  const request = useRequestFetch()
  const path: string = personId ? `/api/people/${personId}/devices` : '/api/devices'
  return useAsyncData(`devices-${personId ?? 'own'}`, () => request<DeviceItem[]>(path))
}

export function fetchDevices(): Promise<DeviceItem[]> {
  return $fetch<DeviceItem[]>('/api/devices')
}

export function revokeDevice(id: string): Promise<{ id: string, revokedAt: string }> {
  const path: string = `/api/devices/${id}`
  return $fetch<{ id: string, revokedAt: string }>(path, { method: 'DELETE' })
}

export function renameDevice(id: string, name: string): Promise<{ id: string, name: string }> {
  const path: string = `/api/devices/${id}`
  return $fetch<{ id: string, name: string }>(path, { method: 'PATCH', body: { name } })
}

export function changePassword(current: string, next: string): Promise<{ changed: boolean }> {
  return $fetch<{ changed: boolean }>('/api/account/password', { method: 'POST', body: { current, next } })
}
