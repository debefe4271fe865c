import { and, eq, sql } from 'drizzle-orm'
import type { SQL } from 'drizzle-orm'
import { SERVER } from '../../../shared/record/entry'
import type { StoredEntry } from '../../../shared/record/entry'
import type { OutageState } from '../../../shared/record/state'
import { NO_HOLD, outages, outageSearch } from '../../database/schema'
import type { entries } from '../../database/schema'
import type { Queries } from '../database'
import { bearsOnSearch, SEARCH_VERSION, searchFacts } from './facts'
import { withWords, wordOfCode, wordsOfText, writtenIn } from './words'

type Added = Pick<typeof entries.$inferInsert, 'kind' | 'standing' | 'personId' | 'signed'>

/**
 * Brings the row by which an outage is found up to date with entries that were just added. Nothing is
 * written where they change nothing that is searched for.
 * @param state the fold with these entries
 */
export async function saveSearch(db: Queries, state: OutageState, added: readonly Added[]): Promise<void> {
  const text = writtenBy(added)
  if (added.some(bearsOnSearch)) await putRow(db, state, text)
  else if (text !== '') await addWords(db, state.id, wordsOfText(text))
}

/** Adds words to those of a row. Most that people write was written before: then nothing is written. */
async function addWords(db: Queries, outageId: string, words: SQL): Promise<void> {
  const all = withWords(outageSearch.words, words)
  await db.update(outageSearch).set({ words: all }).where(and(eq(outageSearch.outageId, outageId), sql`length(${all}) > length(${outageSearch.words})`))
}

/** What people wrote in added entries, one text. */
export function writtenBy(added: readonly Added[]): string {
  return writtenText(added.filter(row => row.personId).map(row => (JSON.parse(row.signed) as { body: unknown }).body))
}

/** Makes the row anew from a whole log. */
export async function renewSearch(db: Queries, state: OutageState, log: readonly StoredEntry[]): Promise<void> {
  await db.delete(outageSearch).where(eq(outageSearch.outageId, state.id))
  await putRow(db, state, writtenText(log.filter(({ entry }) => entry.by !== SERVER).map(({ entry }) => entry.body)))
}

/** All that may change but the words, as the row has it and as it would become: where nothing differs nothing is written. */
const CHANGING = [outageSearch.version, outageSearch.code, outageSearch.workKind, outageSearch.phase, outageSearch.endedAt, outageSearch.darkSince, outageSearch.darkSeconds, outageSearch.holdSeconds, outageSearch.lateReadings, outageSearch.outcomes, outageSearch.people, outageSearch.tags]
const OWN = sql.join(CHANGING, sql`, `)
const COMING = sql.raw(CHANGING.map(column => `excluded.${column.name.replace(/[A-Z]/g, letter => `_${letter.toLowerCase()}`)}`).join(', '))

async function putRow(db: Queries, state: OutageState, text: string): Promise<void> {
  const [row] = await db.select({ code: outages.code, siteId: outages.siteId, controllerId: outages.controllerId, openedAt: outages.openedAt }).from(outages).where(eq(outages.id, state.id))
  const { endedAt, darkSince, holdSeconds, ...facts } = searchFacts(state, row!.openedAt.getTime())
  const values = {
    ...row!, ...facts, version: SEARCH_VERSION, workKind: state.plan.workKind.name, phase: state.phase,
    endedAt: moment(endedAt), darkSince: moment(darkSince), holdSeconds: holdSeconds ?? NO_HOLD,
  }
  const words = sql`${wordOfCode(row!.code)} || ${wordsOfText(text)}`
  const all = withWords(outageSearch.words, words)
  await db.insert(outageSearch).values({ ...values, outageId: state.id, words })
    .onConflictDoUpdate({ target: outageSearch.outageId, set: { ...values, words: all }, setWhere: sql`(${OWN}) is distinct from (${COMING}) or length(${all}) > length(${outageSearch.words})` })
}

const moment = (at: number | null) => at === null ? null : new Date(at)

/** What people wrote in bodies of entries, one text. */
function writtenText(bodies: readonly unknown[]): string {
  return bodies.flatMap(writtenIn).join('\n')
}
