/** The fields of each form of the equipment pages, in their order: one list for the form and for those who only read. */
import { CASE_KIND_WORDS } from '~~/shared/schemas/case-kinds'
import { PAPERS, PRESSURE_UNITS } from '~~/shared/schemas/equipment'
import type { QuietHours, DefrostSchedule } from '~~/shared/schemas/equipment'
import { REFRIGERANT_IDS } from '~~/shared/schemas/refrigerants'
import type { HandPosition } from '~~/shared/schemas/point-kinds'
import { handWords, KIND_WORDS } from '~~/shared/schemas/point-kinds'
import type { ResourceName, SiteView } from '~~/shared/schemas/site-view'
import { rulebookById, rulebooks } from '~~/server/utils/holding'
import { defrostWords, DEFROST_WORDS, INSTRUMENT_WORDS, ON_LOSS_WORDS, optionsOf, quietWords, STAGE_WORDS } from './equipment-words'
import type { Quantity } from './site-units'

/** What the other fields of the form hold at the moment. */
export type FormValues = Record<string, unknown>
export interface FieldOption { value: string, label: string }
/** What fields look at to offer choices: the site as it stands; null while a site itself is being made. */
export interface FieldScope { site: SiteView | null, values: FormValues }

export interface FieldSpec {
  name: string
  label: string
  kind: 'text' | 'area' | 'email' | 'tel' | 'date' | 'number' | 'select' | 'check' | 'checks' | 'lines' | 'hand' | 'defrosts' | 'quiet-hours'
  hint?: string
  optional?: boolean
  /** A quantity stored in °C, K or psig and written in the site's own unit. */
  quantity?: Quantity
  unit?: string | ((scope: FieldScope) => string)
  options?: (scope: FieldScope) => FieldOption[]
  /** Words of no choice, where that is one. */
  empty?: string
  /** Asked only when the thing is made: what it belongs to never changes. */
  once?: boolean
  /** Two short fields stand side by side. */
  half?: boolean
  shown?: (scope: FieldScope) => boolean
}

const named = (items: readonly { id: string, name: string }[] | undefined): FieldOption[] => (items ?? []).map(({ id, name }) => ({ value: id, label: name }))
const controllerField: FieldSpec = { name: 'controllerId', label: 'Controller', kind: 'select', once: true, options: ({ site }) => named(site?.controllers) }
const nameField: FieldSpec = { name: 'name', label: 'Name', kind: 'text' }

/** Racks with their controller where a site has several. */
function rackOptions({ site }: FieldScope): FieldOption[] {
  const several = (site?.controllers.length ?? 0) > 1
  return (site?.racks ?? []).map(rack => ({ value: rack.id, label: several ? `${rack.name}, ${site?.controllers.find(({ id }) => id === rack.controllerId)?.name}` : rack.name }))
}
const rackField: FieldSpec = { name: 'rackId', label: 'Rack', kind: 'select', once: true, options: rackOptions }
const racksOf = ({ site, values }: FieldScope) => (site?.racks ?? []).filter(rack => rack.controllerId === values.controllerId)
const onThoseRacks = (scope: FieldScope) => {
  const racks = new Set(racksOf(scope).filter(rack => !scope.values.rackId || rack.id === scope.values.rackId).map(rack => rack.id))
  return <T extends { rackId: string }>(item: T) => racks.has(item.rackId)
}
const isCarbonDioxide = ({ values }: FieldScope) => values.refrigerant === 'R-744'
const classUnit = ({ site }: FieldScope) => `°${rulebookById(site?.rulebook ?? '')?.unit ?? 'C'}`

export const SITE_FIELDS: FieldSpec[] = [
  { name: 'code', label: 'Code', kind: 'text', hint: 'As Q027; begins those of outages.', half: true },
  { name: 'name', label: 'Name', kind: 'text', hint: 'As people call it.', half: true },
  { name: 'address', label: 'Address', kind: 'text', optional: true },
  { name: 'timeZone', label: 'Time zone', kind: 'text', hint: 'As America/Chicago.', half: true },
  { name: 'altitudeM', label: 'Altitude', kind: 'number', unit: 'm', hint: 'Above the sea.', half: true },
  { name: 'temperatureUnit', label: 'Temperatures in', kind: 'select', options: () => [{ value: 'F', label: '°F' }, { value: 'C', label: '°C' }], half: true },
  { name: 'pressureUnit', label: 'Pressures in', kind: 'select', options: () => PRESSURE_UNITS.map(value => ({ value, label: value })), half: true },
  { name: 'rulebook', label: 'Rulebook', kind: 'select', hint: 'What its product is judged by.', options: () => rulebooks.map(({ id, name }) => ({ value: id, label: name })) },
  { name: 'intervalMinutes', label: 'Rounds at least every', kind: 'number', unit: 'min', hint: 'At open cases.', half: true },
  { name: 'paper', label: 'Paper', kind: 'select', hint: 'Of the printed record.', options: () => PAPERS.map(value => ({ value, label: value })), half: true },
  { name: 'contactName', label: 'Contact at the site', kind: 'text', optional: true, half: true },
  { name: 'contactPhone', label: 'Contact\'s phone', kind: 'tel', optional: true, half: true },
  { name: 'contactEmail', label: 'Contact\'s e-mail', kind: 'email', optional: true, half: true },
  { name: 'monitoringEmail', label: 'Monitoring centre\'s e-mail', kind: 'email', optional: true, half: true },
  { name: 'quietHours', label: 'Quiet hours', kind: 'quiet-hours', hint: 'When no work should start: deliveries, rush hours.', optional: true },
]

