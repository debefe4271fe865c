import { z } from 'zod'
import { useDatabase } from '~~/server/utils/database'
import { requireOutage } from '~~/server/utils/outages'
import { readQueryAs } from '~~/server/utils/parse'
import { readEntries } from '~~/server/utils/record/log'

const PAGE = 500
const query = z.object({ after: z.coerce.number().int().min(0).default(0) })

/** Entries after a seq, at most 500; `size` says how many there are in all, `checkpoint` is the newest. */
export default defineEventHandler(async (event) => {
  const { outage } = await requireOutage(event)
  const { after } = readQueryAs(event, query)
  const entries = await readEntries(useDatabase(), outage.id, after, PAGE)
  return { entries, size: Math.max(outage.size, entries.at(-1)?.seq ?? 0), phase: outage.phase, code: outage.code, checkpoint: outage.checkpoint, now: new Date().toISOString() }
})
