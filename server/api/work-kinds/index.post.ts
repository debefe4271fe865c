import { workKindSchema } from '~~/shared/schemas/work'
import { requirePerson } from '~~/server/utils/access'
import { requireEditor } from '~~/server/utils/equipment/guards'
import { createWorkKind } from '~~/server/utils/equipment/work-kinds'
import { readBodyAs } from '~~/server/utils/parse'

/** Makes a kind of work. */
export default defineEventHandler(async (event) => {
  const person = requirePerson(event)
  requireEditor(person)
  const kind = await createWorkKind(person, await readBodyAs(event, workKindSchema))
  setResponseStatus(event, 201)
  return kind
})
