import { rulebookById, versionsOf } from '~~/server/utils/holding'
import type { Rulebook } from '~~/server/utils/holding'

/** The rulebook that an address names, in the version it asks for; without one the newest. 404 where there is none. */
export function rulebookOf(id: string, version: unknown): { book: Rulebook, versions: Rulebook[] } {
  const book = rulebookById(id, typeof version === 'string' ? version : undefined)
  if (!book) throw createError({ status: 404, statusText: 'Not Found', message: 'There is no such rulebook', fatal: true })
  return { book, versions: versionsOf(id) }
}
