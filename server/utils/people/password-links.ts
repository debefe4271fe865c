import { and, eq, isNull, sql } from 'drizzle-orm'
import type { PasswordLink } from '../../../shared/schemas/people'
import { people } from '../../database/schema'
import type { Database, Queries } from '../database'
import { gone, notFound } from '../errors'
import { openLink } from '../mail/links'
import { linkSecret } from '../mail/places'
import { clearWrongPasswords } from './limits'
import { writePasswordReset, writePasswordSet } from './mails'
import { hashPassword } from './password'

export const PASSWORD_PURPOSES = ['invitation', 'password-reset'] as const
export type PasswordPurpose = (typeof PASSWORD_PURPOSES)[number]

type Row = typeof people.$inferSelect

/** The account that a link is for. 404: altered; 410: expired, used, or no longer of this account. */
async function requireLink(db: Queries, purpose: PasswordPurpose, token: string, now: number): Promise<{ person: Row, until: number }> {
  const link = openLink(linkSecret(), purpose, token, now)
  if (!link.ok) return link.why === 'expired' ? gone('This link has expired') : notFound('link')
  const [id = '', version = ''] = link.says
  const [person] = await db.select().from(people).where(eq(people.id, id)).for('update')
  if (!person || person.disabledAt || String(person.sessionVersion) !== version) return gone('This link was used, or the account has changed since')
  return { person, until: link.until }
}

/** Whose password a link is about. @param now Unix ms */
export async function readPasswordLink(db: Database, purpose: PasswordPurpose, token: string, now: number): Promise<PasswordLink> {
  const { person, until } = await db.transaction(tx => requireLink(tx, purpose, token, now))
  return { name: person.name, email: person.email, until: new Date(until).toISOString() }
}

/** Sets the password of the account that a link is for; every session ends, and the link opens nothing any more. @param now Unix ms */
export async function setPasswordByLink(db: Database, purpose: PasswordPurpose, token: string, password: string, now: number): Promise<void> {
  const passwordHash = await hashPassword(password)
  const email = await db.transaction(async (tx) => {
    const { person } = await requireLink(tx, purpose, token, now)
    await tx.update(people).set({ passwordHash, mustChangePassword: false, invitedAt: null, sessionVersion: sql`${people.sessionVersion} + 1` }).where(eq(people.id, person.id))
    if (purpose === 'password-reset') await writePasswordSet(tx, person, 'reset', now)
    return person.email
  })
  await clearWrongPasswords(email)
}

/** Writes a link to a new password, where somebody has an account under that address. @param now Unix ms */
export async function askForPassword(db: Database, email: string, now: number): Promise<void> {
  await db.transaction(async (tx) => {
    const [person] = await tx.select().from(people).where(and(eq(people.email, email), isNull(people.disabledAt)))
    if (person) await writePasswordReset(tx, person, now)
  })
}
