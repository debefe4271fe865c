import { isFrozenKind } from '~~/shared/schemas/case-kinds'
import { caseSchema, circuitSchema, controllerSchema, INSTRUMENT_CHECK_DAYS, PLAIN_HOLDING, pointSchema, rackSchema, siteSchema, suctionGroupSchema } from '~~/shared/schemas/equipment'
import { snapshotSchema, type Snapshot } from '~~/shared/record/snapshot'
import type { SiteSeed } from '~~/server/database/seed/equipment'
import { DEFAULT_TAU_HOURS } from '~~/server/utils/hold'
import { limitFor, rulebookById } from '~~/server/utils/holding'

/** The first controller of a seeded site as an outage takes it over, with ids counted up. */
export function snapshotOfSeed({ site: siteSeed, controllers: [seed] }: SiteSeed): Snapshot {
  let last = 0
  const ids = new Map<string, string>()
  const newId = () => `00000000-0000-4000-8000-${String(++last).padStart(12, '0')}`
  const keep = (name: string) => { const id = newId(); ids.set(name, id); return id }
  const idOf = (name: string | null | undefined) => {
    if (!name) return null
    const id = ids.get(name)
    if (!id) throw new Error(`The seed names ${name}, which it does not hold`)
    return id
  }
  const controllerId = newId()
  const rulebook = rulebookById(siteSeed.rulebook)!
  const site = siteSchema.parse(siteSeed)
  const { name, place, panelVolts } = controllerSchema.parse(seed!.controller)
  const racks = seed!.racks.map(({ rack }) => {
    const { controllerId: _, ...rest } = rackSchema.parse({ ...rack, controllerId })
    return { ...rest, reliefValves: [], id: keep(rest.name) }
  })
  const suctionGroups = seed!.racks.flatMap(({ rack, suctionGroups }) => suctionGroups.map(group => ({ ...suctionGroupSchema.parse({ ...group, rackId: idOf(rack.name) }), id: keep(group.name) })))
  const circuits = seed!.racks.flatMap(({ rack, circuits }) => circuits.map(({ suctionGroup, ...circuit }) => ({ ...circuitSchema.parse({ ...circuit, rackId: idOf(rack.name), suctionGroupId: idOf(suctionGroup) }), id: keep(circuit.name) })))
  const cases = seed!.cases.map(({ circuit, ...item }) => {
    const { controllerId: _, limitStricter, tauHours, ...rest } = caseSchema.parse({ ...item, controllerId, circuitId: idOf(circuit) })
    const legal = limitFor(rulebook.id, rest.foodClass)
    return {
      ...rest, id: keep(rest.name), limit: { value: Math.min(legal.value, limitStricter ?? legal.value), unit: legal.unit }, stricter: limitStricter !== null,
      tauHours: tauHours ?? (isFrozenKind(rest.kind) ? 24 : DEFAULT_TAU_HOURS[rest.kind]), tauIsOwn: tauHours !== null, tauFrom: 0,
    }
  })
  const points = seed!.points.map(({ rack, suctionGroup, circuit, cases: served = [], ...point }) => {
    const { controllerId: _, ...rest } = pointSchema.parse({ ...point, controllerId, rackId: idOf(rack), suctionGroupId: idOf(suctionGroup), circuitId: idOf(circuit), caseIds: served.map(idOf) })
    return rest
  })
  const { code, name: siteName, address, timeZone, temperatureUnit, pressureUnit, altitudeM, intervalMinutes, paper, contactName, contactPhone, quietHours } = site
  return snapshotSchema.parse({
    site: { id: newId(), code, name: siteName, address, timeZone, temperatureUnit, pressureUnit, altitudeM, intervalMinutes, paper, contactName, contactPhone, quietHours, holding: PLAIN_HOLDING, instrumentCheckDays: INSTRUMENT_CHECK_DAYS },
    controller: { id: controllerId, name, place, panelVolts },
    rulebook: { id: rulebook.id, version: rulebook.version, name: rulebook.name },
    racks, suctionGroups, circuits, cases, points, instruments: [],
  })
}
