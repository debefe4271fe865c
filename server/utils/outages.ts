import { eq } from 'drizzle-orm'
import type { H3Event } from 'h3'
import { z } from 'zod'
import { outages } from '../database/schema'
import type { Person } from './access'
import { maySeeSite, requirePerson } from './access'
import { useDatabase } from './database'
import { notFound } from './errors'
import { readParamsAs } from './parse'
import type { OutageRow } from './record/log'

const params = z.object({ id: z.string().uuid() })

/** The person, and the outage that the route names, if its site is theirs; else 404. */
export async function requireOutage(event: H3Event): Promise<{ person: Person, outage: OutageRow }> {
  const person = requirePerson(event)
  const { id } = readParamsAs(event, params, 'outage')
  const [outage] = await useDatabase().select().from(outages).where(eq(outages.id, id))
  return outage && await maySeeSite(person, outage.siteId) ? { person, outage } : notFound('outage')
}
