import { recordQuerySchema } from '~~/shared/schemas/record-filter'
import { requirePerson } from '~~/server/utils/access'
import { readQueryAs } from '~~/server/utils/parse'
import { listRecords } from '~~/server/utils/records/list'

/** Records that the person may see and looks for, by keyset pages; the first says how many there are. */
export default defineEventHandler(async (event) => {
  const person = requirePerson(event)
  return listRecords(person, readQueryAs(event, recordQuerySchema))
})
