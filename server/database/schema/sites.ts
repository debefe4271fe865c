import { sql } from 'drizzle-orm'
import { boolean, check, date, doublePrecision, index, integer, jsonb, pgTable, text, timestamp, uniqueIndex, uuid } from 'drizzle-orm/pg-core'
import type { AlertRules } from '../../../shared/schemas/alert-rules'
import { PLAIN_ALERT_RULES } from '../../../shared/schemas/alert-rules'
import { CASE_KINDS } from '../../../shared/schemas/case-kinds'
import type { DefrostSchedule, QuietHours, SiteHolding } from '../../../shared/schemas/equipment'
import { DEFROST_KINDS, INSTRUMENT_CHECK_DAYS, INSTRUMENT_KINDS, ON_LOSS, PAPERS, PLAIN_HOLDING, PRESSURE_UNITS, STAGES, TEMPERATURE_UNITS } from '../../../shared/schemas/equipment'
import { POINT_KINDS } from '../../../shared/schemas/point-kinds'
import type { HandPosition } from '../../../shared/schemas/point-kinds'
import type { StepPlan } from '../../../shared/schemas/work'

const stamps = () => ({
  createdAt: timestamp({ withTimezone: true }).notNull().defaultNow(),
  updatedAt: timestamp({ withTimezone: true }).notNull().defaultNow().$onUpdate(() => new Date()),
})

export const sites = pgTable('sites', {
  id: uuid().primaryKey().defaultRandom(),
  code: text().notNull(), // Q027: begins the code of each of its outages
  name: text().notNull(),
  address: text().notNull().default(''),
  timeZone: text().notNull(), // IANA
  temperatureUnit: text({ enum: TEMPERATURE_UNITS }).notNull(),
  pressureUnit: text({ enum: PRESSURE_UNITS }).notNull(),
  altitudeM: doublePrecision().notNull().default(0),
  rulebook: text().notNull(),
  intervalMinutes: integer().notNull().default(10),
  paper: text({ enum: PAPERS }).notNull().default('A4'),
  contactName: text().notNull().default(''),
  contactEmail: text().notNull().default(''),
  contactPhone: text().notNull().default(''),
  monitoringEmail: text().notNull().default(''),
  quietHours: jsonb().$type<QuietHours[]>().notNull().default([]),
  holding: jsonb().$type<SiteHolding>().notNull().default(PLAIN_HOLDING), // stricter than the rulebook; set by its own route, which keeps its history
  instrumentCheckDays: integer().notNull().default(INSTRUMENT_CHECK_DAYS),
  alertRules: jsonb().$type<AlertRules>().notNull().default(PLAIN_ALERT_RULES), // who is told of alerts; set by its own route, which keeps its history
  outageCount: integer().notNull().default(0), // the last number given to an outage here
  ...stamps(),
}, table => [
  uniqueIndex('sites_code').on(table.code),
  check('sites_interval', sql`${table.intervalMinutes} between 1 and 60`),
  check('sites_instrument_check', sql`${table.instrumentCheckDays} > 0`),
])

/** A controller: it may serve several racks. Its own removal is refused while anything hangs on it. */
export const controllers = pgTable('controllers', {
  id: uuid().primaryKey().defaultRandom(),
  siteId: uuid().notNull().references(() => sites.id, { onDelete: 'restrict' }),
  name: text().notNull(),
  place: text().notNull().default(''),
  panelVolts: integer(), // decides which approach distances are shown
  notes: text().notNull().default(''),
  ...stamps(),
}, table => [
  uniqueIndex('controllers_name').on(table.siteId, table.name),
])

export const racks = pgTable('racks', {
  id: uuid().primaryKey().defaultRandom(),
  controllerId: uuid().notNull().references(() => controllers.id, { onDelete: 'restrict' }),
  name: text().notNull(),
  refrigerant: text().notNull(),
  highCutOutPsig: doublePrecision(),
  warmestC: doublePrecision(), // the warmest place where liquid may stand, for carbon dioxide at a standstill
  reliefValves: text().array().notNull().default([]), // tag and setting in bar gauge
  ...stamps(),
}, table => [
  uniqueIndex('racks_name').on(table.controllerId, table.name),
])

export const suctionGroups = pgTable('suction_groups', {
  id: uuid().primaryKey().defaultRandom(),
  rackId: uuid().notNull().references(() => racks.id, { onDelete: 'restrict' }),
  name: text().notNull(),
  stage: text({ enum: STAGES }).notNull(),
  targetSuctionPsig: doublePrecision(),
  lowCutOutPsig: doublePrecision(),
  ...stamps(),
}, table => [
  uniqueIndex('suction_groups_name').on(table.rackId, table.name),
])

