import { defineEventHandler, getRouterParam } from 'h3'
import { requirePerson } from '~~/server/utils/access'
import { notFound } from '~~/server/utils/errors'
import { rulebookById } from '~~/server/utils/holding'

/** One rulebook in its newest version, for any signed-in role. */
export default defineEventHandler((event) => {
  requirePerson(event)
  return rulebookById(getRouterParam(event, 'id') ?? '') ?? notFound('rulebook')
})
