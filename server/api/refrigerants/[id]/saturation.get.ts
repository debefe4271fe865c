import { defineEventHandler, getQuery, getRouterParam } from 'h3'
import { requirePerson } from '~~/server/utils/access'
import { parseSaturationQuery, saturation } from '~~/server/utils/cover'
import { notFound, unprocessable } from '~~/server/utils/errors'
import { isRefrigerantId } from '~~/shared/schemas/refrigerants'

/** Saturation at ?celsius= or ?kpa= (absolute), for any signed-in role. */
export default defineEventHandler((event) => {
  requirePerson(event)
  const id = getRouterParam(event, 'id') ?? ''
  if (!isRefrigerantId(id)) return notFound('refrigerant')
  const parsed = parseSaturationQuery(getQuery(event))
  if (!parsed.ok) return unprocessable(parsed.field, parsed.reason)
  const answer = saturation(id, parsed.input)
  return 'reason' in answer ? unprocessable(answer.field, answer.reason) : answer
})
