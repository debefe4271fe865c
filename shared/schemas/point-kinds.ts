/**
 * The kinds of IO point and the positions in which a point can be held by hand.
 * One list, used by the import, the forms, the tables, the record and the engines alike.
 */
import { z } from 'zod'

export const POINT_KINDS = [
  'compressor',
  'drive',
  'condenser-fan',
  'pump',
  'evaporator-fan',
  'defrost-heater',
  'hot-gas-valve',
  'liquid-line-valve',
  'expansion-valve',
  'suction-regulator',
  'suction-stop-valve',
  'high-pressure-valve',
  'flash-gas-valve',
  'oil-valve',
  'anti-sweat-heater',
  'light',
  'egress-light',
  'ventilation',
  'machinery-room-ventilation',
  'leak-alarm',
  'person-trapped-alarm',
  'other',
] as const

export type PointKind = (typeof POINT_KINDS)[number]

export const pointKindSchema = z.enum(POINT_KINDS)

/** Words for people; the kind itself is for machines. */
export const KIND_WORDS: Record<PointKind, string> = {
  'compressor': 'Compressor',
  'drive': 'Drive',
  'condenser-fan': 'Condenser fan',
  'pump': 'Pump',
  'evaporator-fan': 'Evaporator fan',
  'defrost-heater': 'Defrost heater',
  'hot-gas-valve': 'Hot-gas valve',
  'liquid-line-valve': 'Liquid line valve',
  'expansion-valve': 'Expansion valve',
  'suction-regulator': 'Suction regulator',
  'suction-stop-valve': 'Suction stop valve',
  'high-pressure-valve': 'High-pressure valve',
  'flash-gas-valve': 'Flash-gas valve',
  'oil-valve': 'Oil valve',
  'anti-sweat-heater': 'Anti-sweat heater',
  'light': 'Light',
  'egress-light': 'Egress light',
  'ventilation': 'Ventilation',
  'machinery-room-ventilation': 'Machinery-room ventilation',
  'leak-alarm': 'Leak alarm',
  'person-trapped-alarm': 'Person-trapped alarm',
  'other': 'Other point',
}

const VALVES: ReadonlySet<PointKind> = new Set([
  'hot-gas-valve',
  'liquid-line-valve',
  'expansion-valve',
  'suction-regulator',
  'suction-stop-valve',
  'high-pressure-valve',
  'flash-gas-valve',
  'oil-valve',
])

const ALARMS: ReadonlySet<PointKind> = new Set(['leak-alarm', 'person-trapped-alarm'])

/** A valve's on is open and its off is closed. */
export function isValve(kind: PointKind): boolean {
  return VALVES.has(kind)
}

/** The alarms that keep people alive; never off (rule I3). */
export function isAlarm(kind: PointKind): boolean {
  return ALARMS.has(kind)
}

export const HAND_WORDS_FIXED = ['on', 'off', 'open', 'closed', 'as-found'] as const

/** Highest output frequency of a drive that is accepted, Hz; far above any compressor's plate. */
export const MAX_DRIVE_HZ = 400

const upTo = (most: number, unit: string) =>
  z.number().min(0, `must be at least 0 ${unit}`).max(most, `must be at most ${most} ${unit}`)

/** What a point shall do in hand: a fixed word, or a drive's or valve's fixed speed or opening. */
export const handPositionSchema = z.union([
  z.enum(HAND_WORDS_FIXED),
  z.object({ hz: upTo(MAX_DRIVE_HZ, 'Hz') }).strict(),
  z.object({ percent: upTo(100, '%') }).strict(),
], {
  errorMap: () => ({
    message: 'must be "on", "off", "open", "closed", "as-found", {"hz": 0 to 400} or {"percent": 0 to 100}',
  }),
})

export type HandPosition = z.infer<typeof handPositionSchema>

const FIXED_WORDS: Record<(typeof HAND_WORDS_FIXED)[number], string> = {
  'on': 'on',
  'off': 'off',
  'open': 'held open',
  'closed': 'held closed',
  'as-found': 'left as found',
}

/** The hand position in words: "on", "held open", "left as found", "42 Hz", "60 %". */
export function handWords(hand: HandPosition): string {
  if (typeof hand === 'string') return FIXED_WORDS[hand]
  return 'hz' in hand ? `${hand.hz} Hz` : `${hand.percent} %`
}

/** Held on, open or at a speed or opening above zero. "As found" is neither active nor at rest. */
export function isHandActive(hand: HandPosition): boolean {
  if (typeof hand === 'string') return hand === 'on' || hand === 'open'
  return ('hz' in hand ? hand.hz : hand.percent) > 0
}

/** Held off, closed or at zero. */
export function isHandAtRest(hand: HandPosition): boolean {
  return hand !== 'as-found' && !isHandActive(hand)
}
