import { sql } from 'drizzle-orm'
import { setupSchema } from '~~/shared/schemas/people'
import { people } from '~~/server/database/schema'
import { useDatabase } from '~~/server/utils/database'
import { forbidden } from '~~/server/utils/errors'
import { readBodyAs } from '~~/server/utils/parse'
import { hashPassword } from '~~/server/utils/people/password'

/** Makes the first administrator; closed as soon as anybody exists. */
export default defineEventHandler(async (event) => {
  const { email, name, password } = await readBodyAs(event, setupSchema)
  const passwordHash = await hashPassword(password)
  const made = await useDatabase().transaction(async (tx) => {
    await tx.execute(sql`lock table ${people} in share row exclusive mode`)
    const [anybody] = await tx.select({ id: people.id }).from(people).limit(1)
    if (anybody) return false
    await tx.insert(people).values({ email, name, role: 'administrator', passwordHash })
    return true
  })
  if (!made) return forbidden('Holdover is set up already; ask an administrator for an account')
  setResponseStatus(event, 201)
  return { email }
})
