import { sql } from 'drizzle-orm'
import { check, index, integer, jsonb, pgTable, text, timestamp, uniqueIndex, uuid } from 'drizzle-orm/pg-core'
import type { NoticeParty, NoticeSubject } from '../../../shared/record/kinds/server'
import { MAIL_KINDS } from '../../../shared/schemas/mails'
import { outages } from './outages'
import { people } from './people'

/** Mails to be sent and those that were: written in the transaction of what they tell of, sent by a job. */
export const mails = pgTable('mails', {
  id: uuid().primaryKey(), // UUIDv7: sorts by time; stands in the Message-ID
  key: text().notNull(), // what it tells, and to whom: the same is never written twice
  kind: text({ enum: MAIL_KINDS }).notNull(),
  to: text().notNull(),
  subject: text().notNull(),
  text: text().notNull(),
  html: text().notNull(),
  outageId: uuid().references(() => outages.id, { onDelete: 'cascade' }),
  personId: uuid().references(() => people.id, { onDelete: 'cascade' }), // whom it goes to, where they have an account
  notice: jsonb().$type<{ party: NoticeParty, subject: NoticeSubject, name: string }>(), // of whom and what the record is told once it is sent; null: of nothing
  createdAt: timestamp({ withTimezone: true }).notNull(),
  attempts: integer().notNull().default(0),
  nextTryAt: timestamp({ withTimezone: true }).notNull(),
  sentAt: timestamp({ withTimezone: true }),
  failedAt: timestamp({ withTimezone: true }), // given up; an administrator may try again
  lastError: text(),
  enteredAt: timestamp({ withTimezone: true }), // when the record was told that it was sent
}, table => [
  uniqueIndex('mails_key').on(table.key),
  index('mails_due').on(table.nextTryAt, table.id).where(sql`${table.sentAt} is null and ${table.failedAt} is null`),
  index('mails_to_enter').on(table.id).where(sql`${table.notice} is not null and ${table.sentAt} is not null and ${table.enteredAt} is null`),
  index('mails_failed').on(table.id).where(sql`${table.failedAt} is not null`),
  index('mails_outage').on(table.outageId),
  index('mails_person').on(table.personId),
  check('mails_one_end', sql`${table.sentAt} is null or ${table.failedAt} is null`),
])
