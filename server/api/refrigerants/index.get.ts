import { defineEventHandler } from 'h3'
import { requirePerson } from '~~/server/utils/access'
import { listRefrigerants } from '~~/server/utils/cover'

/** Every refrigerant whose saturation is known, for any signed-in role. */
export default defineEventHandler((event) => {
  requirePerson(event)
  return listRefrigerants()
})
