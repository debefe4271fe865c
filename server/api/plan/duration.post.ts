import { defineEventHandler } from 'h3'
import { requirePerson } from '~~/server/utils/access'
import { parseDurationInput, planDuration } from '~~/server/utils/duration'
import { unprocessable } from '~~/server/utils/errors'
import { readJson } from '~~/server/utils/parse'

/** How long steps of work take together, for any signed-in role. */
export default defineEventHandler(async (event) => {
  requirePerson(event)
  const parsed = parseDurationInput(await readJson(event))
  return parsed.ok ? planDuration(parsed.input) : unprocessable(parsed.field, parsed.reason)
})
