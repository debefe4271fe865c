import { integer, jsonb, pgTable, uuid } from 'drizzle-orm/pg-core'
import type { OutageFacts } from '../../../shared/schemas/insights'
import { outages } from './outages'

/** What each finished outage adds to the insights; a projection of its log, written with its entries. */
export const outageFacts = pgTable('outage_facts', {
  outageId: uuid().primaryKey().references(() => outages.id, { onDelete: 'cascade' }),
  version: integer().notNull(), // of the rules that made them; an older one is made anew
  facts: jsonb().$type<OutageFacts>().notNull(),
})
