import { useDatabase } from '~~/server/utils/database'
import { requireOutage } from '~~/server/utils/outages'
import { readRecordText, recordFileName } from '~~/server/utils/record/paper'

/** The whole record as one JSON document (docs/record-format.md). */
export default defineEventHandler(async (event) => {
  const { outage } = await requireOutage(event)
  const text = await readRecordText(useDatabase(), outage)
  setResponseHeaders(event, { 'content-type': 'application/json; charset=utf-8', 'content-disposition': `attachment; filename="${recordFileName(outage, 'json')}"`, 'cache-control': 'private, no-cache' })
  return text
})
