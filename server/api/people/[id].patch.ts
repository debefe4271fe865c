import { z } from 'zod'
import { personUpdateSchema } from '~~/shared/schemas/people'
import { requireRole } from '~~/server/utils/access'
import { forbidden } from '~~/server/utils/errors'
import { readBodyAs, readParamsAs } from '~~/server/utils/parse'
import { updatePerson } from '~~/server/utils/people/manage'

/** Changes name, role or sites of an account, switches it off or on, or gives it a temporary password. */
export default defineEventHandler(async (event) => {
  const administrator = requireRole(event, 'administrator')
  const { id } = readParamsAs(event, z.object({ id: z.string().uuid() }), 'person')
  const change = await readBodyAs(event, personUpdateSchema)
  if (id === administrator.id && change.password !== undefined) return forbidden('Change your own password on your account page')
  return updatePerson(id, administrator, change)
})
