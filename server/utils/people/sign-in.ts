import { eq } from 'drizzle-orm'
import { signInSchema } from '../../../shared/schemas/people'
import { people } from '../../database/schema'
import { useDatabase } from '../database'
import { clearWrongPasswords, countWrongPassword, signInWait } from './limits'
import { passwordMatches } from './password'

/** Why a sign-in failed, as the sign-in page is told: never which of e-mail and password was wrong. */
export const WRONG = 'wrong'
export const TOO_MANY = 'too-many'

/** The account of an e-mail and password. Null: unknown, wrong or switched off. @throws Error(TOO_MANY) */
export async function signIn(input: unknown, address: string): Promise<typeof people.$inferSelect | null> {
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
