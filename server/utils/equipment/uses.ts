import type { ResourceName, SiteView } from '../../../shared/schemas/site-view'

const counted = (size: number, one: string, many: string) => size === 0 ? [] : [`${size} ${size === 1 ? one : many}`]

/** Outages of a controller, which only the database knows. */
export type OutageCounts = (controllerId: string) => number

/** What uses a thing of a site, in words; nothing: it may be deleted. */
export function usesOf(resource: ResourceName, id: string, site: SiteView, outages: OutageCounts): string[] {
  const points = (uses: (point: SiteView['points'][number]) => boolean) => counted(site.points.filter(uses).length, 'point', 'points')
  switch (resource) {
    case 'controllers':
      return [
        ...counted(site.racks.filter(rack => rack.controllerId === id).length, 'rack', 'racks'),
        ...counted(site.cases.filter(item => item.controllerId === id).length, 'case', 'cases'),
        ...points(point => point.controllerId === id),
        ...counted(outages(id), 'outage', 'outages'),
      ]
    case 'racks':
      return [
        ...counted(site.suctionGroups.filter(group => group.rackId === id).length, 'suction group', 'suction groups'),
        ...counted(site.circuits.filter(circuit => circuit.rackId === id).length, 'circuit', 'circuits'),
        ...points(point => point.rackId === id),
      ]
    case 'suction-groups':
      return [...counted(site.circuits.filter(circuit => circuit.suctionGroupId === id).length, 'circuit', 'circuits'), ...points(point => point.suctionGroupId === id)]
    case 'circuits':
      return [...counted(site.cases.filter(item => item.circuitId === id).length, 'case', 'cases'), ...points(point => point.circuitId === id)]
    case 'cases':
      return points(point => point.caseIds.includes(id))
    case 'points': {
      const point = site.points.find(item => item.id === id)
      return site.points.filter(item => item.controllerId === point?.controllerId && item.drives === point.tag).map(item => `the drive ${item.tag}`)
    }
    case 'instruments':
      return []
  }
}
