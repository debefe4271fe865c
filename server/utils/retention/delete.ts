import { and, eq } from 'drizzle-orm'
import { canonicalText } from '../../../shared/record/canonical'
import type { DeletionFile, DeletionStatement, SignedDeletion } from '../../../shared/record/deletion'
import { DELETION_FRESH_MS, deletionBytes, factsOf } from '../../../shared/record/deletion'
import { happenedAt } from '../../../shared/record/entry'
import { controllers, deletions, devices, entries, fileRemovals, files, legalHolds, outages, refusals } from '../../database/schema'
import type { Person } from '../access'
import { keepChange } from '../changes/keep'
import type { Database, Queries } from '../database'
import { conflict, forbidden, notFound, unprocessable } from '../errors'
import { verifyBytes } from '../record/keys'
import type { OutageRow } from '../record/log'
import { readEntries, readState } from '../record/log'
import { recordRetention } from './holds'
import { readDeletion } from './tombstone'

/**
 * Deletes a record by an administrator's signed statement. Its row is written first; the database then lets
 * the log go in this transaction alone (a trigger), and refuses by itself what is held, has not ended or is to
 * be kept still. The files' bytes are taken away after the commit.
 * The same statement again is answered with what stays.
 * @param now Unix ms
 * @throws 403 device or signer, 404, 409 held, too early or another record than was signed, 422 a field of the statement
 */
export async function deleteRecord(db: Database, person: Person, outageId: string, { statement, signature }: SignedDeletion, now: number): Promise<{ file: DeletionFile, fresh: boolean }> {
  return db.transaction(async (tx) => {
    const [outage] = await tx.select().from(outages).where(eq(outages.id, outageId)).for('update')
    if (!outage) return again(tx, outageId, statement)
    await checkSigner(tx, person, { statement, signature }, now)
    await checkRecord(tx, outage, statement, now)
    await writeDeletion(tx, person, outage, { statement, signature }, now)
    await letGo(tx, outageId, now)
    await keepChange(tx, person, { subject: 'record', subjectId: outageId, subjectName: outage.code, siteId: outage.siteId, deed: 'deleted', fields: [{ field: 'reason', before: statement.reason, after: null }] }, now)
    return { file: await readDeletion(tx, outageId) ?? notFound('record'), fresh: true }
  })
}

/** The record is gone: by this very statement, by another one, or it never was. */
async function again(tx: Queries, outageId: string, statement: DeletionStatement): Promise<{ file: DeletionFile, fresh: boolean }> {
  const file = await readDeletion(tx, outageId)
  if (!file) return notFound('outage')
  return canonicalText(file.statement) === canonicalText(statement) ? { file, fresh: false } : conflict('This record was deleted already, by another statement')
}

async function checkSigner(tx: Queries, person: Person, { statement, signature }: SignedDeletion, now: number): Promise<void> {
  if (statement.by !== person.id) forbidden('A statement is sent by the person who signed it')
  const [device] = await tx.select().from(devices).where(and(eq(devices.id, statement.device), eq(devices.personId, person.id)))
  if (!device) return forbidden('This device is not enrolled for you')
  if (device.revokedAt) forbidden('This device was revoked')
  if (!verifyBytes(deletionBytes(statement), signature, device.publicKey)) unprocessable('signature', 'The signature does not fit the statement')
  if (statement.name !== person.name) unprocessable('statement.name', 'The printed name is not yours')
  if (Math.abs(happenedAt(statement) - now) > DELETION_FRESH_MS) unprocessable('statement.at', 'This was signed too long ago, or by a clock that is wrong: sign it anew')
}

/** Whether what was signed is the record that is there, and it may go. */
async function checkRecord(tx: Queries, outage: OutageRow, statement: DeletionStatement, now: number): Promise<void> {
  const { years, ended, over, held, files: fileCount } = await recordRetention(tx, outage)
  if (held) conflict('This record is under legal hold: it cannot be deleted until the hold is lifted')
  if (!ended || over === null) return conflict('This outage has not ended: its retention has not begun')
  if (Date.parse(over) > now) conflict(`This record is to be kept until ${over.slice(0, 10)}`)
  const [log, state] = [await readEntries(tx, outage.id), await readState(tx, outage)]
  const present = factsOf(state, log, { years, over, files: fileCount })
  for (const field of Object.keys(present) as (keyof typeof present)[]) {
    if (canonicalText(statement[field]) !== canonicalText(present[field])) conflict(`The record is not the one that was signed for: its ${field} is another. Read it again`, `statement.${field}`)
  }
}

async function writeDeletion(tx: Queries, person: Person, outage: OutageRow, { statement, signature }: SignedDeletion, now: number): Promise<void> {
  const [controller] = await tx.select({ name: controllers.name }).from(controllers).where(eq(controllers.id, outage.controllerId))
  await tx.insert(deletions).values({
    outageId: outage.id, code: outage.code, siteId: outage.siteId, controllerName: controller!.name, workKind: outage.workKind, planned: outage.planned,
    openedAt: outage.openedAt, endedAt: outage.endedAt, size: statement.size, root: statement.root, statement: canonicalText(statement), signature,
    personId: person.id, deviceId: statement.device, checkpoint: outage.checkpoint, deletedAt: new Date(now),
  })
}

/** Takes away all that hangs on an outage, and the outage; its files are noted, to be removed from storage. */
async function letGo(tx: Queries, outageId: string, now: number): Promise<void> {
  const held = await tx.delete(files).where(eq(files.outageId, outageId)).returning({ sha256: files.sha256 })
  if (held.length > 0) await tx.insert(fileRemovals).values(held.map(({ sha256 }) => ({ sha256, outageId, askedAt: new Date(now) }))).onConflictDoNothing()
  for (const table of [legalHolds, refusals, entries]) await tx.delete(table).where(eq(table.outageId, outageId))
  await tx.delete(outages).where(eq(outages.id, outageId))
}
