import { and, asc, eq, ilike, inArray, isNotNull, isNull, or, sql } from 'drizzle-orm'
import { z } from 'zod'
import type { PeoplePage, PersonItem, personFilterSchema } from '../../../shared/schemas/people'
import { people, siteAccess, sites } from '../../database/schema'
import type { Queries } from '../database'
import { notFound, unprocessable } from '../errors'
import { itemOf } from './manage'

/** Accounts that one page holds. */
const PAGE = 50

/**
 * A page of accounts by name; `next` goes on from here, null at the end. Words are looked for in names, e-mail
 * addresses and the names of sites, each in any of them.
 */
export async function listPeople(db: Queries, { q, role, account, after }: z.output<typeof personFilterSchema>): Promise<PeoplePage> {
  const rows = await db.select().from(people).where(and(
    ...wordsOf(q).map(word => or(ilike(people.name, word), ilike(people.email, word), sql`exists (select 1 from ${siteAccess} join ${sites} on ${sites.id} = ${siteAccess.siteId} where ${siteAccess.personId} = ${people.id} and ${sites.name} ilike ${word})`)),
    role ? eq(people.role, role) : undefined,
    account === 'on' ? isNull(people.disabledAt) : account === 'off' ? isNotNull(people.disabledAt) : undefined,
    after ? sql`(${people.name}, ${people.id}) > ${placeOf(after)}` : undefined,
  )).orderBy(asc(people.name), asc(people.id)).limit(PAGE + 1)
  const page = rows.slice(0, PAGE)
  const last = page.at(-1)
  const [all, on] = await Promise.all([db.$count(people), db.$count(people, isNull(people.disabledAt))])
  return { items: await withSites(db, page), next: rows.length > PAGE && last ? Buffer.from(JSON.stringify([last.name, last.id])).toString('base64url') : null, all, on }
}

/** One account; 404 where there is none. */
export async function personById(db: Queries, id: string): Promise<PersonItem> {
  const [item] = await withSites(db, await db.select().from(people).where(eq(people.id, id)))
  return item ?? notFound('person')
}

async function withSites(db: Queries, rows: (typeof people.$inferSelect)[]): Promise<PersonItem[]> {
  if (rows.length === 0) return []
  const siteIds = new Map<string, string[]>()
  for (const { personId, siteId } of await db.select().from(siteAccess).where(inArray(siteAccess.personId, rows.map(row => row.id)))) siteIds.set(personId, [...siteIds.get(personId) ?? [], siteId])
  return rows.map(row => itemOf(row, siteIds.get(row.id) ?? []))
}

/** Each word as a pattern; what stands for other letters in one stands for itself. */
function wordsOf(text: string): string[] {
  return text.split(/\s+/).filter(Boolean).map(word => `%${word.replace(/[\\%_]/g, '\\$&')}%`)
}

const placeSchema = z.tuple([z.string(), z.string().uuid()])

/** Where an earlier page ended. */
function placeOf(after: string) {
  const parsed = placeSchema.safeParse(readJson(Buffer.from(after, 'base64url').toString()))
  if (!parsed.success || parsed.data[0].includes('\0')) return unprocessable('after', 'Give the "next" of an earlier page')
  return sql`(${parsed.data[0]}::text, ${parsed.data[1]}::uuid)`
}

function readJson(text: string): unknown {
  try { return JSON.parse(text) } catch { return null }
}
