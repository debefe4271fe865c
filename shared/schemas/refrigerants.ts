import { z } from 'zod'

/** Refrigerants whose saturation the program can compute. */
export const REFRIGERANT_IDS = [
  'R-134a', 'R-22', 'R-744', 'R-290', 'R-404A', 'R-507A', 'R-448A', 'R-449A', 'R-407A',
] as const

export type RefrigerantId = (typeof REFRIGERANT_IDS)[number]

/** True for the id of a refrigerant that the program knows. */
export function isRefrigerantId(text: string): text is RefrigerantId {
  return (REFRIGERANT_IDS as readonly string[]).includes(text)
}

const numberInQuery = z.string()
  .refine(text => text.trim() !== '' && Number.isFinite(Number(text)), 'must be a number')
  .transform(Number)
  .optional()

/** Saturation is asked at a temperature in °C or at a pressure in kPa absolute. */
export type SaturationQuery = { celsius: number } | { kpa: number }

export const saturationQuerySchema = z.object({ celsius: numberInQuery, kpa: numberInQuery })
  .transform(({ celsius, kpa }, context): SaturationQuery => {
    if (celsius !== undefined && kpa === undefined) {
      return { celsius }
    }
    if (celsius === undefined && kpa !== undefined) {
      return { kpa }
    }
    context.addIssue({ code: 'custom', path: ['celsius'], message: 'or kpa is needed, exactly one of them' })
    return z.NEVER
  })
