import { coverSchema } from '~~/shared/schemas/cover'
import type { CoverInput } from '~~/shared/schemas/cover'
import { parseWith } from '~~/shared/schemas/parsed'
import type { Parsed } from '~~/shared/schemas/parsed'
import { saturationQuerySchema } from '~~/shared/schemas/refrigerants'
import type { SaturationQuery } from '~~/shared/schemas/refrigerants'
import { saturation } from './refrigerants'

/** The input of `planCover` from a request's body, or the field at fault and why. */
export function parseCoverInput(body: unknown): Parsed<CoverInput> {
  const parsed = parseWith(coverSchema, body)
  if (!parsed.ok) {
    return parsed
  }
  const atTarget = saturation(parsed.input.refrigerant, { celsius: parsed.input.targetSstC })
  return 'reason' in atTarget ? { ok: false, field: 'targetSstC', reason: atTarget.reason } : parsed
}

/** The question of `saturation` from a request's query: celsius or kpa, exactly one. */
export function parseSaturationQuery(query: unknown): Parsed<SaturationQuery> {
  return parseWith(saturationQuerySchema, query)
}
