import { sql } from 'drizzle-orm'
import { boolean, check, index, integer, jsonb, pgTable, text, timestamp, unique, uniqueIndex, uuid } from 'drizzle-orm/pg-core'
import type { Checkpoint } from '../../../shared/record/checkpoint'
import { RETENTION_MAX_YEARS } from '../../../shared/schemas/retention'
import { outages } from './outages'
import { devices, people } from './people'
import { sites } from './sites'

/** How long records are kept after their last entry: the organisation's row, and one for each site that keeps longer. */
export const retention = pgTable('retention', {
  id: uuid().primaryKey().defaultRandom(),
  siteId: uuid().references(() => sites.id, { onDelete: 'cascade' }), // null: the organisation
  years: integer().notNull(),
}, table => [
  unique('retention_site').on(table.siteId).nullsNotDistinct(), // one row for the organisation too
  check('retention_years', sql`${table.years} between 1 and ${sql.raw(String(RETENTION_MAX_YEARS))}`),
])

/** Legal holds. A hold is lifted, never removed or changed: a trigger refuses it, but with the record itself. */
export const legalHolds = pgTable('legal_holds', {
  id: uuid().primaryKey(), // UUIDv7: sorts by time
  outageId: uuid().notNull().references(() => outages.id, { onDelete: 'restrict' }),
  personId: uuid().notNull().references(() => people.id, { onDelete: 'restrict' }),
  personName: text().notNull(), // as it was printed then
  at: timestamp({ withTimezone: true }).notNull(),
  reason: text().notNull(),
  liftedById: uuid().references(() => people.id, { onDelete: 'restrict' }),
  liftedByName: text(),
  liftedAt: timestamp({ withTimezone: true }),
  liftedReason: text(),
}, table => [
  uniqueIndex('legal_holds_one').on(table.outageId).where(sql`${table.liftedAt} is null`),
  index('legal_holds_outage').on(table.outageId, table.id),
])

/**
 * What stays of deleted records. Its row is what lets the log go: a trigger takes it only where no hold is on,
 * the record has ended and its retention is over, and lets the entries go in the same transaction alone.
 */
export const deletions = pgTable('deletions', {
  outageId: uuid().primaryKey(), // the outage itself is gone
  code: text().notNull(),
  siteId: uuid().notNull().references(() => sites.id, { onDelete: 'restrict' }),
  controllerName: text().notNull(),
  workKind: text().notNull(),
  planned: boolean().notNull(),
  openedAt: timestamp({ withTimezone: true }).notNull(),
  endedAt: timestamp({ withTimezone: true }),
  size: integer().notNull(),
  root: text().notNull(),
  statement: text().notNull(), // the canonical JSON, byte for byte as signed
  signature: text().notNull(), // Ed25519, base64url
  personId: uuid().notNull().references(() => people.id, { onDelete: 'restrict' }),
  deviceId: uuid().notNull().references(() => devices.id, { onDelete: 'restrict' }),
  checkpoint: jsonb().$type<Checkpoint>(),
  deletedAt: timestamp({ withTimezone: true, precision: 3 }).notNull(),
  transaction: text().notNull().default(''), // set by the trigger: in which the log may go
}, table => [
  index('deletions_deleted').on(table.deletedAt, table.outageId),
  index('deletions_site').on(table.siteId, table.deletedAt),
])

/** Files of deleted records that object storage still holds: taken away after the commit, and again until it works. */
export const fileRemovals = pgTable('file_removals', {
  sha256: text().primaryKey(),
  outageId: uuid().notNull(),
  askedAt: timestamp({ withTimezone: true }).notNull(),
  tries: integer().notNull().default(0),
  failure: text(),
})
