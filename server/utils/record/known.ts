import { and, eq, inArray } from 'drizzle-orm'
import { devices, entries, refusals } from '../../database/schema'
import type { Queries } from '../database'
import type { PushResult } from './admit'

/** What an id was answered when it first came. `field` of a refusal is without the item's place in that push. */
export interface Answered { outage: string, hash: string, result: PushResult }

/** What the database says about the items of one push, read under the outage's lock. */
export interface Known {
  /** the sender's devices that the items name, by id */
  devices: Map<string, { publicKey: string, revokedAt: Date | null }>
  /** earlier answers, by entry id; each entry that this push stores or refuses for good is added */
  answers: Map<string, Answered>
}

const UUID = /^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/

/** Reads in one go what the items of a push are checked against. @param items as they came, not yet checked */
export async function readKnown(db: Queries, personId: string, items: unknown[]): Promise<Known> {
  const named = (field: 'id' | 'device') => [...new Set(items.map(item => (item as { entry?: Record<string, unknown> } | null)?.entry?.[field]).filter((value): value is string => typeof value === 'string' && UUID.test(value)))]
  const [ids, deviceIds] = [named('id'), named('device')]
  const known: Known = { devices: new Map(), answers: new Map() }
  // A transaction has one connection: its queries go out together and come back one after the other.
  const [stored, refused, enrolled] = await Promise.all([
    ids.length === 0 ? [] : db.select().from(entries).where(inArray(entries.id, ids)),
    ids.length === 0 ? [] : db.select().from(refusals).where(inArray(refusals.id, ids)),
    deviceIds.length === 0 ? [] : db.select().from(devices).where(and(inArray(devices.id, deviceIds), eq(devices.personId, personId))),
  ])
  for (const { id, outageId, hash, standing, seq, receivedAt, why } of stored) known.answers.set(id, { outage: outageId, hash, result: { id, status: standing, seq, receivedAt: receivedAt.toISOString(), why } })
  for (const { id, outageId, hash, code, field, reason } of refused) known.answers.set(id, { outage: outageId, hash, result: { id, status: 'refused', code, field, reason, recorded: true } })
  for (const { id, publicKey, revokedAt } of enrolled) known.devices.set(id, { publicKey, revokedAt })
  return known
}
