import { handFault } from '../../../shared/schemas/hand-for-kind'
import type { ResourceItem, ResourceValue, SiteView } from '../../../shared/schemas/site-view'
import type { Fault } from './fault'
import { sameName } from './fault'

type Point = ResourceValue<'points'>

/** A point in the midst of its site: all that it names belongs to its own controller and agrees. */
export function checkPoint(point: Point, site: SiteView, self: string | null): Fault[] {
  if (!site.controllers.some(item => item.id === point.controllerId)) return [{ field: 'controllerId', reason: 'Choose a controller of this site' }]
  const siblings = site.points.filter(item => item.controllerId === point.controllerId && item.id !== self)
  const clash = siblings.some(item => sameName(item.tag, point.tag))
  return [
    ...clash ? [{ field: 'tag', reason: 'The controller has a point of this tag already', clash: true }] : [],
    ...surroundingFaults(point, site, siblings),
  ]
}

/** All of that but the tag, which an import has matched before. @param siblings points of the same controller */
export function surroundingFaults(point: Point, site: SiteView, siblings: readonly ResourceItem<'points'>[]): Fault[] {
  const wrongHand = point.hand === null ? null : handFault(point.kind, point.hand)
  return [
    ...wrongHand ? [{ field: 'hand', reason: wrongHand }] : [],
    ...placeFaults(point, site),
    ...driveFaults(point, siblings),
  ]
}

/** The rack and suction group of a point follow from its circuit or group where they are not named. */
export function placed<T extends Pick<Point, 'rackId' | 'suctionGroupId' | 'circuitId'>>(point: T, site: SiteView): T {
  const circuit = site.circuits.find(item => item.id === point.circuitId)
  const suctionGroupId = point.suctionGroupId ?? circuit?.suctionGroupId ?? null
  const group = site.suctionGroups.find(item => item.id === suctionGroupId)
  return { ...point, suctionGroupId, rackId: point.rackId ?? circuit?.rackId ?? group?.rackId ?? null }
}

function placeFaults(point: Point, site: SiteView): Fault[] {
  const racks = new Set(site.racks.filter(item => item.controllerId === point.controllerId).map(item => item.id))
  const group = site.suctionGroups.find(item => item.id === point.suctionGroupId)
  const circuit = site.circuits.find(item => item.id === point.circuitId)
  const faults: Fault[] = []
  if (point.rackId !== null && !racks.has(point.rackId)) faults.push({ field: 'rackId', reason: 'Choose a rack of the same controller' })
  if (point.suctionGroupId !== null && !(group && racks.has(group.rackId))) faults.push({ field: 'suctionGroupId', reason: 'Choose a suction group of the same controller' })
  else if (group && point.rackId !== null && group.rackId !== point.rackId) faults.push({ field: 'suctionGroupId', reason: 'The suction group belongs to another rack' })
  if (point.circuitId !== null && !(circuit && racks.has(circuit.rackId))) faults.push({ field: 'circuitId', reason: 'Choose a circuit of the same controller' })
  else if (circuit && point.rackId !== null && circuit.rackId !== point.rackId) faults.push({ field: 'circuitId', reason: 'The circuit belongs to another rack' })
  else if (circuit?.suctionGroupId && group && circuit.suctionGroupId !== group.id) faults.push({ field: 'circuitId', reason: 'The circuit belongs to another suction group' })
  if (point.caseIds.some(id => !site.cases.some(item => item.id === id && item.controllerId === point.controllerId))) faults.push({ field: 'caseIds', reason: 'Choose cases of the same controller' })
  if (new Set(point.caseIds).size < point.caseIds.length) faults.push({ field: 'caseIds', reason: 'A case stands twice' })
  return faults
}

/** A drive drives another point of its controller, and no ring of drives comes of it. */
function driveFaults(point: Point, siblings: readonly ResourceItem<'points'>[]): Fault[] {
  if (point.drives === null) return []
  if (point.kind !== 'drive') return [{ field: 'drives', reason: 'Only a drive drives another point' }]
  const byTag = new Map(siblings.map(item => [item.tag, item]))
  const seen = new Set([point.tag])
  for (let tag: string | null = point.drives; tag !== null; tag = byTag.get(tag)?.drives ?? null) {
    if (seen.has(tag)) return [{ field: 'drives', reason: 'Drives may not drive each other in a ring' }]
    seen.add(tag)
    if (!byTag.has(tag)) return [{ field: 'drives', reason: tag === point.drives ? `The controller has no point ${tag}` : `${tag}, which is driven in turn, is not there` }]
  }
  return []
}
