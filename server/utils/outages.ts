import { eq } from 'drizzle-orm'
import type { H3Event } from 'h3'
import { z } from 'zod'
import { outages } from '../database/schema'
import type { Person } from './access'
import { maySeeSite, requirePerson } from './access'
import type { Queries } from './database'
import { useDatabase } from './database'
import { notFound } from './errors'
import { readParamsAs } from './parse'
import type { OutageRow } from './record/log'

const params = z.object({ id: z.string().uuid() })

/** The person, and the outage that the route names, if its site is theirs; else 404. */
export async function requireOutage(event: H3Event): Promise<{ person: Person, outage: OutageRow }> {
  const person = requirePerson(event)
  const { id } = readParamsAs(event, params, 'outage')
  return { person, outage: await findOutage(person, id) }
}

/** An outage whose site the person may see; else 404. */
export async function findOutage(person: Person, id: string, db: Queries = useDatabase()): Promise<OutageRow> {
  const [outage] = await db.select().from(outages).where(eq(outages.id, id))
  return outage && await maySeeSite(person, outage.siteId, db) ? outage : notFound('outage')
}
