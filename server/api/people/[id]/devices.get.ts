import { eq } from 'drizzle-orm'
import { z } from 'zod'
import { people } from '~~/server/database/schema'
import { requireRole } from '~~/server/utils/access'
import { useDatabase } from '~~/server/utils/database'
import { notFound } from '~~/server/utils/errors'
import { readParamsAs } from '~~/server/utils/parse'
import { devicesOf } from '~~/server/utils/people/devices'

/** The signing devices of a person, for an administrator, who may revoke a lost one. */
export default defineEventHandler(async (event) => {
  requireRole(event, 'administrator')
  const { id } = readParamsAs(event, z.object({ id: z.string().uuid() }), 'person')
  const db = useDatabase()
  const [person] = await db.select({ id: people.id }).from(people).where(eq(people.id, id))
  return person ? devicesOf(db, id) : notFound('person')
})
