import { sql } from 'drizzle-orm'
import { index, integer, pgTable, primaryKey, text, timestamp, uuid } from 'drizzle-orm/pg-core'
import { ALERTS } from '../../../shared/record/kinds/alerts'
import { outages } from './outages'
import { people } from './people'

/** Alerts as the logs have them, beside them for lists; rebuilt with the other projections. */
export const alerts = pgTable('alerts', {
  outageId: uuid().notNull().references(() => outages.id, { onDelete: 'cascade' }),
  key: text().notNull(), // the same alert is never there twice
  alert: text({ enum: ALERTS }).notNull(),
  level: integer().notNull(),
  words: text().notNull(),
  toNames: text().array().notNull(), // printed names of all who were told
  raisedAt: timestamp({ withTimezone: true, precision: 3 }).notNull(),
  acknowledgedName: text(),
  acknowledgedAt: timestamp({ withTimezone: true, precision: 3 }),
  overAt: timestamp({ withTimezone: true, precision: 3 }),
}, table => [
  primaryKey({ columns: [table.outageId, table.key] }),
  index('alerts_open').on(table.outageId).where(sql`${table.overAt} is null`),
])

/** Who is to be told of an alert by mail, once at most; `mailedAt` null: not written yet, since others of the same minute go with it. */
export const alertTold = pgTable('alert_told', {
  outageId: uuid().notNull().references(() => outages.id, { onDelete: 'cascade' }),
  key: text().notNull(),
  personId: uuid().notNull().references(() => people.id, { onDelete: 'cascade' }),
  toldAt: timestamp({ withTimezone: true, precision: 3 }).notNull(),
  mailedAt: timestamp({ withTimezone: true, precision: 3 }),
}, table => [
  primaryKey({ columns: [table.outageId, table.key, table.personId] }),
  index('alert_told_waiting').on(table.outageId).where(sql`${table.mailedAt} is null`),
  index('alert_told_mailed').on(table.outageId, table.mailedAt),
  index('alert_told_person').on(table.personId),
])
