import { clockWords, dateWords } from '~~/shared/charts/words'
import type { DeviceItem } from '~~/shared/schemas/people'

/** A moment outside any site, so in UTC. @param iso ISO 8601 */
export const momentWords = (iso: string): string => `${dateWords(iso, 'UTC')}, ${clockWords(iso, 'UTC')} UTC`

/** What has become of a device that was revoked, when and by whom; empty while it may sign. */
export function deviceState(device: Pick<DeviceItem, 'revokedAt' | 'revokedBy' | 'replaced'>): string {
  if (device.revokedAt === null) return ''
  if (device.replaced) return `replaced by a new key ${momentWords(device.revokedAt)}`
  return `revoked ${momentWords(device.revokedAt)}${device.revokedBy ? ` by ${device.revokedBy}` : ''}`
}