export const RESOURCE_FIELDS: Record<ResourceName, FieldSpec[]> = {
  'controllers': [
    nameField,
    { name: 'place', label: 'Place', kind: 'text', hint: 'Where a person finds it.', optional: true },
    { name: 'panelVolts', label: 'Voltage in its panel', kind: 'number', unit: 'V', hint: 'Decides which approach distances are shown.', optional: true },
    { name: 'notes', label: 'Notes', kind: 'area', optional: true },
  ],
  'racks': [
    controllerField,
    nameField,
    { name: 'refrigerant', label: 'Refrigerant', kind: 'select', options: () => REFRIGERANT_IDS.map(value => ({ value, label: value })), half: true },
    { name: 'highCutOutPsig', label: 'High pressure cut-out', kind: 'number', quantity: 'pressure', optional: true, half: true },
    { name: 'warmestC', label: 'Warmest place where liquid may stand', kind: 'number', quantity: 'temperature', optional: true, hint: 'On a hot day, with everything off. Decides the standstill pressure.', shown: isCarbonDioxide },
    { name: 'reliefValves', label: 'Relief valves', kind: 'lines', optional: true, hint: 'One a line: tag and setting in bar gauge, as RV-1 40.', shown: isCarbonDioxide },
  ],
  'suction-groups': [
    rackField,
    nameField,
    { name: 'stage', label: 'Stage', kind: 'select', options: () => optionsOf(STAGE_WORDS) },
    { name: 'targetSuctionPsig', label: 'Target suction', kind: 'number', quantity: 'pressure', optional: true, half: true },
    { name: 'lowCutOutPsig', label: 'Low pressure cut-out', kind: 'number', quantity: 'pressure', optional: true, half: true },
  ],
  'circuits': [
    rackField,
    nameField,
    { name: 'suctionGroupId', label: 'Suction group', kind: 'select', empty: 'None', optional: true, options: ({ site, values }) => named(site?.suctionGroups.filter(group => group.rackId === values.rackId)) },
    { name: 'defrostKind', label: 'Defrost', kind: 'select', options: () => optionsOf(DEFROST_WORDS) },
    { name: 'defrosts', label: 'Defrost times', kind: 'defrosts', optional: true, shown: ({ values }) => values.defrostKind !== 'none' },
    { name: 'durationMin', label: 'A defrost lasts', kind: 'number', unit: 'min', half: true, shown: ({ values }) => values.defrostKind !== 'none' },
    { name: 'dripMin', label: 'Drip after it', kind: 'number', unit: 'min', half: true, shown: ({ values }) => values.defrostKind !== 'none' },
  ],
  'cases': [
    controllerField,
    nameField,
    { name: 'kind', label: 'Kind', kind: 'select', options: () => optionsOf(CASE_KIND_WORDS), half: true },
    { name: 'circuitId', label: 'Circuit', kind: 'select', empty: 'None', optional: true, half: true, options: scope => named(scope.site?.circuits.filter(circuit => racksOf(scope).some(rack => rack.id === circuit.rackId))) },
    { name: 'foodClass', label: 'Food class', kind: 'select', hint: 'A class of the site\'s rulebook.', options: ({ site }) => rulebookById(site?.rulebook ?? '')?.classes.map(({ id, name, limit }) => ({ value: id, label: `${name}, limit ${limit} ${classUnit({ site, values: {} })}` })) ?? [] },
    { name: 'usualC', label: 'Usual product temperature', kind: 'number', quantity: 'temperature', half: true },
    { name: 'limitStricter', label: 'Own, stricter limit', kind: 'number', unit: classUnit, optional: true, half: true },
    { name: 'tauHours', label: 'Own time constant', kind: 'number', unit: 'h', hint: 'Fitted from its records; without one an estimate by kind is used.', optional: true },
    { name: 'runsAlone', label: 'Its own controller keeps it going when this one is dark', kind: 'check' },
  ],
  'points': [
    controllerField,
    { name: 'tag', label: 'Tag', kind: 'text', half: true },
    { name: 'kind', label: 'Kind', kind: 'select', options: () => optionsOf(KIND_WORDS), half: true },
    nameField,
    { name: 'address', label: 'Address on the controller', kind: 'text', optional: true, half: true },
    { name: 'place', label: 'Place', kind: 'text', hint: 'Where a person finds its means of override.', optional: true },
    { name: 'means', label: 'Means of override', kind: 'text', hint: 'As hand-off-auto selector, jumper, valve stem.', optional: true },
    { name: 'throughOff', label: 'Its selector passes through off', kind: 'check' },
    { name: 'guards', label: 'Guards', kind: 'lines', hint: 'What still protects it in hand, one a line.', optional: true },
    { name: 'hand', label: 'Usual hand position', kind: 'hand', optional: true },
    { name: 'onLoss', label: 'When the controller dies', kind: 'select', options: () => optionsOf(ON_LOSS_WORDS) },
    { name: 'rackId', label: 'Rack', kind: 'select', empty: 'None', optional: true, options: scope => named(racksOf(scope)), half: true },
    { name: 'suctionGroupId', label: 'Suction group', kind: 'select', empty: 'None', optional: true, options: scope => named(scope.site?.suctionGroups.filter(onThoseRacks(scope))), half: true },
    { name: 'circuitId', label: 'Circuit', kind: 'select', empty: 'None', optional: true, options: scope => named(scope.site?.circuits.filter(onThoseRacks(scope))), half: true },
    { name: 'drives', label: 'Drives', kind: 'select', empty: 'Nothing', hint: 'The machine whose speed it sets.', optional: true, half: true, shown: ({ values }) => values.kind === 'drive', options: ({ site, values }) => (site?.points ?? []).filter(point => point.controllerId === values.controllerId && point.tag !== values.tag).map(({ tag, name }) => ({ value: tag, label: `${tag} ${name}` })) },
    { name: 'caseIds', label: 'Cases that it serves', kind: 'checks', optional: true, options: ({ site, values }) => named(site?.cases.filter(item => item.controllerId === values.controllerId)) },
    { name: 'ratedA', label: 'Rated current', kind: 'number', unit: 'A', optional: true, half: true },
    { name: 'capacityKw', label: 'Capacity', kind: 'number', unit: 'kW', optional: true, half: true },
    { name: 'minOffMin', label: 'Minimum off time', kind: 'number', unit: 'min', hint: 'Five minutes where none is given.', optional: true, half: true },
  ],
  'instruments': [
    nameField,
    { name: 'kind', label: 'Kind', kind: 'select', options: () => optionsOf(INSTRUMENT_WORDS), half: true },
    { name: 'serial', label: 'Serial number', kind: 'text', optional: true, half: true },
    { name: 'accuracyC', label: 'Accuracy, plus or minus', kind: 'number', quantity: 'difference', half: true },
    { name: 'lastCheckOn', label: 'Last check', kind: 'date', optional: true, half: true },
  ],
}

