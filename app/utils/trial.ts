import type { TypedReading } from '~~/shared/import/readings'
import { typedNumber } from '~~/shared/import/readings'
import type { SettledTrial } from '~~/shared/import/trial'
import { settleTrial } from '~~/shared/import/trial'
import type { AssessInput, AssessSite } from '~~/shared/schemas/assess'
import type { SiteHolding } from '~~/shared/schemas/equipment'
import { assess, parseAssessInput, settingFaults, siteFor, verdictCourse } from '~~/server/utils/holding'
import type { Assessment, CourseBand, Rulebook } from '~~/server/utils/holding'

/** Most readings of one trial: a night of them, and still judged as fast as they are typed. */
export const TRIAL_MOST = 200

/** Settings typed for a site that is none of those at hand. */
export interface OwnSettings { limit: string, minutes: string, addAccuracy: boolean, allowsMinus12: boolean }

export interface TrialForm {
  foodClass: string
  unit: 'F' | 'C'
  rows: readonly TypedReading[]
  dark: string
  now: string
  interval: string
  /** as the site judges; null: the rulebook alone; `own`: by the settings typed */
  as: SiteHolding | 'own' | null
  own: OwnSettings
}

/** Faults by the name of their field: `rows[2].time`, `dark`, `now`, `interval`, `limit`, `minutes`. */
export type TrialFaults = Record<string, string>
export type TrialOutcome
  = | { kind: 'empty', faults: TrialFaults }
    | { kind: 'faulty', faults: TrialFaults }
    | { kind: 'judged', faults: TrialFaults, settled: SettledTrial, assessment: Assessment, bands: CourseBand[], darkAt: number, now: number }

const isBlank = (row: TypedReading) => row.time.trim() === '' && row.value.trim() === ''

/** What the rulebook says of what was typed, or what cannot be read in it. Blank rows are passed over. */
export function judgeTrial(book: Rulebook, form: TrialForm): TrialOutcome {
  const places = form.rows.flatMap((row, index) => isBlank(row) ? [] : [index])
  const settled = settleTrial(places.map(index => form.rows[index]!), form.dark, form.now)
  const faults: TrialFaults = {}
  for (const { row, field, reason } of settled.faults) faults[typeof row === 'number' ? `rows[${places[row]}].${field}` : row] ??= reason
  const intervalMinutes = typedNumber(form.interval)
  if (intervalMinutes === null || intervalMinutes <= 0) faults.interval = 'Enter minutes, above 0'
  const site = form.as === 'own' ? ownSite(book, form, faults) : form.as === null ? undefined : siteFor(form.as, form.foodClass)
  if (places.length === 0) return { kind: 'empty', faults }
  if (Object.keys(faults).length > 0 || settled.darkAt === null || settled.now === null) return { kind: 'faulty', faults }
  const input: AssessInput = {
    rulebook: book.id, version: book.version, foodClass: form.foodClass, unit: form.unit, intervalMinutes: intervalMinutes!,
    darkAt: new Date(settled.darkAt).toISOString(), now: new Date(settled.now).toISOString(),
    readings: settled.readings.map(({ at, value, method }) => ({ at: new Date(at).toISOString(), value, method: method === 'product' && judgedByAir(book, form.foodClass) ? 'air' : method })),
    ...site ? { site } : {},
  }
  const parsed = parseAssessInput(input)
  if (!parsed.ok) return { kind: 'faulty', faults: { [placeOf(parsed.field, places)]: `${parsed.reason[0]!.toUpperCase()}${parsed.reason.slice(1)}` } }
  return { kind: 'judged', faults, settled, assessment: assess(parsed.input), bands: verdictCourse(parsed.input), darkAt: settled.darkAt, now: settled.now }
}

/** A class judged by air takes what was typed without a word as air. */
function judgedByAir(book: Rulebook, foodClass: string): boolean {
  return book.classes.find(({ id }) => id === foodClass)?.judgedBy === 'air'
}

function ownSite(book: Rulebook, { foodClass, own }: TrialForm, faults: TrialFaults): AssessSite {
  const number = (field: 'limit' | 'minutes') => {
    if (own[field].trim() === '') return null
    const value = typedNumber(own[field])
    if (value === null || (field === 'minutes' && value <= 0)) faults[field] = field === 'limit' ? 'Enter a number, or nothing' : 'Enter minutes above 0, or nothing'
    return value
  }
  const limit = number('limit')
  const minutes = number('minutes')
  const holding: SiteHolding = { addAccuracy: own.addAccuracy, allowsMinus12: own.allowsMinus12, classes: limit === null && minutes === null ? [] : [{ foodClass, limit, minutes }] }
  for (const { field, reason } of settingFaults(book, holding)) faults[field.replace(/^classes\[\d+\]\./, '')] ??= reason
  return siteFor(holding, foodClass)
}

/** The engine's name of a field as the form has it. */
function placeOf(field: string, places: readonly number[]): string {
  const reading = /^readings\[(\d+)\]\.(at|value)$/.exec(field)
  if (reading) return `rows[${places[Number(reading[1])]}].${reading[2] === 'at' ? 'time' : 'value'}`
  return field === 'darkAt' ? 'dark' : field
}
