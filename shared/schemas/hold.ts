import { z } from 'zod'

/** Foods whose composition the program carries (server/utils/hold/foods.ts). */
export const FOOD_IDS = ['peas', 'beef', 'chicken', 'cod', 'ice-cream'] as const

export type FoodId = (typeof FOOD_IDS)[number]

/** Chen's enthalpy is counted from here and says nothing below, °C. */
export const LOWEST_FROZEN_C = -40
/** More readings than an outage of several days can bring for one case. */
export const MOST_FIT_READINGS = 2000

const temperatureC = z.number()
  .min(-273.15, 'must be at least -273.15 °C')
  .max(1000, 'must be at most 1000 °C')

const frozenC = temperatureC.min(LOWEST_FROZEN_C, `must be at least ${LOWEST_FROZEN_C} °C for frozen food`)
const aboveZero = z.number().finite('must be finite').positive('must be above 0')
const percent = z.number().min(0, 'must be at least 0 %').max(100, 'must be at most 100 %')

/** A moment as ISO 8601, "2026-03-01T02:10:00Z"; an offset is understood as well. */
export const momentSchema = z.string()
  .datetime({ offset: true, message: 'must be a time such as 2026-03-01T02:10:00Z' })
  .refine(text => !Number.isNaN(Date.parse(text)), 'must be a time such as 2026-03-01T02:10:00Z')

/** Composition of a food by mass in %, and the temperature at which it begins to freeze, °C. */
export const foodCompositionSchema = z.object({
  water: percent,
  protein: percent,
  fat: percent,
  carbohydrate: percent,
  ash: percent,
  freezingC: z.number()
    .gt(LOWEST_FROZEN_C, `must be above ${LOWEST_FROZEN_C} °C`)
    .lt(0, 'must be below 0 °C'),
}).superRefine((food, context) => {
  const sum = food.water + food.protein + food.fat + food.carbohydrate + food.ash
  // Published compositions are rounded and may come to a little more than 100 %.
  if (sum > 102) {
    context.addIssue({ code: 'custom', path: ['water'], message: 'and the other parts come to more than 100 %' })
  }
  // Water bound to protein never freezes: without free water Chen's formula has no ice to melt.
  if (food.water <= 0.4 * food.protein) {
    context.addIssue({ code: 'custom', path: ['water'], message: 'must be more than 0.4 times the protein' })
  }
})

export type FoodComposition = z.output<typeof foodCompositionSchema>

const foodSchema = z.unknown().transform((value, context): FoodId | FoodComposition => {
  const result = typeof value === 'object' && value !== null
    ? foodCompositionSchema.safeParse(value)
    : z.enum(FOOD_IDS).safeParse(value)
  if (result.success) {
    return result.data
  }
  result.error.issues.forEach(issue => context.addIssue(issue))
  return z.NEVER
})

const limitSide = z.enum(['upper', 'lower']).optional()

/** A case with nothing controlled: one time constant from now to the limit. */
export const chilledHoldSchema = z.object({
  kind: z.literal('chilled'),
  startC: temperatureC,
  ambientC: temperatureC,
  tauHours: aboveZero,
  limitC: temperatureC,
  heatW: z.number().finite('must be finite').min(0, 'must be at least 0').optional(),
  uaWPerK: aboveZero.optional(),
  limitSide,
})

/** Frozen product: an enthalpy balance over its composition. */
export const frozenHoldSchema = z.object({
  kind: z.literal('frozen'),
  food: foodSchema,
  massKg: aboveZero,
  uaWPerK: aboveZero,
  startC: frozenC,
  ambientC: temperatureC,
  limitC: frozenC,
  limitSide,
})

export const holdSchema = z.discriminatedUnion('kind', [chilledHoldSchema, frozenHoldSchema])
  .superRefine((input, context) => {
    if (input.kind === 'chilled' && input.heatW !== undefined && input.uaWPerK === undefined) {
      context.addIssue({ code: 'custom', path: ['uaWPerK'], message: 'is needed with heatW' })
    }
  })

export type ChilledHold = z.output<typeof chilledHoldSchema>
export type FrozenHold = z.output<typeof frozenHoldSchema>
export type HoldInput = ChilledHold | FrozenHold
export type LimitSide = 'upper' | 'lower'

/** Readings of one case during an outage, from which its hold is fitted. */
export const fitSchema = z.object({
  ambientC: temperatureC,
  priorTauHours: aboveZero,
  limitC: temperatureC,
  readings: z.array(z.object({ at: momentSchema, c: temperatureC }))
    .min(1, 'must hold at least one reading')
    .max(MOST_FIT_READINGS, `must hold at most ${MOST_FIT_READINGS} readings`),
  now: momentSchema,
}).superRefine((input, context) => {
  const times = input.readings.map(reading => Date.parse(reading.at))
  const late = times.findIndex((time, index) => index > 0 && time < times[index - 1]!)
  if (late > 0) {
    context.addIssue({ code: 'custom', path: ['readings', late, 'at'], message: 'is before the reading that it follows' })
  } else if (Date.parse(input.now) < times.at(-1)!) {
    context.addIssue({ code: 'custom', path: ['now'], message: 'is before the last reading' })
  }
})

export type FitInput = z.output<typeof fitSchema>
