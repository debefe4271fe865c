import { sql } from 'drizzle-orm'
import type { SQL } from 'drizzle-orm'

/** Fields of bodies in which people write. */
const WRITTEN: ReadonlySet<string> = new Set(['words', 'reason', 'measure', 'product', 'place', 'takenBy', 'note', 'cause', 'found', 'clause'])
/** Equipment as it stood is not what anybody wrote. */
const NOT_WRITTEN: ReadonlySet<string> = new Set(['snapshot'])
/** Bytes of one text that PostgreSQL makes words of at a time: it refuses more than a megabyte. */
export const TEXT_MAX = 400_000
/** A row holds no more words than this, so that nobody can fill it until nothing more is taken. */
export const LEXEMES_MAX = 20_000
/** A word of this many letters is looked for by its beginning. */
const BEGINNING_MIN = 3

/** What people wrote in the body of an entry, in the order in which it stands there. */
export function writtenIn(body: unknown): string[] {
  if (typeof body !== 'object' || body === null) return []
  if (Array.isArray(body)) return body.flatMap(writtenIn)
  return Object.entries(body).flatMap(([name, value]) => {
    if (NOT_WRITTEN.has(name)) return []
    if (typeof value === 'string') return WRITTEN.has(name) && value.trim() !== '' ? [value.trim()] : []
    return writtenIn(value)
  })
}

/** A text as words to be found; no more than PostgreSQL takes. */
export function wordsOfText(text: string): SQL {
  return sql`strip(to_tsvector('english', ${text.slice(0, TEXT_MAX)}))`
}

/** The outage's code as one word, whole. */
export function wordOfCode(code: string): SQL {
  return sql`array_to_tsvector(array[lower(${code}::text)])`
}

/** Words with those of a further text added. */
export function withWords(words: SQL | { getSQL(): SQL }, more: SQL): SQL {
  return sql`case when length(${words}) < ${LEXEMES_MAX} then ${words} || ${more} else ${words} end`
}

/**
 * What is sought, as a query of the words: every word must occur, whatever its ending, and a longer one by
 * its beginning alone. A code, which the dictionary would take apart, is also sought as it is written.
 * @returns null where the text names nothing to seek
 */
export function wordsSought(text: string): SQL | null {
  const tokens = [...new Set(text.toLowerCase().split(/[^\p{L}\p{N}\-./@_]+/u).map(token => token.replace(/^[-./]+|[-./]+$/g, '')).filter(Boolean))]
  if (tokens.length === 0) return null
  return sql`(${sql.join(tokens.map(tokenSought), sql` && `)})`
}

function tokenSought(token: string): SQL {
  const written = `'${token}'${token.length >= BEGINNING_MIN ? ':*' : ''}` // a token holds neither quote nor backslash
  // What the dictionary takes apart, such as 555-0127, it wants side by side; rows keep no places of words, so it is asked for together.
  const inEnglish = sql`regexp_replace(to_tsquery('english', ${written}::text)::text, '<(-|[0-9]+)>', '&', 'g')::tsquery`
  // Words that say nothing, such as "the", are in no row and ask for nothing.
  return sql`(case when numnode(${inEnglish}) = 0 then ''::tsquery else ${inEnglish} || ${written}::tsquery end)`
}
