import { and, eq, isNull, or } from 'drizzle-orm'
import { deviceEnrolSchema } from '~~/shared/schemas/people'
import { devices } from '~~/server/database/schema'
import { requireRole } from '~~/server/utils/access'
import { useDatabase } from '~~/server/utils/database'
import { conflict } from '~~/server/utils/errors'
import { readBodyAs } from '~~/server/utils/parse'
import { writeDeviceEnrolled } from '~~/server/utils/people/mails'
import { requirePassword } from '~~/server/utils/people/fresh'

/** Registers a device's public key for the person, who gives their password once more; the key that it replaces is revoked with it. */
export default defineEventHandler(async (event) => {
  const person = requireRole(event, 'technician', 'supervisor', 'administrator')
  const { id, name, publicKey, password, replaces } = await readBodyAs(event, deviceEnrolSchema)
  await requirePassword(event, person, password, 'password')
  const db = useDatabase()
  const [known] = await db.select().from(devices).where(or(eq(devices.id, id), eq(devices.publicKey, publicKey)))
  if (known && (known.personId !== person.id || known.id !== id || known.publicKey !== publicKey)) return conflict('This key or device is registered already', 'publicKey')
  const now = new Date()
  await db.transaction(async (tx) => {
    if (!known) {
      await tx.insert(devices).values({ id, personId: person.id, name, publicKey, enrolledAt: now })
      await writeDeviceEnrolled(tx, person, { id, name, replaced: replaces !== null && replaces !== id }, now.getTime())
    }
    if (replaces !== null && replaces !== id) {
      await tx.update(devices).set({ revokedAt: now, revokedBy: person.id, replacedBy: id })
        .where(and(eq(devices.id, replaces), eq(devices.personId, person.id), isNull(devices.revokedAt)))
    }
  })
  setResponseStatus(event, known ? 200 : 201)
  return { id, name, publicKey }
})
