import { eq, sql } from 'drizzle-orm'
import { passwordChangeSchema } from '~~/shared/schemas/people'
import { people } from '~~/server/database/schema'
import { requirePerson } from '~~/server/utils/access'
import { useDatabase } from '~~/server/utils/database'
import { readBodyAs } from '~~/server/utils/parse'
import { requirePassword } from '~~/server/utils/people/fresh'
import { writePasswordSet } from '~~/server/utils/people/mails'
import { hashPassword } from '~~/server/utils/people/password'

/** Changes the password and ends every session of the account, this one too: sign in again with the new one. */
export default defineEventHandler(async (event) => {
  const person = requirePerson(event)
  const { current, next } = await readBodyAs(event, passwordChangeSchema)
  await requirePassword(event, person, current, 'current')
  const passwordHash = await hashPassword(next)
  await useDatabase().transaction(async (tx) => {
    await tx.update(people).set({ passwordHash, mustChangePassword: false, invitedAt: null, sessionVersion: sql`${people.sessionVersion} + 1` }).where(eq(people.id, person.id))
    await writePasswordSet(tx, person, 'changed', Date.now())
  })
  return { changed: true }
})
