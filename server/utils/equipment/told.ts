import type { SiteView } from '../../../shared/schemas/site-view'

const LISTS = { controllerId: 'controllers', rackId: 'racks', suctionGroupId: 'suctionGroups', circuitId: 'circuits' } as const

/** A value as a history tells it: what it refers to by name, since the thing itself may go. */
export function toldValue(value: object, site: SiteView): Record<string, unknown> {
  const told: Record<string, unknown> = { ...value }
  delete told.id
  for (const [field, list] of Object.entries(LISTS)) {
    if (typeof told[field] === 'string') told[field] = site[list].find(item => item.id === told[field])?.name ?? told[field]
  }
  if (Array.isArray(told.caseIds)) told.caseIds = told.caseIds.map(id => site.cases.find(item => item.id === id)?.name ?? id)
  return told
}
