import { defineEventHandler } from 'h3'
import { requirePerson } from '~~/server/utils/access'
import { unprocessable } from '~~/server/utils/errors'
import { fitHold, parseFitInput } from '~~/server/utils/hold'
import { readJson } from '~~/server/utils/parse'

/** Hold of a case fitted to its readings, for any signed-in role. */
export default defineEventHandler(async (event) => {
  requirePerson(event)
  const parsed = parseFitInput(await readJson(event))
  return parsed.ok ? fitHold(parsed.input) : unprocessable(parsed.field, parsed.reason)
})
