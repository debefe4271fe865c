import { eq } from 'drizzle-orm'
import { signInSchema } from '../../../shared/schemas/people'
import { people } from '../../database/schema'
import { useDatabase } from '../database'
import { clearWrongPasswords, countWrongPassword, signInWait } from './limits'
import { passwordMatches } from './password'

/** Why a sign-in failed, as the sign-in page is told in its address: never which of e-mail and password was wrong. */
export const TOO_MANY = 'too-many'
export const AWAY = 'away'

/**
 * The account of an e-mail and password. Null: unknown, wrong or switched off.
 * @throws Error(TOO_MANY), Error(AWAY)
 */
export async function signIn(input: unknown, address: string): Promise<typeof people.$inferSelect | null> {
  try {
    return await check(input, address)
  } catch (error) {
    if (error instanceof Error && error.message === TOO_MANY) throw error
    // The message goes into an address; what the database said belongs in the server's own log.
    console.error('Sign-in failed', error)
    throw new Error(AWAY)
  }
}

async function check(input: unknown, address: string): Promise<typeof people.$inferSelect | null> {
  const parsed = signInSchema.safeParse(input)
  if (!parsed.success) return null
  const { email, password } = parsed.data
  if (await signInWait(email, address) > 0) throw new Error(TOO_MANY)
  const [person] = await useDatabase().select().from(people).where(eq(people.email, email))
  const right = await passwordMatches(person?.passwordHash ?? null, password)
  if (!right || !person || person.disabledAt) {
    await countWrongPassword(email, address)
    return null
  }
  await clearWrongPasswords(email)
  return person
}
