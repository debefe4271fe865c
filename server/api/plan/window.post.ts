import { defineEventHandler } from 'h3'
import { requirePerson } from '~~/server/utils/access'
import { unprocessable } from '~~/server/utils/errors'
import { readJson } from '~~/server/utils/parse'
import { parseWindowInput, planWindow } from '~~/server/utils/window'

/** When the work is best begun, for any signed-in role. */
export default defineEventHandler(async (event) => {
  requirePerson(event)
  const parsed = parseWindowInput(await readJson(event))
  return parsed.ok ? planWindow(parsed.input) : unprocessable(parsed.field, parsed.reason)
})
