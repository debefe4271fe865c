import { people } from '~~/server/database/schema'
import { useDatabase } from '~~/server/utils/database'

/** Whether the first administrator is still to be made. */
export default defineEventHandler(async () => {
  const [anybody] = await useDatabase().select({ id: people.id }).from(people).limit(1)
  return { needed: anybody === undefined }
})
