import { z } from 'zod'
import { requirePerson } from '~~/server/utils/access'
import { readQueryAs } from '~~/server/utils/parse'
import { listDeleted } from '~~/server/utils/retention/lists'

const query = z.object({ after: z.string().max(200).optional() })

/** What stays of the records that were deleted at the person's sites, the latest first, by keyset pages. */
export default defineEventHandler(async (event) => {
  const person = requirePerson(event)
  return listDeleted(person, readQueryAs(event, query).after)
})
