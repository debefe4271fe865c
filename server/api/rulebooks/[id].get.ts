import { defineEventHandler, getRouterParam } from 'h3'
import { requirePerson } from '~~/server/utils/access'
import { notFound } from '~~/server/utils/errors'
import { rulebookById } from '~~/server/utils/holding'

/** One rulebook in its newest version, for any signed-in role. */
export default defineEventHandler((event) => {
  requirePerson(event)
  const rulebook = rulebookById(getRouterParam(event, 'id') ?? '')
  if (!rulebook) throw notFound('rulebook')
  return rulebook
})
