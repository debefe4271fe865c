import { sql } from 'drizzle-orm'
import { boolean, check, index, integer, pgTable, primaryKey, text, timestamp, uniqueIndex, uuid } from 'drizzle-orm/pg-core'
import { ROLES } from '../../../shared/schemas/people'
import { sites } from './sites'

/** People who sign in. A row is never deleted, since the record names it; it is switched off. */
export const people = pgTable('people', {
  id: uuid().primaryKey().defaultRandom(),
  email: text().notNull(), // kept in lower case
  name: text().notNull(), // the printed name that stands in records
  role: text({ enum: ROLES }).notNull(),
  passwordHash: text().notNull(),
  sessionVersion: integer().notNull().default(1), // raised to end every session
  mustChangePassword: boolean().notNull().default(false),
  invitedAt: timestamp({ withTimezone: true }), // by mail, and no password was chosen since
  disabledAt: timestamp({ withTimezone: true }),
  createdAt: timestamp({ withTimezone: true }).notNull().defaultNow(),
}, table => [
  uniqueIndex('people_email').on(table.email),
  check('people_email_lower', sql`${table.email} = lower(${table.email})`),
])

/** Which sites a person may see. Administrators see all and have no rows here. */
export const siteAccess = pgTable('site_access', {
  personId: uuid().notNull().references(() => people.id, { onDelete: 'cascade' }),
  siteId: uuid().notNull().references(() => sites.id, { onDelete: 'cascade' }),
}, table => [
  primaryKey({ columns: [table.personId, table.siteId] }),
  index('site_access_site').on(table.siteId),
])

/** Signing devices: the public half of each Ed25519 key. The server's own keys stand here too, with no person. */
export const devices = pgTable('devices', {
  id: uuid().primaryKey(),
  personId: uuid().references(() => people.id, { onDelete: 'restrict' }),
  name: text().notNull(),
  publicKey: text().notNull(), // 32 bytes, base64url
  enrolledAt: timestamp({ withTimezone: true }).notNull(),
  revokedAt: timestamp({ withTimezone: true }),
  revokedBy: uuid().references(() => people.id, { onDelete: 'restrict' }),
  replacedBy: uuid(), // the device whose key took its place on the same browser
  lastSeenAt: timestamp({ withTimezone: true }),
}, table => [
  uniqueIndex('devices_public_key').on(table.publicKey),
  index('devices_person').on(table.personId),
])

/** Counters of the sign-in limits, written by rate-limiter-flexible. */
export const rateLimits = pgTable('rate_limits', {
  key: text().primaryKey(),
  points: integer().notNull().default(0),
  expire: timestamp({ withTimezone: true }),
})
