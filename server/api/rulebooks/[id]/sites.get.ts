import { defineEventHandler, getRouterParam } from 'h3'
import { requirePerson } from '~~/server/utils/access'
import { useDatabase } from '~~/server/utils/database'
import { notFound } from '~~/server/utils/errors'
import { bookSites } from '~~/server/utils/equipment/book-sites'
import { rulebookById } from '~~/server/utils/holding'

/** The sites that are judged by a rulebook, of those that the person may see, with their stricter settings and who set them. */
export default defineEventHandler(async (event) => {
  const person = requirePerson(event)
  const rulebook = rulebookById(getRouterParam(event, 'id') ?? '') ?? notFound('rulebook')
  return bookSites(useDatabase(), person, rulebook.id)
})
