import { defineEventHandler } from 'h3'
import { requirePerson } from '~~/server/utils/access'
import { parseCoverInput, planCover } from '~~/server/utils/cover'
import { unprocessable } from '~~/server/utils/errors'
import { readJson } from '~~/server/utils/parse'

/** The compressors to hold on by hand and where suction settles, for any signed-in role. */
export default defineEventHandler(async (event) => {
  requirePerson(event)
  const parsed = parseCoverInput(await readJson(event))
  return parsed.ok ? planCover(parsed.input) : unprocessable(parsed.field, parsed.reason)
})
