import { fitSchema, holdSchema } from '~~/shared/schemas/hold'
import type { FitInput, HoldInput } from '~~/shared/schemas/hold'
import { parseWith } from '~~/shared/schemas/parsed'
import type { Parsed } from '~~/shared/schemas/parsed'

/** The input of `holdTime` from a request's body, or the field at fault and why. */
export function parseHoldInput(body: unknown): Parsed<HoldInput> {
  return parseWith(holdSchema, body)
}

/** The input of `fitHold` from a request's body, or the field at fault and why. */
export function parseFitInput(body: unknown): Parsed<FitInput> {
  return parseWith(fitSchema, body)
}
