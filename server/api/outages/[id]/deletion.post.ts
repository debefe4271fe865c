import { signedDeletionSchema } from '~~/shared/record/deletion'
import { requireRole } from '~~/server/utils/access'
import { useDatabase } from '~~/server/utils/database'
import { unprocessable } from '~~/server/utils/errors'
import { fileStorage } from '~~/server/utils/files/storage'
import { readBodyAs } from '~~/server/utils/parse'
import { deleteRecord } from '~~/server/utils/retention/delete'
import { removeFiles } from '~~/server/utils/retention/removals'
import { requireRecordId } from '~~/server/utils/retention/tombstone'

/** Deletes a record by the administrator's signed statement; 201 with what stays, 200 when the same statement comes again. */
export default defineEventHandler(async (event) => {
  const person = requireRole(event, 'administrator')
  const id = await requireRecordId(event)
  const signed = await readBodyAs(event, signedDeletionSchema)
  if (signed.statement.outage !== id) unprocessable('statement.outage', 'The statement is about another outage')
  const { file, fresh } = await deleteRecord(useDatabase(), person, id, signed, Date.now())
  // What cannot be removed now is noted, and removed later.
  await removeFiles(useDatabase(), fileStorage()).catch(error => console.error('Files of a deleted record wait to be removed', error))
  setResponseStatus(event, fresh ? 201 : 200)
  return file
})
