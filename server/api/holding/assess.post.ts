import { defineEventHandler } from 'h3'
import { requirePerson } from '~~/server/utils/access'
import { unprocessable } from '~~/server/utils/errors'
import { assess, parseAssessInput } from '~~/server/utils/holding'
import { readJson } from '~~/server/utils/parse'

/** Judges a temperature log by a rulebook, for any signed-in role. */
export default defineEventHandler(async (event) => {
  requirePerson(event)
  const parsed = parseAssessInput(await readJson(event))
  return parsed.ok ? assess(parsed.input) : unprocessable(parsed.field, parsed.reason)
})
