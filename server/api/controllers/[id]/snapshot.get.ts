import { eq } from 'drizzle-orm'
import { z } from 'zod'
import { controllers } from '~~/server/database/schema'
import { maySeeSite, requirePerson } from '~~/server/utils/access'
import { useDatabase } from '~~/server/utils/database'
import { notFound } from '~~/server/utils/errors'
import { readParamsAs } from '~~/server/utils/parse'
import { snapshotOf } from '~~/server/utils/record/snapshot'

/** The equipment of a controller as an opening entry carries it. */
export default defineEventHandler(async (event) => {
  const person = requirePerson(event)
  const { id } = readParamsAs(event, z.object({ id: z.string().uuid() }), 'controller')
  const [row] = await useDatabase().select({ siteId: controllers.siteId }).from(controllers).where(eq(controllers.id, id))
  if (!row || !await maySeeSite(person, row.siteId)) return notFound('controller')
  return snapshotOf(useDatabase(), id)
})
