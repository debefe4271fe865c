import { and, eq, isNotNull, isNull } from 'drizzle-orm'
import { z } from 'zod'
import { devices } from '~~/server/database/schema'
import { requirePerson } from '~~/server/utils/access'
import { useDatabase } from '~~/server/utils/database'
import { notFound } from '~~/server/utils/errors'
import { readParamsAs } from '~~/server/utils/parse'

/** Revokes a device of one's own, or, by an administrator, of anybody (never the server's own key). What it signed stays. */
export default defineEventHandler(async (event) => {
  const person = requirePerson(event)
  const { id } = readParamsAs(event, z.object({ id: z.string().uuid() }), 'device')
  const own = person.role === 'administrator' ? and(eq(devices.id, id), isNotNull(devices.personId)) : and(eq(devices.id, id), eq(devices.personId, person.id))
  const [revoked] = await useDatabase().update(devices).set({ revokedAt: new Date(), revokedBy: person.id }).where(and(own, isNull(devices.revokedAt))).returning({ id: devices.id, revokedAt: devices.revokedAt })
  return revoked ?? notFound('device')
})
