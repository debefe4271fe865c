import { INVITATION_HOURS, RESET_HOURS } from '../../../shared/schemas/people'
import type { people } from '../../database/schema'
import { deviceEnrolled, invitation, passwordReset, passwordSet } from '../../emails/account'
import type { Queries } from '../database'
import { linkTo, placeOf } from '../mail/places'
import { writeMail } from '../mail/write'

const HOUR = 3_600_000
type Row = Pick<typeof people.$inferSelect, 'id' | 'email' | 'name' | 'role' | 'sessionVersion'>
type Owner = Pick<Row, 'id' | 'email' | 'name'>

/** The link names the account's present session version: once a password was set, or the role changed, it opens nothing. */
const says = ({ id, sessionVersion }: Row) => [id, String(sessionVersion)]

/** Invites somebody to choose a password. @param by name of the administrator. @param now Unix ms */
export async function writeInvitation(db: Queries, person: Row, by: string, now: number): Promise<void> {
  const until = now + INVITATION_HOURS * HOUR
  const text = invitation({ name: person.name, by, role: person.role, until, url: linkTo('invitation', { says: says(person), until }) })
  await writeMail(db, { ...text, kind: 'invitation', key: `invitation ${person.id} ${now}`, to: person.email, personId: person.id }, now)
}

/** A link to a new password. @param now Unix ms */
export async function writePasswordReset(db: Queries, person: Row, now: number): Promise<void> {
  const until = now + RESET_HOURS * HOUR
  const text = passwordReset({ name: person.name, until, url: linkTo('password-reset', { says: says(person), until }) })
  await writeMail(db, { ...text, kind: 'password-reset', key: `password-reset ${person.id} ${now}`, to: person.email, personId: person.id }, now)
}

/** Tells the owner of an account that its password is a new one. @param now Unix ms */
export async function writePasswordSet(db: Queries, person: Owner, how: 'changed' | 'reset' | 'given', now: number): Promise<void> {
  await writeMail(db, { ...passwordSet({ name: person.name, at: now, how }), kind: 'password-set', key: `password-set ${person.id} ${now}`, to: person.email, personId: person.id }, now)
}

/** Tells the owner of an account that a device signs in their name. @param now Unix ms */
export async function writeDeviceEnrolled(db: Queries, person: Owner, { id, name, replaced }: { id: string, name: string, replaced: boolean }, now: number): Promise<void> {
  const text = deviceEnrolled({ name: person.name, device: name, at: now, replaced, url: placeOf('/account') })
  await writeMail(db, { ...text, kind: 'device-enrolled', key: `device ${id}`, to: person.email, personId: person.id }, now)
}
