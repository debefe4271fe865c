import { eq } from 'drizzle-orm'
import { people } from '../../database/schema'
import type { Person } from '../access'
import { useDatabase } from '../database'

/**
 * The person of a session token, or null. The token must name a living account and its present
 * session version: a token without a user (CVE-2023-48309) or from before a password change is nobody's.
 */
export async function resolvePerson(token: { sub?: unknown, sessionVersion?: unknown } | null): Promise<Person | null> {
  if (typeof token?.sub !== 'string' || typeof token.sessionVersion !== 'number') return null
  const [row] = await useDatabase().select().from(people).where(eq(people.id, token.sub))
  if (!row || row.disabledAt || row.sessionVersion !== token.sessionVersion) return null
  return { id: row.id, name: row.name, email: row.email, role: row.role, mustChangePassword: row.mustChangePassword }
}
