import { z } from 'zod'
import { CASE_KINDS } from '../schemas/case-kinds'
import { DEFROST_KINDS, defrostScheduleSchema, INSTRUMENT_KINDS, ON_LOSS, PAPERS, PRESSURE_UNITS, quietHoursSchema, RELIEF_VALVES_MAX, siteHoldingSchema, STAGES, TEMPERATURE_UNITS } from '../schemas/equipment'
import { handPositionSchema, POINT_KINDS } from '../schemas/point-kinds'
import { tag, uuid } from './kinds/common'

const text = z.string().max(400)

export const snapshotPointSchema = z.object({
  tag,
  kind: z.enum(POINT_KINDS),
  name: text,
  address: text,
  place: text,
  means: text,
  guards: z.array(text).max(12),
  rackId: uuid.nullable(),
  suctionGroupId: uuid.nullable(),
  circuitId: uuid.nullable(),
  caseIds: z.array(uuid).max(200),
  drives: tag.nullable(),
  ratedA: z.number().nullable(),
  capacityKw: z.number().nullable(),
  minOffMin: z.number().nullable(),
  hand: handPositionSchema.nullable(),
  onLoss: z.enum(ON_LOSS),
  throughOff: z.boolean(),
}).strict()

const caseShape = {
  id: uuid,
  name: text,
  kind: z.enum(CASE_KINDS),
  foodClass: text,
  usualC: z.number(),
  limit: z.object({ value: z.number(), unit: z.enum(TEMPERATURE_UNITS) }).strict(),
  stricter: z.boolean(), // the site's own limit, stricter than the rulebook's
  tauHours: z.number().positive(),
  tauIsOwn: z.boolean(), // false: the kind's default, an estimate
  runsAlone: z.boolean(),
  circuitId: uuid.nullable(),
}

export const snapshotCaseSchema = z.object({
  ...caseShape,
  tauFrom: z.number().int().min(0), // outages whose readings its own time constant comes from; 0: entered, or an estimate
}).strict()

const rackShape = { id: uuid, name: text, refrigerant: text, highCutOutPsig: z.number().nullable() }

const racksAndCases = {
  racks: z.array(z.object({
    ...rackShape,
    warmestC: z.number().nullable(), // the warmest place where liquid may stand
    reliefValves: z.array(z.object({ tag: text, barGauge: z.number().positive() }).strict()).max(RELIEF_VALVES_MAX),
  }).strict()).max(50),
  cases: z.array(snapshotCaseSchema).max(400),
}

const racksAndCasesV1 = {
  racks: z.array(z.object(rackShape).strict()).max(50),
  cases: z.array(z.object(caseShape).strict()).max(400),
}

const siteShape = {
  id: uuid,
  code: text,
  name: text,
  address: text,
  timeZone: text,
  temperatureUnit: z.enum(TEMPERATURE_UNITS),
  pressureUnit: z.enum(PRESSURE_UNITS),
  altitudeM: z.number(),
  intervalMinutes: z.number().int().positive(),
  paper: z.enum(PAPERS),
  contactName: text,
  contactPhone: text,
  quietHours: z.array(quietHoursSchema).max(20),
}

const equipmentShape = {
  controller: z.object({ id: uuid, name: text, place: text, panelVolts: z.number().nullable() }).strict(),
  rulebook: z.object({ id: text, version: text, name: text }).strict(),
  suctionGroups: z.array(z.object({
    id: uuid,
    rackId: uuid,
    name: text,
    stage: z.enum(STAGES),
    targetSuctionPsig: z.number().nullable(),
    lowCutOutPsig: z.number().nullable(),
  }).strict()).max(100),
  circuits: z.array(z.object({
    id: uuid,
    rackId: uuid,
    suctionGroupId: uuid.nullable(),
    name: text,
    defrostKind: z.enum(DEFROST_KINDS),
    defrosts: defrostScheduleSchema.nullable(),
    durationMin: z.number(),
    dripMin: z.number(),
  }).strict()).max(400),
  points: z.array(snapshotPointSchema).max(2000),
  instruments: z.array(z.object({ id: uuid, name: text, kind: z.enum(INSTRUMENT_KINDS), accuracyC: z.number(), lastCheckOn: text.nullable() }).strict()).max(100),
}

/** The equipment as openings of version 1 hold it: without the site's own way of judging, and without what sealed outages taught. */
export const snapshotSchemaV1 = z.object({ site: z.object(siteShape).strict(), ...equipmentShape, ...racksAndCasesV1 }).strict()

/**
 * The equipment as it stood when the outage was opened: the record needs nothing else to be read.
 * Temperatures in °C unless a unit stands beside them, pressures in psig, times in minutes. A case's
 * limit is the one that counts: the strictest of the rulebook's, the site's for its class and its own.
 */
export const snapshotSchema = z.object({
  site: z.object({
    ...siteShape,
    holding: siteHoldingSchema,
    instrumentCheckDays: z.number().int().positive(), // a last check that is older is pointed out
  }).strict(),
  ...equipmentShape,
  ...racksAndCases,
}).strict()

export type Snapshot = z.output<typeof snapshotSchema>
export type SnapshotPoint = z.output<typeof snapshotPointSchema>
export type SnapshotCase = z.output<typeof snapshotCaseSchema>
