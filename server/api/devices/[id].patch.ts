import { and, eq } from 'drizzle-orm'
import { z } from 'zod'
import { deviceRenameSchema } from '~~/shared/schemas/people'
import { devices } from '~~/server/database/schema'
import { requirePerson } from '~~/server/utils/access'
import { useDatabase } from '~~/server/utils/database'
import { notFound } from '~~/server/utils/errors'
import { readBodyAs, readParamsAs } from '~~/server/utils/parse'

/** Renames a device of one's own. Records keep the name under which it signed first. */
export default defineEventHandler(async (event) => {
  const person = requirePerson(event)
  const { id } = readParamsAs(event, z.object({ id: z.string().uuid() }), 'device')
  const { name } = await readBodyAs(event, deviceRenameSchema)
  const [renamed] = await useDatabase().update(devices).set({ name }).where(and(eq(devices.id, id), eq(devices.personId, person.id))).returning({ id: devices.id, name: devices.name })
  return renamed ?? notFound('device')
})
