import { z } from 'zod'
import { workKindSchema } from '~~/shared/schemas/work'
import { requirePerson } from '~~/server/utils/access'
import { requireEditor } from '~~/server/utils/equipment/guards'
import { updateWorkKind } from '~~/server/utils/equipment/work-kinds'
import { readBodyAs, readParamsAs } from '~~/server/utils/parse'

/** Changes a kind of work; plans made before keep their own steps. */
export default defineEventHandler(async (event) => {
  const person = requirePerson(event)
  requireEditor(person)
  const { id } = readParamsAs(event, z.object({ id: z.string().uuid() }), 'kind of work')
  return updateWorkKind(id, person, await readBodyAs(event, workKindSchema.partial()))
})
