import { customType, date, index, integer, pgTable, text, timestamp, uuid } from 'drizzle-orm/pg-core'
import { PHASES } from '../../../shared/record/phases'
import type { RecordOutcome } from '../../../shared/schemas/record-filter'
import { outages } from './outages'
import { controllers, sites } from './sites'

const tsvector = customType<{ data: string }>({ dataType: () => 'tsvector' })

/** `holdSeconds` of an outage in which no case came without control, or none would reach its limit. */
export const NO_HOLD = 2_147_483_647

/**
 * What records are found and sorted by: a row per outage, written in the transaction of its entries and
 * rebuilt from the log by `npm run rebuild`. Beside `outages`, so that a push that changes nothing here
 * leaves its indexes alone.
 */
export const outageSearch = pgTable('outage_search', {
  outageId: uuid().primaryKey().references(() => outages.id, { onDelete: 'cascade' }),
  version: integer().notNull(), // of the rules that made the row
  code: text().notNull(),
  siteId: uuid().notNull().references(() => sites.id, { onDelete: 'restrict' }),
  controllerId: uuid().notNull().references(() => controllers.id, { onDelete: 'restrict' }),
  workKind: text().notNull(),
  phase: text({ enum: PHASES }).notNull(),
  openedAt: timestamp({ withTimezone: true, precision: 3 }).notNull(),
  openedOn: date({ mode: 'string' }).notNull(), // the site's day
  endedAt: timestamp({ withTimezone: true, precision: 3 }),
  darkSince: timestamp({ withTimezone: true, precision: 3 }), // where control is away now
  darkSeconds: integer().notNull(), // time without control that is over; 0: none
  holdSeconds: integer().notNull(), // the shortest hold that readings without control gave; NO_HOLD: none
  lateReadings: integer().notNull(), // of a record that has ended; 0 before
  outcomes: text().array().$type<RecordOutcome[]>().notNull(),
  people: uuid().array().notNull(), // who signed
  tags: text().array().notNull(), // points of the plan and those touched beside it, in capitals
  words: tsvector().notNull(), // what people wrote, and the outage's code
}, table => [
  index('outage_search_site_opened').on(table.siteId, table.openedAt, table.outageId),
  index('outage_search_site_dark').on(table.siteId, table.darkSeconds, table.outageId),
  index('outage_search_site_hold').on(table.siteId, table.holdSeconds, table.outageId),
  index('outage_search_opened').on(table.openedAt, table.outageId),
  index('outage_search_dark').on(table.darkSeconds, table.outageId),
  index('outage_search_hold').on(table.holdSeconds, table.outageId),
  // For the few that are of a rare phase or kind of work; the orders above find the others sooner.
  index('outage_search_phase').on(table.phase, table.openedAt, table.outageId),
  index('outage_search_work').on(table.workKind, table.openedAt, table.outageId),
  // What was written last waits in a list that each search reads through: a short one.
  index('outage_search_terms').using('gin', table.words, table.tags, table.people, table.outcomes).with({ fastupdate: true, gin_pending_list_limit: 128 }),
])
