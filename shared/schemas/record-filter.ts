import { z } from 'zod'
import { PHASES } from '../record/phases'
import type { Phase } from '../record/phases'
import type { Role } from './people'

/** What became of an outage, as far as lists are searched for it. Several may be true of one. */
export const RECORD_OUTCOMES = ['unplanned', 'turned-back', 'act', 'above-limit', 'discard', 'late-rounds', 'excused', 'left-in-hand', 'questioned', 'returned'] as const
export type RecordOutcome = (typeof RECORD_OUTCOMES)[number]

/** Outcomes, as they are chosen and read. */
export const OUTCOME_WORDS: Record<RecordOutcome, string> = {
  'unplanned': 'Not planned',
  'turned-back': 'Turned back',
  'act': 'With an act',
  'above-limit': 'Above a limit',
  'discard': 'With discard',
  'late-rounds': 'With late rounds',
  'excused': 'With excused points',
  'left-in-hand': 'With points left in hand',
  'questioned': 'With questioned entries',
  'returned': 'Returned for answers',
}

/** Orders of a list of records; ties break on id. */
export const RECORD_SORTS = ['newest', 'oldest', 'longest-dark', 'shortest-hold'] as const
export type RecordSort = (typeof RECORD_SORTS)[number]
export const SORT_WORDS: Record<RecordSort, string> = {
  'newest': 'Newest first',
  'oldest': 'Oldest first',
  'longest-dark': 'Longest without control',
  'shortest-hold': 'Shortest hold',
}

export const WORDS_SOUGHT_MAX = 200

/** Names of a fixed set with commas between them, each once. */
const several = <T extends string>(names: readonly [T, ...T[]], what: string) => z.string().max(400).transform(text => [...new Set(text.split(',').filter(Boolean))])
  .pipe(z.array(z.enum(names as [T, ...T[]], { errorMap: () => ({ message: `${what}: one or more of ${names.join(', ')}, with commas` }) })))

const day = z.string().regex(/^\d{4}-\d{2}-\d{2}$/, 'A day is written 2026-03-03').refine((text) => {
  const ms = Date.parse(`${text}T00:00:00.000Z`)
  return !Number.isNaN(ms) && new Date(ms).toISOString().startsWith(text)
}, 'There is no such day')
const id = (what: string) => z.string().uuid(`The id of ${what}`)

/** An empty field of a form asks for nothing. */
const blank = <T extends z.ZodTypeAny>(schema: T) => z.preprocess(value => value === '' ? undefined : value, schema.optional())

/** A text that a database can hold. */
const text = (most: number) => z.string().trim().max(most, `At most ${most} characters`).refine(value => !value.includes('\0'), 'The character NUL is in no record')

/** Fields of a search for records, as they stand in an address. */
export const recordFilterFields = {
  words: blank(text(WORDS_SOUGHT_MAX)), // each must occur in what was signed
  site: blank(id('a site')),
  controller: blank(id('a controller')),
  from: blank(day), // opened on this day of the site or later
  to: blank(day), // opened on this day of the site or earlier
  person: blank(id('a person')), // who signed in it
  work: blank(text(120)), // kind of work, by its name
  phase: blank(several(PHASES, 'Phases')), // any of them
  outcome: blank(several(RECORD_OUTCOMES, 'Outcomes')), // all of them
  tag: blank(text(32)), // a point that was in the plan or in hand
}

export const dayOrder = { path: ['to'], message: 'The last day lies before the first' }
export const isOrdered = ({ from, to }: { from?: string, to?: string }) => from === undefined || to === undefined || from <= to

/** A search for records. Fields that it does not know are left alone: an address may hold others. */
export const recordFilterSchema = z.object(recordFilterFields).refine(isOrdered, dayOrder)
export type RecordFilter = z.output<typeof recordFilterSchema>

export const RECORD_PAGE_MAX = 100

/** A page of a search: its order, where to go on, how many at most. */
export const recordQuerySchema = z.object({
  ...recordFilterFields,
  sort: blank(z.enum(RECORD_SORTS, { errorMap: () => ({ message: `One of ${RECORD_SORTS.join(', ')}` }) })).transform(sort => sort ?? 'newest'),
  after: blank(z.string().max(100)),
  limit: z.coerce.number().int().min(1).max(RECORD_PAGE_MAX, `At most ${RECORD_PAGE_MAX}`).default(25),
}).refine(isOrdered, dayOrder)
export type RecordQuery = z.output<typeof recordQuerySchema>

/** An outage as the search finds it; times in ISO 8601, UTC. */
export interface RecordItem {
  id: string
  code: string
  phase: Phase
  site: { id: string, code: string, name: string, timeZone: string }
  controller: { id: string, name: string }
  workKind: string
  /** under legal hold */
  held: boolean
  openedAt: string
  endedAt: string | null
  /** where control is away now: since when */
  darkSince: string | null
  /** time without control that is over; 0: none */
  darkSeconds: number
  /** the shortest hold that readings gave; null: none */
  holdSeconds: number | null
  lateReadings: number
  outcomes: RecordOutcome[]
}

/** Counting stops here. */
export const MOST_COUNTED = 1000

/** A page of a search; `next` goes on from here, null at the end. The first page also says how many there are. */
export interface RecordPage { items: RecordItem[], next: string | null, count: { found: number, more: boolean } | null }

/** What a search may name, of the sites of who asks; each by name. */
export interface RecordChoices {
  sites: { id: string, code: string, name: string }[]
  controllers: { id: string, name: string, siteId: string }[]
  people: { id: string, name: string, role: Role }[]
  workKinds: string[]
}
