import { defineEventHandler } from 'h3'
import { requirePerson } from '~~/server/utils/access'
import { unprocessable } from '~~/server/utils/errors'
import { parseOrderInput, planOrder } from '~~/server/utils/order'
import { readJson } from '~~/server/utils/parse'

/** The order in which points go in hand or are handed back, and those that may not, for any signed-in role. */
export default defineEventHandler(async (event) => {
  requirePerson(event)
  const parsed = parseOrderInput(await readJson(event))
  return parsed.ok ? planOrder(parsed.input) : unprocessable(parsed.field, parsed.reason)
})
