import { readingsCsv } from '~~/shared/record/readings-csv'
import { useDatabase } from '~~/server/utils/database'
import { requireOutage } from '~~/server/utils/outages'
import { readRecord, recordFileName } from '~~/server/utils/record/paper'

/** Every reading of a record as CSV. */
export default defineEventHandler(async (event) => {
  const { outage } = await requireOutage(event)
  const { state, entries } = await readRecord(useDatabase(), outage)
  setResponseHeaders(event, { 'content-type': 'text/csv; charset=utf-8', 'content-disposition': `attachment; filename="${recordFileName(outage, 'csv')}"`, 'cache-control': 'private, no-cache' })
  return readingsCsv(state, entries)
})
