/** Lays the rows of a point list over the points of a controller: what is new, what changes, what cannot land. */
import type { PointCells, PointColumn } from '../../../shared/import/columns'
import { handCell, POINT_COLUMNS } from '../../../shared/import/columns'
import type { ImportFault, PointList } from '../../../shared/import/points'
import type { ImportPreview, LandedRow } from '../../../shared/import/preview'
import { pointSchema, POINTS_MAX } from '../../../shared/schemas/equipment'
import type { ResourceItem, ResourceValue, SiteView } from '../../../shared/schemas/site-view'
import { placed, surroundingFaults } from './check-point'
import { sameName } from './fault'

type Point = ResourceValue<'points'>
/** A row with what is to be stored. `id`: the stored point that it changes; null: a new one. */
export interface Landing { landed: LandedRow, id: string | null, point: Point }

/** The column that a field of a point comes from, for the faults of its schema and of its surroundings. */
const COLUMN_OF: Partial<Record<keyof Point, PointColumn>> = {
  tag: 'tag', kind: 'kind', name: 'name', address: 'address', place: 'place', means: 'means', guards: 'guards', rackId: 'rack', suctionGroupId: 'suction_group',
  circuitId: 'circuit', caseIds: 'cases', ratedA: 'rated_a', capacityKw: 'capacity_kw', minOffMin: 'min_off_min', hand: 'hand', onLoss: 'on_loss', throughOff: 'through_off',
}

/** What a list would do to a controller. Nothing is stored. */
export function landPoints(list: PointList, site: SiteView, controllerId: string): { landings: Landing[], faults: ImportFault[] } {
  const stored = site.points.filter(point => point.controllerId === controllerId)
  const byTag = new Map(stored.map(point => [point.tag.toLowerCase(), point]))
  const faults = [...list.faults]
  const landings: Landing[] = []
  for (const { row, cells } of list.rows) {
    const before = byTag.get(cells.tag.toLowerCase())
    const result = landRow(cells, before, site, controllerId, stored)
    if ('faults' in result) faults.push(...result.faults.map(fault => ({ row, ...fault })))
    else landings.push({ id: before?.id ?? null, point: result.point, landed: landedRow(row, before, result.point, site) })
  }
  const added = landings.filter(landing => landing.id === null).length
  if (stored.length + added > POINTS_MAX) faults.push({ row: null, column: null, reason: `The controller would have more than ${POINTS_MAX.toLocaleString('en')} points` })
  return { landings, faults: faults.sort((a, b) => (a.row ?? 0) - (b.row ?? 0)) }
}

/** The answer to a preview. */
export function previewOf(landings: readonly Landing[], faults: ImportFault[], site: SiteView, controllerId: string): ImportPreview {
  const rows = landings.map(landing => landing.landed)
  const named = new Set(landings.map(landing => landing.id))
  const size = (outcome: LandedRow['outcome']) => rows.filter(row => row.outcome === outcome).length
  return {
    rows,
    faults,
    counts: { new: size('new'), changed: size('changed'), unchanged: size('unchanged') },
    untouched: site.points.filter(point => point.controllerId === controllerId && !named.has(point.id)).length,
  }
}

type RowFault = Omit<ImportFault, 'row'>

