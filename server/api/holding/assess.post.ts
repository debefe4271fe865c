import { defineEventHandler, readBody } from 'h3'
import { requirePerson } from '~~/server/utils/access'
import { unprocessable } from '~~/server/utils/errors'
import { assess, parseAssessInput } from '~~/server/utils/holding'

/** Judges a temperature log by a rulebook, for any signed-in role. */
export default defineEventHandler(async (event) => {
  requirePerson(event)
  const parsed = parseAssessInput(await readBody(event, { strict: true }))
  if (!parsed.ok) throw unprocessable(parsed.field, parsed.reason)
  return assess(parsed.input)
})
