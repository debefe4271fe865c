import { requirePerson } from '~~/server/utils/access'
import { useDatabase } from '~~/server/utils/database'
import { devicesOf } from '~~/server/utils/people/devices'

/** The person's own signing devices. */
export default defineEventHandler(event => devicesOf(useDatabase(), requirePerson(event).id))
