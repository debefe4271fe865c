import { eq } from 'drizzle-orm'
import type { H3Event } from 'h3'
import { createError, getRequestHeader, readRawBody } from 'h3'
import { z } from 'zod'
import { FILE_MAX_BYTES } from '../../../shared/import/limits'
import { readPointList } from '../../../shared/import/points'
import type { ImportPreview } from '../../../shared/import/preview'
import { points } from '../../database/schema'
import { differences } from '../changes/differences'
import type { Changer } from '../changes/keep'
import { keepChange } from '../changes/keep'
import { tooLarge, unprocessable, unreadable } from '../errors'
import { readBodyAs } from '../parse'
import { landPoints, previewOf } from './land-points'
import { withSite } from './store'

/** JSON may need two bytes and more for one of the file's. */
const JSON_MAX_BYTES = 3 * FILE_MAX_BYTES
const body = z.object({ text: z.string({ required_error: 'Send the list as text' }) })

/** The point list in a request: `{"text": …}`, or the file itself as text/csv. 413: more than 2 MB. */
export async function readListText(event: H3Event): Promise<string> {
  if ((getRequestHeader(event, 'content-type') ?? '').startsWith('application/json')) {
    const { text } = await readBodyAs(event, body, JSON_MAX_BYTES)
    return Buffer.byteLength(text) > FILE_MAX_BYTES ? tooLarge('The file is larger than 2 MB') : text
  }
  if (Number(getRequestHeader(event, 'content-length') ?? 0) > FILE_MAX_BYTES) return tooLarge('The file is larger than 2 MB')
  const bytes = await readRawBody(event, false)
  if (!bytes || bytes.length === 0) return unreadable('The body is empty; send the list')
  if (bytes.length > FILE_MAX_BYTES) return tooLarge('The file is larger than 2 MB')
  try {
    return new TextDecoder('utf-8', { fatal: true, ignoreBOM: true }).decode(bytes)
  } catch {
    return unprocessable('text', 'The file is not UTF-8; save it as "CSV UTF-8"')
  }
}

/** Each row as it would land and each fault; nothing is stored. */
export async function previewPoints(siteId: string, controllerId: string, text: string): Promise<ImportPreview> {
  return withSite(siteId, async (_tx, site) => {
    const { landings, faults } = landPoints(readPointList(text), site, controllerId)
    return previewOf(landings, faults, site, controllerId)
  })
}

/** Stores a list that has no fault, all of it or nothing, and says what came of it. 422 with all faults where it has any. */
export async function importPoints(siteId: string, by: Changer, controllerId: string, text: string): Promise<ImportPreview> {
  return withSite(siteId, async (tx, site) => {
    const { landings, faults } = landPoints(readPointList(text), site, controllerId)
    if (faults.length > 0) {
      const reason = `${faults.length} ${faults.length === 1 ? 'fault' : 'faults'}; nothing was imported`
      throw createError({ statusCode: 422, statusMessage: 'Unprocessable Content', message: reason, data: { field: 'text', reason, faults } })
    }
    const added = landings.filter(landing => landing.id === null).map(landing => landing.point)
    if (added.length > 0) await tx.insert(points).values(added)
    for (const { id, point, landed } of landings) {
      if (id !== null && landed.outcome === 'changed') await tx.update(points).set(point).where(eq(points.id, id))
    }
    const changed = landings.filter(({ id, landed }) => id !== null && landed.outcome === 'changed').map(({ point }) => point)
    const tags = (list: { tag: string }[]) => list.length > 0 ? list.map(({ tag }) => tag) : null
    if (added.length + changed.length > 0) {
      await keepChange(tx, by, {
        subject: 'points', subjectId: controllerId, subjectName: `Point list of ${site.controllers.find(({ id }) => id === controllerId)?.name ?? 'the controller'}`, siteId, deed: 'changed',
        fields: differences({}, { addedPoints: tags(added), changedPoints: tags(changed) }),
      })
    }
    return previewOf(landings, [], site, controllerId)
  })
}
