import { minuteWords, temperatureWords } from '~~/shared/charts/words'
import type { ChangeDeed, ChangeItem } from '~~/shared/schemas/changes'
import type { Role } from '~~/shared/schemas/people'
import { ROLE_WORDS } from '~~/shared/schemas/people'
import type { ResourceName, SiteView } from '~~/shared/schemas/site-view'
import { RESOURCE_WORDS } from '~~/shared/schemas/site-view'
import type { StepPlan } from '~~/shared/schemas/work'
import { classById, rulebookById } from '~~/server/utils/holding'
import type { Rulebook } from '~~/server/utils/holding'
import type { FieldSpec } from './equipment-fields'
import { fieldWords, RESOURCE_FIELDS, SITE_FIELDS } from './equipment-fields'
import { quantityWords } from './site-units'

/** What a change of limits says, a line a setting. @param book the rulebook in whose unit they are */
export function limitChangeLines({ fields }: Pick<ChangeItem, 'fields'>, book: Rulebook | undefined): string[] {
  return fields.map(({ field, before, after }) => {
    if (field === 'instrumentCheckDays') return `Checks of thermometers overdue after ${after} days, before after ${before}`
    if (field === 'addAccuracy') return after ? 'Accuracy of thermometers added to each reading' : 'Accuracy of thermometers no longer added'
    if (field === 'allowsMinus12') return after ? '−12 °C for quick-frozen food chosen' : '−12 °C for quick-frozen food no longer chosen'
    const id = field.replace(/^class:/, '')
    const words = (value: unknown) => classSettingWords(value, book?.unit ?? 'C')
    return `${(book && classById(book, id)?.name) ?? id}: ${words(after)}, before ${words(before)}`
  })
}

function classSettingWords(value: unknown, unit: 'F' | 'C'): string {
  const { limit = null, minutes = null } = (value ?? {}) as { limit?: number | null, minutes?: number | null }
  const parts = [limit === null ? '' : `within ${temperatureWords(limit, unit)}`, minutes === null ? '' : `at most ${minuteWords(minutes)}`].filter(Boolean)
  return parts.length > 0 ? parts.join(' and ') : 'as the rulebook'
}

const DEEDS: Record<ChangeDeed, string> = { added: 'added', changed: 'changed', deleted: 'deleted', exported: 'exported', downloaded: 'downloaded' }
const OTHER_LABELS: Record<string, string> = {
  email: 'E-mail', name: 'Name', role: 'Role', sites: 'Sites', switchedOff: 'Switched off', password: 'Password', invited: 'Invited',
  steps: 'Steps', rollBack: 'Way back', addedPoints: 'Added points',
  first: 'Told first', second: 'Told second', third: 'Told third', secondAfter: 'Told second after, minutes', thirdAfter: 'Told third after, minutes',
  changedPoints: 'Changed points',
  records: 'Records', bytes: 'Bytes',
  legalHold: 'Legal hold', liftedReason: 'Lifted because', reason: 'Reason', years: 'Years that records are kept',
}

/** 'Rack A, a rack, changed'; 'The site itself changed'. */
export function changeTitle({ subject, subjectName, deed, fields }: ChangeItem): string {
  switch (subject) {
    case 'site': return deed === 'added' ? 'The site added' : 'The site itself changed'
    case 'limits': return 'Limits changed'
    case 'alerts': return 'Alert rules changed'
    case 'person': return `${subjectName} ${DEEDS[deed]}`
    case 'work-kind':
    case 'export': return `${subjectName} ${DEEDS[deed]}`
    case 'retention': return `${subjectName}: how long records are kept`
    case 'record': return deed === 'deleted' ? `Record ${subjectName} deleted` : `Record ${subjectName}: legal hold ${fields.some(field => field.field === 'liftedReason') ? 'lifted' : 'put on'}`
    default: return `${subjectName}, ${RESOURCE_WORDS[subject].one}, ${DEEDS[deed]}`
  }
}

/** What a change says, a line a field, in the site's own units. @param site null: people and kinds of work have no units */
export function changeLines(change: ChangeItem, site: SiteView | null): string[] {
  if (change.subject === 'limits') return limitChangeLines(change, site ? rulebookById(site.rulebook) : undefined)
  return change.fields.map(({ field, before, after }) => {
    const spec = specOf(change.subject, field)
    const words = (value: unknown) => valueWords(value, field, spec, site)
    const label = spec?.label ?? OTHER_LABELS[field] ?? field
    if (change.deed === 'added' || change.subject === 'export') return `${label}: ${words(after)}`
    if (change.deed === 'deleted') return `${label}: ${words(before)}`
    return before === null && (field === 'password' || field === 'invited' || field.endsWith('Points')) ? `${label}: ${words(after)}` : `${label}: ${words(after)}, before ${words(before)}`
  })
}

function specOf(subject: ChangeItem['subject'], field: string): FieldSpec | undefined {
  if (subject === 'site') return SITE_FIELDS.find(spec => spec.name === field)
  return subject in RESOURCE_FIELDS ? RESOURCE_FIELDS[subject as ResourceName].find(spec => spec.name === field) : undefined
}

function valueWords(value: unknown, field: string, spec: FieldSpec | undefined, site: SiteView | null): string {
  if (field === 'years' && value === null) return 'as all sites'
  if (value === null || value === '' || (Array.isArray(value) && value.length === 0)) return 'nothing'
  if (field === 'role') return ROLE_WORDS[value as Role].toLowerCase()
  if (field === 'steps' || field === 'rollBack') return (value as StepPlan[]).map(step => `${step.name} ${step.shortest}–${step.likely}–${step.longest} min${step.dark ? ', dark' : ''}`).join('; ')
  if (typeof value === 'boolean') return value ? 'yes' : 'no'
  if (spec?.quantity && site) return quantityWords(value as number, spec.quantity, site)
  if (spec) return fieldWords(spec, value, { site, values: {} })
  return Array.isArray(value) ? value.join(', ') : typeof value === 'object' ? JSON.stringify(value) : String(value)
}
