import { defineEventHandler } from 'h3'
import { requirePerson } from '~~/server/utils/access'
import { rulebooks } from '~~/server/utils/holding'

/** Every rulebook as data, for any signed-in role. */
export default defineEventHandler((event) => {
  requirePerson(event)
  return rulebooks
})
