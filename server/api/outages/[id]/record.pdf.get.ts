import { openRecordPdf } from '~~/server/pdf/record'
import { useDatabase } from '~~/server/utils/database'
import { requireOutage } from '~~/server/utils/outages'
import { paperFonts, readPaper, recordFileName } from '~~/server/utils/record/paper'

/** The record on paper, streamed; the same bytes for the same record. */
export default defineEventHandler(async (event) => {
  const { outage } = await requireOutage(event)
  const paper = await readPaper(useDatabase(), outage)
  const { doc } = openRecordPdf(paper, await paperFonts())
  setResponseHeaders(event, { 'content-type': 'application/pdf', 'content-disposition': `inline; filename="${recordFileName(outage, 'pdf')}"`, 'cache-control': 'private, no-cache' })
  return sendStream(event, doc)
})
