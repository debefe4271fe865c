/** What `POST /api/plan/window` accepts: when points would begin to go in hand, and what stands in the way. */
import { z } from 'zod'
import { momentSchema } from './hold'

export const MAX_WINDOW_DAYS = 31
export const MAX_WINDOW_CIRCUITS = 200
const MAX_MINUTES = 10_080 // a week

const minutes = z.number().min(0, 'must be at least 0 minutes').max(MAX_MINUTES, `must be at most ${MAX_MINUTES} minutes`)
const timeOfDay = z.string().regex(/^([01]\d|2[0-3]):[0-5]\d$/, 'must be a time of day such as 02:30')

const timeZone = z.string().max(100, 'must be at most 100 characters').refine((name) => {
  try {
    return Boolean(new Intl.DateTimeFormat('en', { timeZone: name }))
  } catch {
    return false
  }
}, 'must be a time zone such as Europe/London')

const defrostsSchema = z.union([
  z.object({ times: z.array(timeOfDay).max(24, 'must hold at most 24 times') }).strict(),
  z.object({
    everyHours: z.number().refine(hours => Number.isInteger(hours) && hours > 0 && 24 % hours === 0, 'must divide 24'),
    offset: timeOfDay,
  }).strict(),
], { errorMap: () => ({ message: 'must be {"times": ["HH:mm"]} or {"everyHours": hours, "offset": "HH:mm"}' }) })

export const windowCircuitSchema = z.object({
  id: z.string().min(1, 'must not be empty').max(200, 'must be at most 200 characters'),
  defrosts: defrostsSchema,
  durationMin: minutes,
  dripMin: minutes,
})

export const avoidSchema = z.object({
  /** Days of the week on which it begins, 1 = Monday. */
  days: z.array(z.number().int('must be a whole number').min(1, 'must be 1 to 7').max(7, 'must be 1 to 7')).max(7, 'must hold at most 7 days'),
  start: timeOfDay,
  end: timeOfDay,
  why: z.string().trim().min(1, 'must say why').max(200, 'must be at most 200 characters'),
})

export const planWindowSchema = z.object({
  timeZone,
  from: momentSchema.refine(text => text >= '2000' && text < '2200', 'must lie between the years 2000 and 2199'),
  days: z.number().int('must be a whole number').min(1, 'must be at least 1').max(MAX_WINDOW_DAYS, `must be at most ${MAX_WINDOW_DAYS}`).default(7),
  leadMin: minutes,
  darkMin: minutes,
  stepMin: z.number().min(1, 'must be at least 1 minute').max(MAX_MINUTES, `must be at most ${MAX_MINUTES} minutes`).default(5),
  avoid: z.array(avoidSchema).max(50, 'must hold at most 50 stretches').default([]),
  circuits: z.array(windowCircuitSchema).max(MAX_WINDOW_CIRCUITS, `must hold at most ${MAX_WINDOW_CIRCUITS} circuits`),
})

/** As it is sent; days, stepMin and avoid may be absent. */
export type PlanWindowRequest = z.input<typeof planWindowSchema>
export type PlanWindowInput = z.output<typeof planWindowSchema>
export type WindowCircuit = z.output<typeof windowCircuitSchema>
export type Avoid = z.output<typeof avoidSchema>
