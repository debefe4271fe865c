import type { KeyObject } from 'node:crypto'
import { and, asc, eq, isNull, ne } from 'drizzle-orm'
import { uuidv7 } from '../../../shared/record/uuid'
import { devices } from '../../database/schema'
import type { Queries } from '../database'
import { privateKeyOf, publicKeyText } from './keys'

export interface ServerSigner { device: string, key: KeyObject, publicKey: string, enrolledAt: Date }

let signer: ServerSigner | null = null

/**
 * The server's own key (HOLDOVER_SERVER_KEY: 32 bytes in base64url, the same on every node), entered
 * among the devices at its first use. An old key's public half stays there with the time from which it was no
 * longer used, so that old records verify.
 */
export async function serverSigner(db: Queries): Promise<ServerSigner> {
  if (signer) return signer
  const seed = Buffer.from(process.env.HOLDOVER_SERVER_KEY ?? '', 'base64url')
  if (seed.length !== 32) throw new Error('HOLDOVER_SERVER_KEY must hold 32 bytes in base64url; the start command makes one')
  const key = privateKeyOf(seed)
  const publicKey = publicKeyText(key)
  const now = new Date()
  await db.insert(devices).values({ id: uuidv7(now.getTime()), personId: null, name: 'Holdover server', publicKey, enrolledAt: now }).onConflictDoNothing()
  const [row] = await db.select().from(devices).where(eq(devices.publicKey, publicKey))
  await db.update(devices).set({ revokedAt: now }).where(and(isNull(devices.personId), isNull(devices.revokedAt), ne(devices.id, row!.id)))
  if (row!.revokedAt) await db.update(devices).set({ revokedAt: null }).where(eq(devices.id, row!.id))
  signer = { device: row!.id, key, publicKey, enrolledAt: row!.enrolledAt }
  return signer
}

/** A key that this server signs with or once signed with; times in ISO 8601 UTC, `until` null while it is in use. */
export interface ServerKey { id: string, publicKey: string, from: string, until: string | null }

/** Every key of this server, the oldest first. */
export async function serverKeys(db: Queries): Promise<ServerKey[]> {
  const rows = await db.select().from(devices).where(isNull(devices.personId)).orderBy(asc(devices.enrolledAt), asc(devices.id))
  return rows.map(row => ({ id: row.id, publicKey: row.publicKey, from: row.enrolledAt.toISOString(), until: row.revokedAt?.toISOString() ?? null }))
}
