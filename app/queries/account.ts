import type { Account } from '~~/shared/schemas/people'

export interface DeviceItem { id: string, name: string, publicKey: string, enrolledAt: string, revokedAt: string | null }

/** Who is signed in, with the sites that are theirs. */
export function useAccount() {
  const request = useRequestFetch()
  return useAsyncData('account', () => request<Account>('/api/account'))
}

/** The person's own signing devices, oldest first. */
export function useDevices() {
  const request = useRequestFetch()
  return useAsyncData('devices', () => request<DeviceItem[]>('/api/devices'))
}

export function fetchDevices(): Promise<DeviceItem[]> {
  return $fetch<DeviceItem[]>('/api/devices')
}

export function revokeDevice(id: string): Promise<{ id: string, revokedAt: string }> {
  const path: string = `/api/devices/${id}`
  return $fetch<{ id: string, revokedAt: string }>(path, { method: 'DELETE' })
}

export function changePassword(current: string, next: string): Promise<{ changed: boolean }> {
  return $fetch<{ changed: boolean }>('/api/account/password', { method: 'POST', body: { current, next } })
}
