import { z } from 'zod'
import { FILE_MAX_BYTES } from '~~/shared/pictures/limits'
import { requireRole } from '~~/server/utils/access'
import { useDatabase } from '~~/server/utils/database'
import { readRaw } from '~~/server/utils/files/body'
import { keepFile } from '~~/server/utils/files/keep'
import { fileStorage } from '~~/server/utils/files/storage'
import { requireOutage } from '~~/server/utils/outages'
import { readParamsAs } from '~~/server/utils/parse'

const params = z.object({ id: z.string().uuid(), sha256: z.string().regex(/^[0-9a-f]{64}$/) })

/** Takes a photo or drawing that an entry names by its SHA-256. 201 at first, 200 when it was held already. */
export default defineEventHandler(async (event) => {
  const { outage } = await requireOutage(event)
  const person = requireRole(event, 'technician', 'supervisor')
  const { sha256 } = readParamsAs(event, params, 'file')
  const bytes = await readRaw(event, FILE_MAX_BYTES)
  const { file, fresh } = await keepFile(useDatabase(), fileStorage(), { outageId: outage.id, personId: person.id, sha256, bytes })
  setResponseStatus(event, fresh ? 201 : 200)
  return file
})
