import { z } from 'zod'
import { requirePerson } from '~~/server/utils/access'
import { requireEditor } from '~~/server/utils/equipment/guards'
import { deleteWorkKind } from '~~/server/utils/equipment/work-kinds'
import { readParamsAs } from '~~/server/utils/parse'

/** Deletes a kind of work; plans made before keep their own steps. */
export default defineEventHandler(async (event) => {
  const person = requirePerson(event)
  requireEditor(person)
  const { id } = readParamsAs(event, z.object({ id: z.string().uuid() }), 'kind of work')
  await deleteWorkKind(id, person)
  setResponseStatus(event, 204)
  return null
})