/** What a new thing starts from: every field of its form, so that each has a value from the first moment. */
export function blankOf(fields: readonly FieldSpec[], scope: FieldScope): FormValues {
  const values: FormValues = {}
  for (const field of fields) {
    const options = field.kind === 'select' && field.empty === undefined ? field.options?.({ site: scope.site, values: { ...scope.values, ...values } }) ?? [] : []
    values[field.name] = field.name in scope.values ? scope.values[field.name] : options.length === 1 ? options[0]!.value : EMPTY[field.kind]
  }
  return values
}

const EMPTY: Record<FieldSpec['kind'], unknown> = {
  'text': '', 'area': '', 'email': '', 'tel': '', 'date': null, 'number': null, 'select': null, 'check': false, 'checks': [], 'lines': [], 'hand': null, 'defrosts': null, 'quiet-hours': [],
}

/** A field's value in words, for those who only read. Numbers with a quantity are the caller's. */
export function fieldWords(field: FieldSpec, value: unknown, scope: FieldScope): string {
  if (field.kind === 'check') return value ? 'yes' : 'no'
  if (value === null || value === undefined || value === '' || (Array.isArray(value) && value.length === 0)) return '–'
  const labelOf = (one: unknown) => field.options?.(scope).find(option => option.value === one)?.label ?? String(one)
  switch (field.kind) {
    case 'select': return labelOf(value)
    case 'checks': return (value as string[]).map(labelOf).join(', ')
    case 'lines': return (value as string[]).join(', ')
    case 'hand': return handWords(value as HandPosition)
    case 'defrosts': return defrostWords(value as DefrostSchedule)
    case 'quiet-hours': return (value as QuietHours[]).map(quietWords).join('. ')
    case 'number': return `${value} ${typeof field.unit === 'function' ? field.unit(scope) : field.unit ?? ''}`.trim()
    default: return String(value)
  }
}
