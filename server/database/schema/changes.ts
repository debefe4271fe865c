import { index, jsonb, pgTable, text, timestamp, uuid } from 'drizzle-orm/pg-core'
import { CHANGE_DEEDS, CHANGE_SUBJECTS } from '../../../shared/schemas/changes'
import type { FieldChange } from '../../../shared/schemas/changes'
import { people } from './people'
import { sites } from './sites'

/** Who changed what outside of records: written with the change itself, and never altered (a trigger refuses it). */
export const changes = pgTable('changes', {
  id: uuid().primaryKey(), // UUIDv7: sorts by time
  at: timestamp({ withTimezone: true }).notNull(),
  personId: uuid().notNull().references(() => people.id, { onDelete: 'restrict' }),
  personName: text().notNull(), // as it was printed then
  siteId: uuid().references(() => sites.id, { onDelete: 'restrict' }), // null: of no one site
  subject: text({ enum: CHANGE_SUBJECTS }).notNull(),
  subjectId: uuid().notNull(), // kept when the thing itself is deleted
  subjectName: text().notNull(),
  deed: text({ enum: CHANGE_DEEDS }).notNull(),
  fields: jsonb().$type<FieldChange[]>().notNull(),
}, table => [
  index('changes_site').on(table.siteId, table.id),
  index('changes_subject').on(table.subject, table.subjectId, table.id),
  index('changes_person').on(table.personId),
])
