import { sql } from 'drizzle-orm'
import { bigint, check, index, integer, pgTable, text, timestamp, uuid } from 'drizzle-orm/pg-core'
import { EXPORT_KINDS, EXPORT_STATES } from '../../../shared/schemas/exports'
import { people } from './people'

/** Exports that people asked for. The file lies in parts in the store under the id and the try that finished it. */
export const recordExports = pgTable('exports', {
  id: uuid().primaryKey(), // UUIDv7: sorts by time
  personId: uuid().notNull().references(() => people.id, { onDelete: 'restrict' }),
  kind: text({ enum: EXPORT_KINDS }).notNull(),
  state: text({ enum: EXPORT_STATES }).notNull(),
  fileName: text().notNull(),
  outageIds: uuid().array().notNull(), // as the selection gave them when it was asked for, in its order
  total: integer().notNull(),
  done: integer().notNull().default(0),
  tries: integer().notNull().default(0), // of workers; one that was killed or overtaken writes to a try that nobody reads
  heartbeatAt: timestamp({ withTimezone: true }), // of the worker
  parts: integer(),
  bytes: bigint({ mode: 'number' }),
  fault: text(),
  askedAt: timestamp({ withTimezone: true }).notNull(),
  doneAt: timestamp({ withTimezone: true }),
  expiresAt: timestamp({ withTimezone: true }),
}, table => [
  index('exports_person').on(table.personId, table.id),
  index('exports_state').on(table.state, table.id),
  check('exports_done', sql`${table.done} between 0 and ${table.total}`),
  check('exports_file', sql`${table.state} <> 'done' or (${table.parts} is not null and ${table.bytes} is not null and ${table.expiresAt} is not null)`),
])
