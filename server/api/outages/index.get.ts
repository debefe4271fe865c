import { z } from 'zod'
import { PHASES } from '~~/shared/record/phases'
import { requirePerson } from '~~/server/utils/access'
import { readQueryAs } from '~~/server/utils/parse'
import { listOutages } from '~~/server/utils/record/list'

const PAGE_MAX = 100
const query = z.object({
  phase: z.string().optional().transform(text => text ? text.split(',') : []).pipe(z.array(z.enum(PHASES, { errorMap: () => ({ message: `One or more of ${PHASES.join(', ')}, with commas` }) })).max(PHASES.length)),
  site: z.string().uuid('The id of a site').optional(),
  after: z.string().max(200).optional(),
  limit: z.coerce.number().int().min(1).max(PAGE_MAX, `At most ${PAGE_MAX}`).default(50),
})

/** Outages that the person may see, newest first, by keyset pages. */
export default defineEventHandler(async (event) => {
  const person = requirePerson(event)
  return listOutages(person, readQueryAs(event, query), Date.now())
})
