import { eq } from 'drizzle-orm'
import type { H3Event } from 'h3'
import { getRequestIP } from 'h3'
import { people } from '../../database/schema'
import type { Person } from '../access'
import { useDatabase } from '../database'
import { tooMany, unprocessable } from '../errors'
import { countWrongPassword, signInWait } from './limits'
import { passwordMatches } from './password'

/** Asks for the password of the person who is signed in once more; wrong: 422, too often: 429. */
export async function requirePassword(event: H3Event, person: Person, password: string, field: string): Promise<void> {
  const address = getRequestIP(event, { xForwardedFor: process.env.HOLDOVER_TRUST_PROXY === '1' }) ?? 'unknown'
  const wait = await signInWait(person.email, address)
  if (wait > 0) tooMany(`Too many wrong passwords; wait ${Math.ceil(wait / 60)} minutes`, wait)
  const [row] = await useDatabase().select({ hash: people.passwordHash }).from(people).where(eq(people.id, person.id))
  if (await passwordMatches(row?.hash ?? null, password)) return
  await countWrongPassword(person.email, address)
  unprocessable(field, 'This is not your password')
}
