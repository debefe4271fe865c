/** What must hold between a value and the rest of its site. Pure: the site as it stands is an argument. */
import type { ResourceName, ResourceValue, SiteValue, SiteView } from '../../../shared/schemas/site-view'
import { isRefrigerantId, REFRIGERANT_IDS } from '../../../shared/schemas/refrigerants'
import { classById, rulebookById, rulebooks } from '../holding'
import { checkPoint } from './check-point'
import type { Fault } from './fault'
import { nameClash } from './fault'

/** Faults of a value, the gravest first; none: it may be stored. @param self its own id when it is stored already */
export type Check<R extends ResourceName> = (value: ResourceValue<R>, site: SiteView, self: string | null) => Fault[]

const unknownController = (site: SiteView, id: string): Fault[] => site.controllers.some(item => item.id === id) ? [] : [{ field: 'controllerId', reason: 'Choose a controller of this site' }]
const unknownRack = (site: SiteView, id: string): Fault[] => site.racks.some(item => item.id === id) ? [] : [{ field: 'rackId', reason: 'Choose a rack of this site' }]

const checkRack: Check<'racks'> = (rack, site, self) => [
  ...unknownController(site, rack.controllerId),
  ...isRefrigerantId(rack.refrigerant) ? [] : [{ field: 'refrigerant', reason: `Choose one of ${REFRIGERANT_IDS.join(', ')}` }],
  ...nameClash(site.racks.filter(item => item.controllerId === rack.controllerId), rack.name, self, 'The controller'),
]

const checkGroup: Check<'suction-groups'> = (group, site, self) => [
  ...unknownRack(site, group.rackId),
  ...group.lowCutOutPsig !== null && group.targetSuctionPsig !== null && group.lowCutOutPsig >= group.targetSuctionPsig
    ? [{ field: 'lowCutOutPsig', reason: 'The low cut-out lies below the target suction' }]
    : [],
  ...nameClash(site.suctionGroups.filter(item => item.rackId === group.rackId), group.name, self, 'The rack'),
]

const checkCircuit: Check<'circuits'> = (circuit, site, self) => [
  ...unknownRack(site, circuit.rackId),
  ...circuit.suctionGroupId === null || site.suctionGroups.some(group => group.id === circuit.suctionGroupId && group.rackId === circuit.rackId)
    ? []
    : [{ field: 'suctionGroupId', reason: 'Choose a suction group of the same rack' }],
  ...circuit.defrostKind === 'none' && circuit.defrosts !== null ? [{ field: 'defrosts', reason: 'A circuit without defrost has no defrost times' }] : [],
  ...nameClash(site.circuits.filter(item => item.rackId === circuit.rackId), circuit.name, self, 'The rack'),
]

const checkCase: Check<'cases'> = (item, site, self) => {
  const rack = site.racks.find(({ id }) => id === site.circuits.find(circuit => circuit.id === item.circuitId)?.rackId)
  return [
    ...unknownController(site, item.controllerId),
    ...item.circuitId === null || rack?.controllerId === item.controllerId ? [] : [{ field: 'circuitId', reason: 'Choose a circuit of the same controller' }],
    ...classFaults(item, site.rulebook),
    ...nameClash(site.cases.filter(other => other.controllerId === item.controllerId), item.name, self, 'The controller'),
  ]
}

/** A case's food class and own limit against a rulebook. Every limit here is an upper one: stricter is lower. */
function classFaults(item: Pick<ResourceValue<'cases'>, 'foodClass' | 'limitStricter'>, rulebookId: string): Fault[] {
  const rulebook = rulebookById(rulebookId)
  const foodClass = rulebook && classById(rulebook, item.foodClass)
  if (!rulebook || !foodClass) return [{ field: 'foodClass', reason: `Choose a food class of the site's rulebook: ${rulebook?.classes.map(({ id }) => id).join(', ') ?? 'it has none'}` }]
  return item.limitStricter !== null && item.limitStricter >= foodClass.limit
    ? [{ field: 'limitStricter', reason: `A limit of one's own is stricter than the rulebook's: below ${foodClass.limit} °${rulebook.unit}` }]
    : []
}

const checkInstrument: Check<'instruments'> = (instrument, site, self) => nameClash(site.instruments, instrument.name, self, 'The site')
const checkController: Check<'controllers'> = (controller, site, self) => nameClash(site.controllers, controller.name, self, 'The site')

export const CHECKS: { [R in ResourceName]: Check<R> } = {
  'controllers': checkController,
  'racks': checkRack,
  'suction-groups': checkGroup,
  'circuits': checkCircuit,
  'cases': checkCase,
  'points': checkPoint,
  'instruments': checkInstrument,
}

/**
 * A site's own fields: a known rulebook that its cases can be judged by, and no setting left over from another.
 * @param cases those that stand in it
 * @param before the site as it is stored; undefined: a new one
 */
export function checkSite(site: SiteValue, cases: readonly ResourceValue<'cases'>[], before?: SiteView): Fault[] {
  if (!rulebookById(site.rulebook)) return [{ field: 'rulebook', reason: `Choose one of ${[...new Set(rulebooks.map(({ id }) => id))].join(', ')}` }]
  const strange = cases.filter(item => classFaults(item, site.rulebook).length > 0).map(item => item.name)
  if (strange.length > 0) return [{ field: 'rulebook', reason: `This rulebook does not hold the food class or the stricter limit of ${strange.join(', ')}: change those cases first` }]
  return before && before.rulebook !== site.rulebook ? leftOver(before) : []
}

/** Stricter limits are written in the unit and for the classes of the rulebook that they were set under. */
function leftOver({ holding, cases }: SiteView): Fault[] {
  if (holding.classes.length > 0 || holding.allowsMinus12) return [{ field: 'rulebook', reason: 'The site\'s stricter limits are written for the present rulebook: take them back on its page of limits first' }]
  const own = cases.filter(item => item.limitStricter !== null).map(item => item.name)
  return own.length > 0 ? [{ field: 'rulebook', reason: `The own limit of ${own.join(', ')} is written for the present rulebook: take it back first` }] : []
}
