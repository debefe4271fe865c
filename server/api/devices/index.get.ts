import { asc, eq } from 'drizzle-orm'
import { devices } from '~~/server/database/schema'
import { requirePerson } from '~~/server/utils/access'
import { useDatabase } from '~~/server/utils/database'

/** The person's own signing devices. */
export default defineEventHandler(async (event) => {
  const person = requirePerson(event)
  return useDatabase().select({ id: devices.id, name: devices.name, publicKey: devices.publicKey, enrolledAt: devices.enrolledAt, revokedAt: devices.revokedAt }).from(devices).where(eq(devices.personId, person.id)).orderBy(asc(devices.enrolledAt))
})
