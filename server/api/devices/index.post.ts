import { eq, or } from 'drizzle-orm'
import { deviceEnrolSchema } from '~~/shared/schemas/people'
import { devices } from '~~/server/database/schema'
import { requireRole } from '~~/server/utils/access'
import { useDatabase } from '~~/server/utils/database'
import { conflict } from '~~/server/utils/errors'
import { readBodyAs } from '~~/server/utils/parse'
import { requirePassword } from '~~/server/utils/people/fresh'

/** Registers a device's public key for the person, who gives their password once more. */
export default defineEventHandler(async (event) => {
  const person = requireRole(event, 'technician', 'supervisor')
  const { id, name, publicKey, password } = await readBodyAs(event, deviceEnrolSchema)
  await requirePassword(event, person, password, 'password')
  const db = useDatabase()
  const [known] = await db.select().from(devices).where(or(eq(devices.id, id), eq(devices.publicKey, publicKey)))
  if (known && (known.personId !== person.id || known.id !== id || known.publicKey !== publicKey)) return conflict('This key or device is registered already', 'publicKey')
  if (!known) await db.insert(devices).values({ id, personId: person.id, name, publicKey, enrolledAt: new Date() })
  setResponseStatus(event, known ? 200 : 201)
  return { id, name, publicKey }
})