export const circuits = pgTable('circuits', {
  id: uuid().primaryKey().defaultRandom(),
  rackId: uuid().notNull().references(() => racks.id, { onDelete: 'restrict' }),
  suctionGroupId: uuid().references(() => suctionGroups.id, { onDelete: 'restrict' }),
  name: text().notNull(),
  defrostKind: text({ enum: DEFROST_KINDS }).notNull(),
  defrosts: jsonb().$type<DefrostSchedule>(),
  durationMin: integer().notNull().default(30),
  dripMin: integer().notNull().default(5),
  ...stamps(),
}, table => [
  uniqueIndex('circuits_name').on(table.rackId, table.name),
  index('circuits_suction_group').on(table.suctionGroupId),
])

export const cases = pgTable('cases', {
  id: uuid().primaryKey().defaultRandom(),
  controllerId: uuid().notNull().references(() => controllers.id, { onDelete: 'restrict' }),
  circuitId: uuid().references(() => circuits.id, { onDelete: 'set null' }),
  name: text().notNull(),
  kind: text({ enum: CASE_KINDS }).notNull(),
  foodClass: text().notNull(), // a class of the site's rulebook
  usualC: doublePrecision().notNull(), // the product's usual temperature, °C
  tauHours: doublePrecision(), // the case's own time constant; null: the kind's default, an estimate
  limitStricter: doublePrecision(), // in the rulebook's unit; only ever stricter than the rulebook
  runsAlone: boolean().notNull().default(false), // its own controller keeps it going
  ...stamps(),
}, table => [
  uniqueIndex('cases_name').on(table.controllerId, table.name),
  index('cases_circuit').on(table.circuitId),
  check('cases_tau', sql`${table.tauHours} is null or ${table.tauHours} > 0`),
])

export const points = pgTable('points', {
  id: uuid().primaryKey().defaultRandom(),
  controllerId: uuid().notNull().references(() => controllers.id, { onDelete: 'restrict' }),
  tag: text().notNull(),
  kind: text({ enum: POINT_KINDS }).notNull(),
  name: text().notNull(),
  address: text().notNull().default(''), // on the controller
  place: text().notNull().default(''), // where a person finds its means of override
  means: text().notNull().default(''), // how it is overridden: selector, jumper, valve stem
  guards: text().array().notNull().default([]), // protections that still work in hand
  rackId: uuid().references(() => racks.id, { onDelete: 'set null' }),
  suctionGroupId: uuid().references(() => suctionGroups.id, { onDelete: 'set null' }),
  circuitId: uuid().references(() => circuits.id, { onDelete: 'set null' }),
  caseIds: uuid().array().notNull().default([]),
  drives: text(), // the tag of the machine that this drive drives
  ratedA: doublePrecision(),
  capacityKw: doublePrecision(),
  minOffMin: doublePrecision(),
  hand: jsonb().$type<HandPosition>(), // usual hand position; null: as the product proposes
  onLoss: text({ enum: ON_LOSS }).notNull().default('unknown'), // what the output does when the controller dies
  throughOff: boolean().notNull().default(false), // the selector passes through off
  ...stamps(),
}, table => [
  uniqueIndex('points_tag').on(table.controllerId, table.tag),
  index('points_circuit').on(table.circuitId),
])

export const instruments = pgTable('instruments', {
  id: uuid().primaryKey().defaultRandom(),
  siteId: uuid().notNull().references(() => sites.id, { onDelete: 'restrict' }),
  name: text().notNull(),
  kind: text({ enum: INSTRUMENT_KINDS }).notNull(),
  serial: text().notNull().default(''),
  accuracyC: doublePrecision().notNull(), // ± kelvin
  lastCheckOn: date({ mode: 'string' }),
  ...stamps(),
}, table => [
  uniqueIndex('instruments_name').on(table.siteId, table.name),
])

/** Kinds of work, shared by all sites: steps with three durations, and the way back. */
export const workKinds = pgTable('work_kinds', {
  id: uuid().primaryKey().defaultRandom(),
  name: text().notNull(),
  steps: jsonb().$type<StepPlan[]>().notNull(),
  rollBack: jsonb().$type<StepPlan[]>().notNull().default([]),
  ...stamps(),
}, table => [
  uniqueIndex('work_kinds_name').on(table.name),
])
