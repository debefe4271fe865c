import { and, asc, eq, inArray, isNull, lt, or } from 'drizzle-orm'
import { alias } from 'drizzle-orm/pg-core'
import type { DeviceItem } from '../../../shared/schemas/people'
import { devices, people } from '../../database/schema'
import type { Queries } from '../database'

/** The signing devices of a person, oldest first. */
export async function devicesOf(db: Queries, personId: string): Promise<DeviceItem[]> {
  const revoker = alias(people, 'revoker')
  const rows = await db.select({
    id: devices.id, name: devices.name, publicKey: devices.publicKey, enrolledAt: devices.enrolledAt, lastSeenAt: devices.lastSeenAt,
    revokedAt: devices.revokedAt, revokedBy: revoker.name, replacedBy: devices.replacedBy,
  }).from(devices).leftJoin(revoker, eq(revoker.id, devices.revokedBy)).where(eq(devices.personId, personId)).orderBy(asc(devices.enrolledAt), asc(devices.id))
  return rows.map(({ replacedBy, enrolledAt, lastSeenAt, revokedAt, ...row }) => ({
    ...row, enrolledAt: enrolledAt.toISOString(), lastSeenAt: lastSeenAt?.toISOString() ?? null, revokedAt: revokedAt?.toISOString() ?? null, replaced: replacedBy !== null,
  }))
}

/** Between two marks of a device's last use lies at least this, so that a busy outbox does not write a row each time, ms. */
const SEEN_EVERY_MS = 60_000

/** Marks the devices of a person as used. @param now Unix ms */
export async function markSeen(db: Queries, personId: string, ids: string[], now: number): Promise<void> {
  if (ids.length === 0) return
  const stale = or(isNull(devices.lastSeenAt), lt(devices.lastSeenAt, new Date(now - SEEN_EVERY_MS)))
  await db.update(devices).set({ lastSeenAt: new Date(now) }).where(and(inArray(devices.id, ids), eq(devices.personId, personId), stale))
}
