import { sql } from 'drizzle-orm'
import { boolean, check, index, integer, jsonb, pgTable, primaryKey, text, timestamp, uniqueIndex, uuid } from 'drizzle-orm/pg-core'
import { PHASES } from '../../../shared/record/phases'
import type { Checkpoint } from '../../../shared/record/checkpoint'
import type { Frontier } from '../../../shared/record/merkle'
import type { OutageState } from '../../../shared/record/state'
import { devices, people } from './people'
import { controllers, sites } from './sites'

/**
 * A row per outage: the lock under which `seq` is taken, and a projection of the log for lists.
 * Everything but the ids can be rebuilt from `entries` (npm run rebuild).
 */
export const outages = pgTable('outages', {
  id: uuid().primaryKey(),
  code: text().notNull(),
  siteId: uuid().notNull().references(() => sites.id, { onDelete: 'restrict' }),
  controllerId: uuid().notNull().references(() => controllers.id, { onDelete: 'restrict' }),
  planned: boolean().notNull(),
  workKind: text().notNull(),
  phase: text({ enum: PHASES }).notNull(),
  size: integer().notNull().default(0), // entries so far; the last seq
  state: jsonb().$type<OutageState>().notNull(), // cached fold of the first entries; read it by readState, which goes on to the last
  foldVersion: integer().notNull(),
  frontier: jsonb().$type<Frontier>(), // of the Merkle tree over the log; null: to be worked out from the log
  checkpoint: jsonb().$type<Checkpoint>(), // the newest; null in a log that has not grown since there are any
  pointsInHand: integer().notNull().default(0),
  startsAt: timestamp({ withTimezone: true }),
  darkAt: timestamp({ withTimezone: true }),
  endedAt: timestamp({ withTimezone: true }),
  openedAt: timestamp({ withTimezone: true }).notNull(),
  updatedAt: timestamp({ withTimezone: true }).notNull(),
}, table => [
  uniqueIndex('outages_code').on(table.code),
  index('outages_site_opened').on(table.siteId, table.openedAt, table.id),
  index('outages_opened').on(table.openedAt, table.id),
  index('outages_phase').on(table.phase, table.openedAt, table.id),
  index('outages_controller').on(table.controllerId),
  index('outages_ended').on(table.endedAt, table.id).where(sql`${table.endedAt} is not null`),
])

/** The log. Append-only: a trigger in the migrations refuses update, and delete but for a whole record by its signed statement. */
export const entries = pgTable('entries', {
  outageId: uuid().notNull().references(() => outages.id, { onDelete: 'restrict' }),
  seq: integer().notNull(),
  id: uuid().notNull(),
  kind: text().notNull(),
  personId: uuid().references(() => people.id, { onDelete: 'restrict' }), // null: the server
  deviceId: uuid().notNull().references(() => devices.id, { onDelete: 'restrict' }),
  n: integer().notNull(),
  hash: text().notNull(), // SHA-256 of the signed bytes, hex
  signed: text().notNull(), // the canonical JSON, byte for byte as signed
  signature: text().notNull(), // Ed25519, base64url
  receivedAt: timestamp({ withTimezone: true, precision: 3 }).notNull(),
  standing: text({ enum: ['accepted', 'questioned'] }).notNull(),
  why: jsonb().$type<string[]>().notNull().default([]),
  checkpoint: jsonb().$type<Checkpoint>(), // of the log with this entry as its last; null where it is older than checkpoints
}, table => [
  primaryKey({ columns: [table.outageId, table.seq] }),
  uniqueIndex('entries_id').on(table.id),
  uniqueIndex('entries_chain').on(table.outageId, table.deviceId, table.n),
  check('entries_seq', sql`${table.seq} > 0`),
])

/**
 * Entries that were validly signed but refused: their place in the device's chain is taken, so that
 * the chain stays whole. The refusal itself stands in the log as an entry by the server.
 */
export const refusals = pgTable('refusals', {
  outageId: uuid().notNull().references(() => outages.id, { onDelete: 'restrict' }),
  deviceId: uuid().notNull().references(() => devices.id, { onDelete: 'restrict' }),
  n: integer().notNull(),
  id: uuid().notNull(),
  hash: text().notNull(),
  code: integer().$type<403 | 409 | 413 | 422>().notNull(), // the answer's status and field, for replays
  field: text(),
  reason: text().notNull(),
  seq: integer().notNull(), // of the server's entry that names it
}, table => [
  primaryKey({ columns: [table.outageId, table.deviceId, table.n] }),
  uniqueIndex('refusals_id').on(table.id),
])

/** Photos and drawn signatures, named by their SHA-256; the bytes are in object storage. */
export const files = pgTable('files', {
  outageId: uuid().notNull().references(() => outages.id, { onDelete: 'restrict' }),
  sha256: text().notNull(),
  mime: text({ enum: ['image/jpeg', 'image/png'] }).notNull(),
  size: integer().notNull(),
  personId: uuid().notNull().references(() => people.id, { onDelete: 'restrict' }),
  createdAt: timestamp({ withTimezone: true }).notNull().defaultNow(),
}, table => [
  primaryKey({ columns: [table.outageId, table.sha256] }),
])
