import { defineEventHandler } from 'h3'
import { requirePerson } from '~~/server/utils/access'
import { unprocessable } from '~~/server/utils/errors'
import { holdTime, parseHoldInput } from '~~/server/utils/hold'
import { readJson } from '~~/server/utils/parse'

/** Hold time of a case and its curve, for any signed-in role. */
export default defineEventHandler(async (event) => {
  requirePerson(event)
  const parsed = parseHoldInput(await readJson(event))
  return parsed.ok ? holdTime(parsed.input) : unprocessable(parsed.field, parsed.reason)
})