function landRow(cells: PointCells, before: ResourceItem<'points'> | undefined, site: SiteView, controllerId: string, siblings: ResourceItem<'points'>[]): { point: Point } | { faults: RowFault[] } {
  const names = matchNames(cells, site, controllerId)
  // A file that moves a point to another circuit need not have columns for the rack and group that follow from it.
  const moved = before && names.ids.circuitId !== undefined && names.ids.circuitId !== before.circuitId
  const own = {
    kind: cells.kind, name: cells.name, address: cells.address, place: cells.place, means: cells.means, guards: cells.guards, hand: cells.hand,
    ratedA: cells.rated_a, capacityKw: cells.capacity_kw, minOffMin: cells.min_off_min, onLoss: cells.on_loss, throughOff: cells.through_off, ...names.ids,
  }
  const given = Object.fromEntries(Object.entries(own).filter(([, value]) => value !== undefined))
  // A stored tag keeps its spelling: open outages and drives name it.
  const parsed = pointSchema.safeParse({ ...before, ...moved ? { rackId: null, suctionGroupId: null } : {}, ...cells.kind === 'drive' ? {} : { drives: null }, tag: before?.tag ?? cells.tag, ...given, controllerId })
  const schemaFaults = parsed.success ? [] : parsed.error.issues.map(issue => ({ column: columnOf(String(issue.path[0])), reason: issue.message }))
  const faults = [...names.faults, ...schemaFaults]
  if (!parsed.success || faults.length > 0) return { faults }
  const point = placed(parsed.data, site)
  const around = surroundingFaults(point, site, siblings).map(fault => ({ column: columnOf(fault.field), reason: fault.reason }))
  return around.length > 0 ? { faults: around } : { point }
}

function columnOf(field: string): string {
  return COLUMN_OF[field as keyof Point] ?? field
}

/** The names in a row as ids of the controller's equipment; a name without one, or with two, is a fault. */
function matchNames(cells: PointCells, site: SiteView, controllerId: string) {
  const faults: RowFault[] = []
  const racks = site.racks.filter(rack => rack.controllerId === controllerId)
  const find = (column: PointColumn, what: string, name: string | null | undefined, among: readonly { id: string, name: string }[]): string | null | undefined => {
    if (name === undefined || name === null) return name
    const found = among.filter(item => sameName(item.name, name))
    if (found.length === 1) return found[0]!.id
    faults.push({ column, reason: found.length > 1 ? `Two racks have a ${what} ${name}; name the rack too` : `The controller has no ${what} ${name}` })
    return null
  }
  const rackId = find('rack', 'rack', cells.rack, racks)
  const onRack = (item: { rackId: string }) => rackId ? item.rackId === rackId : racks.some(rack => rack.id === item.rackId)
  const ids = {
    rackId,
    suctionGroupId: find('suction_group', 'suction group', cells.suction_group, site.suctionGroups.filter(onRack)),
    circuitId: find('circuit', 'circuit', cells.circuit, site.circuits.filter(onRack)),
    caseIds: cells.cases?.flatMap(name => find('cases', 'case', name, site.cases.filter(item => item.controllerId === controllerId)) ?? []),
  }
  return { ids, faults }
}

function landedRow(row: number, before: ResourceItem<'points'> | undefined, point: Point, site: SiteView): LandedRow {
  const cells = cellsOf(point, site)
  const earlier = before ? cellsOf(before, site) : null
  const changes = earlier ? POINT_COLUMNS.filter(column => earlier[column] !== cells[column]).map(column => ({ column, from: earlier[column], to: cells[column] })) : []
  return { row, tag: point.tag, outcome: !before ? 'new' : changes.length > 0 ? 'changed' : 'unchanged', cells, changes }
}

/** A point as a row of the file would write it. */
export function cellsOf(point: Point, site: SiteView): Record<PointColumn, string> {
  const nameOf = (list: readonly { id: string, name: string }[], id: string | null) => list.find(item => item.id === id)?.name ?? ''
  return {
    tag: point.tag, kind: point.kind, name: point.name, address: point.address, place: point.place, means: point.means, guards: point.guards.join('; '),
    rack: nameOf(site.racks, point.rackId), suction_group: nameOf(site.suctionGroups, point.suctionGroupId), circuit: nameOf(site.circuits, point.circuitId),
    cases: point.caseIds.map(id => nameOf(site.cases, id)).join('; '), rated_a: point.ratedA?.toString() ?? '', capacity_kw: point.capacityKw?.toString() ?? '',
    min_off_min: point.minOffMin?.toString() ?? '', hand: point.hand === null ? '' : handCell(point.hand), on_loss: point.onLoss, through_off: point.throughOff ? 'yes' : 'no',
  }
}
