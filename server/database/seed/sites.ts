import { caseSchema, circuitSchema, controllerSchema, instrumentSchema, pointSchema, rackSchema, siteSchema, suctionGroupSchema } from '../../../shared/schemas/equipment'
import { workKindSchema } from '../../../shared/schemas/work'
import { cases, circuits, controllers, instruments, points, racks, sites, suctionGroups, workKinds } from '../schema'
import type { Queries } from '../../utils/database'
import { abbotGreen } from './abbot-green'
import type { ControllerSeed, PointSeed, SiteSeed } from './equipment'
import { millLane } from './mill-lane'
import { quarryStreet } from './quarry-street'
import { WORK_KINDS } from './work-kinds'

const DAY = 86_400_000

/** Ids of what was stored, by the names in the seed files. Names are unique within each of the demo's sites. */
export interface SeededSite {
  id: string
  controllers: Record<string, string>
  racks: Record<string, string>
  suctionGroups: Record<string, string>
  circuits: Record<string, string>
  cases: Record<string, string>
  instruments: Record<string, string>
}

export interface SeededEquipment {
  sites: Record<'Quarry Street' | 'Mill Lane' | 'Abbot Green', SeededSite>
  workKinds: Record<(typeof WORK_KINDS)[number]['name'], string>
}

/** Stores the three sites of Quillfeather Grocers and the kinds of work. For an empty database. @param now Unix ms */
export async function seedSites(db: Queries, now = Date.now()): Promise<SeededEquipment> {
  const stored = {
    'Quarry Street': await storeSite(db, quarryStreet, now),
    'Mill Lane': await storeSite(db, millLane, now),
    'Abbot Green': await storeSite(db, abbotGreen, now),
  }
  const kinds = await db.insert(workKinds).values(WORK_KINDS.map(kind => workKindSchema.parse(kind))).returning({ id: workKinds.id, name: workKinds.name })
  return { sites: stored, workKinds: byName(kinds) as SeededEquipment['workKinds'] }
}

async function storeSite(db: Queries, seed: SiteSeed, now: number): Promise<SeededSite> {
  const [site] = await db.insert(sites).values(siteSchema.parse(seed.site)).returning({ id: sites.id })
  const found: SeededSite = { id: site!.id, controllers: {}, racks: {}, suctionGroups: {}, circuits: {}, cases: {}, instruments: {} }
  for (const controller of seed.controllers) await storeController(db, controller, found)
  const tools = seed.instruments.map(({ checkedDaysAgo, ...instrument }) => ({
    ...instrumentSchema.parse({ ...instrument, lastCheckOn: new Date(now - checkedDaysAgo * DAY).toISOString().slice(0, 10) }),
    siteId: found.id,
  }))
  found.instruments = byName(await db.insert(instruments).values(tools).returning({ id: instruments.id, name: instruments.name }))
  return found
}

async function storeController(db: Queries, seed: ControllerSeed, site: SeededSite): Promise<void> {
  const [controller] = await db.insert(controllers).values({ ...controllerSchema.parse(seed.controller), siteId: site.id }).returning({ id: controllers.id, name: controllers.name })
  const controllerId = controller!.id
  site.controllers[controller!.name] = controllerId
  for (const { rack, suctionGroups: groups, circuits: lines } of seed.racks) {
    const [stored] = await db.insert(racks).values(rackSchema.parse({ ...rack, controllerId })).returning({ id: racks.id, name: racks.name })
    const rackId = stored!.id
    site.racks[stored!.name] = rackId
    const storedGroups = await db.insert(suctionGroups).values(groups.map(group => suctionGroupSchema.parse({ ...group, rackId }))).returning({ id: suctionGroups.id, name: suctionGroups.name })
    Object.assign(site.suctionGroups, byName(storedGroups))
    const storedCircuits = await db.insert(circuits)
      .values(lines.map(({ suctionGroup, ...circuit }) => circuitSchema.parse({ ...circuit, rackId, suctionGroupId: idOf(site.suctionGroups, suctionGroup) })))
      .returning({ id: circuits.id, name: circuits.name })
    Object.assign(site.circuits, byName(storedCircuits))
  }
  const storedCases = await db.insert(cases)
    .values(seed.cases.map(({ circuit, ...item }) => caseSchema.parse({ ...item, controllerId, circuitId: circuit && idOf(site.circuits, circuit) })))
    .returning({ id: cases.id, name: cases.name })
  Object.assign(site.cases, byName(storedCases))
  await db.insert(points).values(seed.points.map(point => pointSchema.parse(withIds(point, controllerId, site))))
}

function withIds({ rack, suctionGroup, circuit, cases: served, ...point }: PointSeed, controllerId: string, site: SeededSite) {
  return {
    ...point,
    controllerId,
    rackId: rack ? idOf(site.racks, rack) : null,
    suctionGroupId: suctionGroup ? idOf(site.suctionGroups, suctionGroup) : null,
    circuitId: circuit ? idOf(site.circuits, circuit) : null,
    caseIds: (served ?? []).map(name => idOf(site.cases, name)),
  }
}

function byName(rows: { id: string, name: string }[]): Record<string, string> {
  return Object.fromEntries(rows.map(row => [row.name, row.id]))
}

function idOf(known: Record<string, string>, name: string): string {
  const id = known[name]
  if (!id) throw new Error(`The seed names ${name}, which it does not hold`)
  return id
}
