import { asc, eq, inArray, sql } from 'drizzle-orm'
import type { z } from 'zod'
import type { PersonItem, personCreateSchema, personUpdateSchema } from '../../../shared/schemas/people'
import { people, siteAccess, sites } from '../../database/schema'
import { differences } from '../changes/differences'
import type { Changer } from '../changes/keep'
import { keepChange } from '../changes/keep'
import type { Queries } from '../database'
import { useDatabase } from '../database'
import { conflict, notFound, unprocessable } from '../errors'
import { isMailOn } from '../mail/settings'
import { clearWrongPasswords } from './limits'
import { writeInvitation, writePasswordSet } from './mails'
import { hashPassword, nobodysPassword } from './password'

type Row = typeof people.$inferSelect

/**
 * Makes an account with a password that its owner must change, or, without one, invites them by mail.
 * 409 for an e-mail address in use; 422 for an invitation where mail is off.
 */
export async function createPerson(by: Changer, { email, name, role, password, siteIds }: z.output<typeof personCreateSchema>): Promise<PersonItem> {
  const invited = password === null
  if (invited && !isMailOn()) return unprocessable('password', 'Mail is off here: give a temporary password')
  const passwordHash = await hashPassword(password ?? nobodysPassword())
  const now = new Date()
  return useDatabase().transaction(async (tx) => {
    const [row] = await tx.insert(people).values({ email, name, role, passwordHash, mustChangePassword: true, invitedAt: invited ? now : null }).onConflictDoNothing({ target: people.email }).returning()
    if (!row) return conflict('Somebody has this e-mail address already', 'email')
    const item = itemOf(row, await setSites(tx, row, siteIds))
    if (invited) await writeInvitation(tx, row, by.name, now.getTime())
    await keepPerson(tx, by, item, {}, { ...await toldPerson(tx, item), ...invited ? { invited: 'by mail' } : {} })
    return item
  })
}

/** Writes the invitation of somebody again who has not chosen a password yet. 404 for nobody; 409 where there is nothing to invite to. */
export async function inviteAgain(id: string, by: Changer): Promise<PersonItem> {
  const now = new Date()
  return useDatabase().transaction(async (tx) => {
    const [before] = await tx.select().from(people).where(eq(people.id, id)).for('update')
    if (!before) return notFound('person')
    if (!isMailOn()) return conflict('Mail is off here: give a temporary password')
    if (before.disabledAt) return conflict('The account is switched off')
    if (before.invitedAt === null) return conflict('They were not invited, or chose a password already')
    const [row] = await tx.update(people).set({ invitedAt: now }).where(eq(people.id, id)).returning()
    const item = itemOf(row!, await sitesOf(tx, id))
    await writeInvitation(tx, row!, by.name, now.getTime())
    await keepPerson(tx, by, item, await toldPerson(tx, item), { ...await toldPerson(tx, item), invited: 'again, by mail' })
    return item
  })
}

/**
 * Changes an account. A change of role, password or of being switched off ends all its sessions.
 * 409 when no administrator would be left.
 */
export async function updatePerson(id: string, by: Changer, change: z.output<typeof personUpdateSchema>): Promise<PersonItem> {
  const passwordHash = change.password === undefined ? undefined : await hashPassword(change.password)
  const item = await useDatabase().transaction(async (tx) => {
    // Locked with all administrators, so that two of them cannot switch each other off at once.
    const locked = await tx.select().from(people).where(sql`${people.id} = ${id} or ${people.role} = 'administrator'`).orderBy(asc(people.id)).for('update')
    const before = locked.find(row => row.id === id)
    if (!before) return notFound('person')
    const told = await toldPerson(tx, itemOf(before, await sitesOf(tx, id)))
    const role = change.role ?? before.role
    const disabledAt = change.disabled === undefined ? before.disabledAt : change.disabled ? before.disabledAt ?? new Date() : null
    const staysAdministrator = role === 'administrator' && !disabledAt
    if (!staysAdministrator && isLastAdministrator(before, locked)) {
      return conflict('This is the last administrator: make another one first', change.disabled ? 'disabled' : 'role')
    }
    const endsSessions = role !== before.role || Boolean(disabledAt) !== Boolean(before.disabledAt) || passwordHash !== undefined
    const [row] = await tx.update(people).set({
      name: change.name ?? before.name,
      role,
      disabledAt,
      ...(passwordHash === undefined ? {} : { passwordHash, mustChangePassword: true, invitedAt: null }),
      ...(endsSessions ? { sessionVersion: sql`${people.sessionVersion} + 1` } : {}),
    }).where(eq(people.id, id)).returning()
    const changed = itemOf(row!, await setSites(tx, row!, change.siteIds))
    if (passwordHash !== undefined) await writePasswordSet(tx, row!, 'given', Date.now())
    await keepPerson(tx, by, changed, told, { ...await toldPerson(tx, changed), ...passwordHash === undefined ? {} : { password: 'given anew' } })
    return changed
  })
  if (passwordHash !== undefined) await clearWrongPasswords(item.email)
  return item
}

function isLastAdministrator(person: Row, administrators: Row[]): boolean {
  const acts = (row: Row) => row.role === 'administrator' && !row.disabledAt
  return acts(person) && !administrators.some(row => row.id !== person.id && acts(row))
}

/** Writes which sites a person may see, when they are given; an administrator sees all and has none written. */
async function setSites(tx: Queries, person: Row, siteIds: string[] | undefined): Promise<string[]> {
  const wanted = person.role === 'administrator' ? [] : siteIds
  if (wanted !== undefined) {
    const distinct = [...new Set(wanted)]
    const known = distinct.length > 0 ? await tx.select({ id: sites.id }).from(sites).where(inArray(sites.id, distinct)) : []
    if (known.length < distinct.length) return unprocessable('siteIds', 'One of these sites does not exist')
    await tx.delete(siteAccess).where(eq(siteAccess.personId, person.id))
    if (distinct.length > 0) await tx.insert(siteAccess).values(distinct.map(siteId => ({ personId: person.id, siteId })))
  }
  return sitesOf(tx, person.id)
}

async function sitesOf(tx: Queries, person: string): Promise<string[]> {
  const rows = await tx.select({ siteId: siteAccess.siteId }).from(siteAccess).where(eq(siteAccess.personId, person))
  return rows.map(row => row.siteId)
}

/** A person as the history tells them: sites by name, and no password. */
async function toldPerson(tx: Queries, { email, name, role, siteIds, disabledAt }: PersonItem): Promise<Record<string, unknown>> {
  const rows = siteIds.length > 0 ? await tx.select({ name: sites.name }).from(sites).where(inArray(sites.id, siteIds)).orderBy(asc(sites.name)) : []
  return { email, name, role, sites: rows.map(row => row.name), switchedOff: disabledAt !== null }
}

async function keepPerson(tx: Queries, by: Changer, { id, name }: PersonItem, before: Record<string, unknown>, after: Record<string, unknown>): Promise<void> {
  const deed = Object.keys(before).length === 0 ? 'added' : 'changed'
  await keepChange(tx, by, { subject: 'person', subjectId: id, subjectName: name, siteId: null, deed, fields: differences(before, after) })
}

/** An account as an administrator sees it. */
export function itemOf(row: Row, siteIds: string[]): PersonItem {
  const { id, email, name, role, mustChangePassword, invitedAt, disabledAt, createdAt } = row
  return { id, email, name, role, siteIds: [...siteIds].sort(), mustChangePassword, invitedAt: invitedAt?.toISOString() ?? null, disabledAt: disabledAt?.toISOString() ?? null, createdAt: createdAt.toISOString() }
}
