import { z } from 'zod'
import { openRecordPdf } from '~~/server/pdf/record'
import { PAPER_VARIANTS } from '~~/server/pdf/variant'
import { useDatabase } from '~~/server/utils/database'
import { requireOutage } from '~~/server/utils/outages'
import { readQueryAs } from '~~/server/utils/parse'
import { paperFonts, readPaper, recordFileName } from '~~/server/utils/record/paper'

const querySchema = z.object({ variant: z.enum(PAPER_VARIANTS).default('record') })

/** The record on paper, streamed; the same bytes for the same record. `?variant=a1b`: PDF/A-1b, without the attached record. */
export default defineEventHandler(async (event) => {
  const { outage } = await requireOutage(event)
  const { variant } = await readQueryAs(event, querySchema)
  const paper = await readPaper(useDatabase(), outage, variant)
  const { doc } = openRecordPdf(paper, await paperFonts())
  // Who goes away before the end leaves nothing behind that is still being drawn.
  event.node.res.once('close', () => doc.destroy())
  setResponseHeaders(event, { 'content-type': 'application/pdf', 'content-disposition': `inline; filename="${recordFileName(outage, 'pdf')}"`, 'cache-control': 'private, no-cache' })
  return sendStream(event, doc)
})
