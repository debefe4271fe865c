import { eq } from 'drizzle-orm'
import type { H3Event } from 'h3'
import { z } from 'zod'
import type { DeletionFile, DeletionStatement } from '../../../shared/record/deletion'
import { deletions, devices, outages, sites } from '../../database/schema'
import { maySeeSite, requirePerson } from '../access'
import type { Queries } from '../database'
import { useDatabase } from '../database'
import { notFound } from '../errors'
import { readParamsAs } from '../parse'

const params = z.object({ id: z.string().uuid().toLowerCase() })

/** What stays of the deleted record that the route names, if its site is the person's to see; else 404. */
export async function requireDeletion(event: H3Event): Promise<DeletionFile> {
  const person = requirePerson(event)
  const { id } = readParamsAs(event, params, 'deleted record')
  const db = useDatabase()
  const [row] = await db.select({ siteId: deletions.siteId }).from(deletions).where(eq(deletions.outageId, id))
  if (!row || !await maySeeSite(person, row.siteId)) return notFound('deleted record')
  return await readDeletion(db, id) ?? notFound('deleted record')
}

/** The id of a record that the route names, whether it is there or was deleted; else 404. For administrators, who see every site. */
export async function requireRecordId(event: H3Event): Promise<string> {
  const { id } = readParamsAs(event, params, 'outage')
  const db = useDatabase()
  const [there, gone] = await Promise.all([db.$count(outages, eq(outages.id, id)), db.$count(deletions, eq(deletions.outageId, id))])
  return there + gone > 0 ? id : notFound('outage')
}

/** What stays of a deleted record, with what it takes to verify it; null where none was deleted. */
export async function readDeletion(db: Queries, outageId: string): Promise<DeletionFile | null> {
  const [row] = await db.select({ deletion: deletions, device: devices, timeZone: sites.timeZone }).from(deletions)
    .innerJoin(devices, eq(devices.id, deletions.deviceId)).innerJoin(sites, eq(sites.id, deletions.siteId)).where(eq(deletions.outageId, outageId))
  if (!row) return null
  const { deletion, device, timeZone } = row
  return {
    format: 'holdover-deletion',
    version: 1,
    statement: JSON.parse(deletion.statement) as DeletionStatement,
    signature: deletion.signature,
    signer: { device: device.id, deviceName: device.name, publicKey: device.publicKey, enrolledAt: device.enrolledAt.toISOString() },
    checkpoint: deletion.checkpoint,
    serverKey: deletion.checkpoint ? await keyOf(db, deletion.checkpoint.statement.key) : null,
    deletedAt: deletion.deletedAt.toISOString(),
    outage: { controller: deletion.controllerName, workKind: deletion.workKind, planned: deletion.planned, openedAt: deletion.openedAt.toISOString(), endedAt: deletion.endedAt?.toISOString() ?? null, timeZone },
  }
}

async function keyOf(db: Queries, id: string): Promise<DeletionFile['serverKey']> {
  const [key] = await db.select({ id: devices.id, publicKey: devices.publicKey }).from(devices).where(eq(devices.id, id))
  return key ?? null
}
