/** The search for records as it stands in an address. */
import type { RecordChoices, RecordFilter, RecordItem, RecordOutcome, RecordSort } from '~~/shared/schemas/record-filter'
import { OUTCOME_WORDS, recordFilterFields, recordQuerySchema, SORT_WORDS } from '~~/shared/schemas/record-filter'
import type { Phase } from '~~/shared/record/phases'
import { PHASE_WORDS } from '~~/shared/record/phases'
import { clockWords, countWords, dateWords, durationWords } from '~~/shared/charts/words'

/** Fields of a search, as they are asked for one after another. */
export const SEARCH_FIELDS = ['words', 'site', 'controller', 'person', 'work', 'phase', 'outcome', 'tag', 'from', 'to'] as const satisfies readonly (keyof RecordFilter)[]
export type SearchField = (typeof SEARCH_FIELDS)[number]

/** What an address asks for: fields that can be understood, as texts; what else stands there is left alone. */
export function searchOf(query: Readonly<Record<string, unknown>>): Partial<Record<SearchField | 'sort', string>> {
  const search: Partial<Record<SearchField | 'sort', string>> = {}
  for (const field of SEARCH_FIELDS) {
    const value = query[field]
    if (typeof value === 'string' && value.trim() !== '' && recordFilterFields[field].safeParse(value).success) search[field] = value.trim()
  }
  if (typeof query.sort === 'string' && query.sort in SORT_WORDS && query.sort !== 'newest') search.sort = query.sort
  return search
}

/** What is wrong with fields that are right each by itself, in words; null where nothing is. */
export function searchFault(search: Readonly<Record<string, string>>): string | null {
  const parsed = recordQuerySchema.safeParse(search)
  return parsed.success ? null : parsed.error.issues[0]!.message
}

/** The order that an address asks for. */
export const sortOf = (search: Readonly<Record<string, string>>): RecordSort => (search.sort ?? 'newest') as RecordSort

const day = (iso: string) => dateWords(`${iso}T12:00:00.000Z`, 'UTC')

/** Each field that is asked for, in words, so that it can be taken away again. */
export function searchWords(search: Readonly<Record<string, string>>, choices: RecordChoices | null | undefined): { field: SearchField, words: string }[] {
  const nameIn = (list: readonly { id: string, name: string }[] | undefined, id: string) => list?.find(one => one.id === id)?.name ?? 'one that is not listed'
  const words: Record<SearchField, (value: string) => string> = {
    words: value => `words “${value}”`,
    site: value => nameIn(choices?.sites, value),
    controller: value => nameIn(choices?.controllers, value),
    person: value => `signed by ${nameIn(choices?.people, value)}`,
    work: value => value,
    phase: value => value.split(',').map(phase => PHASE_WORDS[phase as Phase]).join(' or '),
    outcome: value => value.split(',').map(outcome => OUTCOME_WORDS[outcome as RecordOutcome]).join(' and '),
    tag: value => `point ${value}`,
    from: value => `from ${day(value)}`,
    to: value => `to ${day(value)}`,
  }
  return SEARCH_FIELDS.flatMap((field) => {
    const value = search[field]
    return value ? [{ field, words: words[field](value) }] : []
  })
}

/** How many were found: "1 record", "412 records", "More than 1,000 records". */
export function countFound({ found, more }: { found: number, more: boolean }): string {
  return more ? `More than ${found.toLocaleString('en-GB')} records` : found === 0 ? 'No record' : countWords(found, 'record').replace(/^\d+/, number => Number(number).toLocaleString('en-GB'))
}

/** Time without control of a record in words: what is over, and since when it is away now. */
export function darkWords({ darkSince, darkSeconds, site }: Pick<RecordItem, 'darkSince' | 'darkSeconds' | 'site'>): string {
  const over = darkSeconds > 0 ? durationWords(darkSeconds) : ''
  const now = darkSince === null ? '' : `away since ${clockWords(darkSince, site.timeZone)}`
  return [over, now].filter(Boolean).join(', ') || 'none'
}

/** The shortest hold in words: an estimate. */
export function holdWords({ holdSeconds }: Pick<RecordItem, 'holdSeconds'>): string {
  return holdSeconds === null ? '–' : durationWords(Math.floor(holdSeconds / 60) * 60)
}

/** What became of it, in words, one after another. */
export function becameWords({ outcomes, lateReadings }: Pick<RecordItem, 'outcomes' | 'lateReadings'>): string {
  const each = outcomes.map(outcome => outcome === 'late-rounds' ? countWords(lateReadings, 'late reading') : OUTCOME_WORDS[outcome].replace(/^With /, '').toLowerCase())
  const text = each.join(', ')
  return text.charAt(0).toUpperCase() + text.slice(1)
}
