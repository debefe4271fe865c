import { sql } from 'drizzle-orm'
import { check, doublePrecision, index, integer, jsonb, pgTable, text, timestamp, uniqueIndex, uuid } from 'drizzle-orm/pg-core'
import type { StepTimes } from '../../../shared/schemas/lessons'
import { people } from './people'
import { cases, workKinds } from './sites'

const origin = () => ({
  id: uuid().primaryKey().defaultRandom(),
  outageId: uuid().notNull(), // no foreign key: what was learned outlives a deleted record
  outageCode: text().notNull(),
  acceptedBy: uuid().notNull().references(() => people.id, { onDelete: 'restrict' }),
  acceptedName: text().notNull(), // as it was printed then
  acceptedAt: timestamp({ withTimezone: true }).notNull(),
})

/** Time constants that sealed outages taught: a case's own one is the mean of their logarithms. */
export const caseLessons = pgTable('case_lessons', {
  ...origin(),
  caseId: uuid().notNull().references(() => cases.id, { onDelete: 'cascade' }),
  tauHours: doublePrecision().notNull(),
  readings: integer().notNull(),
  rmseK: doublePrecision().notNull(),
}, table => [
  uniqueIndex('case_lessons_once').on(table.caseId, table.outageId),
  index('case_lessons_outage').on(table.outageId),
  check('case_lessons_tau', sql`${table.tauHours} > 0`),
])

/** How long steps took in sealed outages, and what that made of the kind of work's times. */
export const stepLessons = pgTable('step_lessons', {
  ...origin(),
  workKindId: uuid().notNull().references(() => workKinds.id, { onDelete: 'cascade' }),
  step: text().notNull(),
  minutes: doublePrecision().notNull(),
  before: jsonb().$type<StepTimes>().notNull(),
  after: jsonb().$type<StepTimes>().notNull(),
}, table => [
  uniqueIndex('step_lessons_once').on(table.workKindId, table.step, table.outageId),
  index('step_lessons_outage').on(table.outageId),
])
