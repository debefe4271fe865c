import { personCreateSchema } from '~~/shared/schemas/people'
import { requireRole } from '~~/server/utils/access'
import { readBodyAs } from '~~/server/utils/parse'
import { createPerson } from '~~/server/utils/people/manage'

/** Makes an account with a temporary password. */
export default defineEventHandler(async (event) => {
  const administrator = requireRole(event, 'administrator')
  const person = await createPerson(administrator, await readBodyAs(event, personCreateSchema))
  setResponseStatus(event, 201)
  return person
})
