import { asc, eq, inArray } from 'drizzle-orm'
import type { Snapshot } from '../../../shared/record/snapshot'
import { isFrozenKind } from '../../../shared/schemas/case-kinds'
import { cases, circuits, controllers, instruments, points, racks, sites, suctionGroups } from '../../database/schema'
import type { Queries } from '../database'
import { RELIEF_VALVE } from '../../../shared/schemas/equipment'
import { tauOrigins } from '../learn/lessons'
import { DEFAULT_TAU_HOURS } from '../hold'
import { caseLimit, classById, rulebookById } from '../holding'

/** Hours that stand for a frozen case whose hold comes from its enthalpy, not from a time constant. */
const FROZEN_TAU_HOURS = 24

/** "RV-1 40" as the record holds it. */
function reliefValveOf(written: string): { tag: string, barGauge: number }[] {
  const [, tag, setting] = RELIEF_VALVE.exec(written) ?? []
  return tag && setting ? [{ tag, barGauge: Number(setting.replace(',', '.')) }] : []
}

/** The equipment of a controller as it stands now: what an opening entry carries. Null: no such controller. */
export async function snapshotOf(db: Queries, controllerId: string): Promise<Snapshot | null> {
  const [found] = await db.select({ controller: controllers, site: sites }).from(controllers).innerJoin(sites, eq(sites.id, controllers.siteId)).where(eq(controllers.id, controllerId))
  if (!found) return null
  const { controller, site } = found
  const rackRows = await db.select().from(racks).where(eq(racks.controllerId, controllerId)).orderBy(asc(racks.name), asc(racks.id))
  const rackIds = rackRows.map(rack => rack.id)
  const groupRows = rackIds.length ? await db.select().from(suctionGroups).where(inArray(suctionGroups.rackId, rackIds)).orderBy(asc(suctionGroups.name), asc(suctionGroups.id)) : []
  const circuitRows = rackIds.length ? await db.select().from(circuits).where(inArray(circuits.rackId, rackIds)).orderBy(asc(circuits.name), asc(circuits.id)) : []
  const caseRows = await db.select().from(cases).where(eq(cases.controllerId, controllerId)).orderBy(asc(cases.name), asc(cases.id))
  const pointRows = await db.select().from(points).where(eq(points.controllerId, controllerId)).orderBy(asc(points.tag))
  const instrumentRows = await db.select().from(instruments).where(eq(instruments.siteId, site.id)).orderBy(asc(instruments.name))
  const origins = await tauOrigins(db, caseRows)
  const rulebook = rulebookById(site.rulebook)
  if (!rulebook) throw new Error(`Site ${site.code} names the rulebook ${site.rulebook}, which this program does not hold`)
  return {
    site: {
      id: site.id, code: site.code, name: site.name, address: site.address, timeZone: site.timeZone,
      temperatureUnit: site.temperatureUnit, pressureUnit: site.pressureUnit, altitudeM: site.altitudeM, intervalMinutes: site.intervalMinutes,
      paper: site.paper, contactName: site.contactName, contactPhone: site.contactPhone, quietHours: site.quietHours,
      holding: site.holding, instrumentCheckDays: site.instrumentCheckDays,
    },
    controller: { id: controller.id, name: controller.name, place: controller.place, panelVolts: controller.panelVolts },
    rulebook: { id: rulebook.id, version: rulebook.version, name: rulebook.name },
    racks: rackRows.map(({ id, name, refrigerant, highCutOutPsig, warmestC, reliefValves }) => ({ id, name, refrigerant, highCutOutPsig, warmestC, reliefValves: reliefValves.flatMap(reliefValveOf) })),
    suctionGroups: groupRows.map(({ id, rackId, name, stage, targetSuctionPsig, lowCutOutPsig }) => ({ id, rackId, name, stage, targetSuctionPsig, lowCutOutPsig })),
    circuits: circuitRows.map(({ id, rackId, suctionGroupId, name, defrostKind, defrosts, durationMin, dripMin }) => ({ id, rackId, suctionGroupId, name, defrostKind, defrosts, durationMin, dripMin })),
    cases: caseRows.map((item) => {
      const foodClass = classById(rulebook, item.foodClass)
      if (!foodClass) throw new Error(`${item.name} is of the class ${item.foodClass}, which ${rulebook.name} does not hold`)
      const { value, stricter } = caseLimit(foodClass, site.holding, item.limitStricter)
      return {
        id: item.id, name: item.name, kind: item.kind, foodClass: item.foodClass, usualC: item.usualC,
        limit: { value, unit: rulebook.unit }, stricter,
        tauHours: item.tauHours ?? (isFrozenKind(item.kind) ? FROZEN_TAU_HOURS : DEFAULT_TAU_HOURS[item.kind]), tauIsOwn: item.tauHours !== null, tauFrom: origins.get(item.id) ?? 0,
        runsAlone: item.runsAlone, circuitId: item.circuitId,
      }
    }),
    points: pointRows.map(({ tag, kind, name, address, place, means, guards, rackId, suctionGroupId, circuitId, caseIds, drives, ratedA, capacityKw, minOffMin, hand, onLoss, throughOff }) => ({ tag, kind, name, address, place, means, guards, rackId, suctionGroupId, circuitId, caseIds, drives, ratedA, capacityKw, minOffMin, hand, onLoss, throughOff })),
    instruments: instrumentRows.map(({ id, name, kind, accuracyC, lastCheckOn }) => ({ id, name, kind, accuracyC, lastCheckOn })),
  }
}
