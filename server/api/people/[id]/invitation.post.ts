import { z } from 'zod'
import { requireRole } from '~~/server/utils/access'
import { readParamsAs } from '~~/server/utils/parse'
import { inviteAgain } from '~~/server/utils/people/manage'

/** Writes the invitation again of somebody who has not chosen a password yet. */
export default defineEventHandler((event) => {
  const administrator = requireRole(event, 'administrator')
  const { id } = readParamsAs(event, z.object({ id: z.string().uuid() }), 'person')
  return inviteAgain(id, administrator)
})
