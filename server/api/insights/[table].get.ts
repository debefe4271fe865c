import { z } from 'zod'
import { INSIGHT_TABLES, insightQuerySchema } from '~~/shared/schemas/insights'
import { requireRole } from '~~/server/utils/access'
import { useDatabase } from '~~/server/utils/database'
import { readCounted } from '~~/server/utils/insights/counted'
import { insightsCsv } from '~~/server/utils/insights/csv'
import { insightsOf } from '~~/server/utils/insights/tell'
import { readParamsAs, readQueryAs } from '~~/server/utils/parse'

const params = z.object({ table: z.string().regex(/\.csv$/).transform(text => text.replace(/\.csv$/, '')).pipe(z.enum(INSIGHT_TABLES)) })

/** One table of the insights of a choice as CSV: work.csv, steps.csv, holds.csv … */
export default defineEventHandler(async (event) => {
  const person = requireRole(event, 'supervisor', 'auditor', 'administrator')
  const { table } = readParamsAs(event, params, 'table of insights')
  const { counted } = await readCounted(useDatabase(), person, readQueryAs(event, insightQuerySchema))
  setResponseHeaders(event, { 'content-type': 'text/csv; charset=utf-8', 'content-disposition': `attachment; filename="holdover-${table}.csv"`, 'cache-control': 'private, no-cache' })
  return insightsCsv(insightsOf(counted), table)
})
