import type { DefrostSchedule, QuietHours, DEFROST_KINDS, INSTRUMENT_KINDS, ON_LOSS, STAGES } from '~~/shared/schemas/equipment'
import { listWords } from '~~/shared/charts/words'

type Words<T extends readonly string[]> = Record<T[number], string>

export const STAGE_WORDS: Words<typeof STAGES> = { medium: 'medium temperature', low: 'low temperature' }
export const DEFROST_WORDS: Words<typeof DEFROST_KINDS> = { 'electric': 'electric', 'hot-gas': 'hot gas', 'off-time': 'off time', 'none': 'none' }
export const INSTRUMENT_WORDS: Words<typeof INSTRUMENT_KINDS> = { product: 'product thermometer', air: 'air thermometer', infrared: 'infrared thermometer' }
export const ON_LOSS_WORDS: Words<typeof ON_LOSS> = { on: 'goes on', off: 'goes off', holds: 'holds its last state', unknown: 'unknown' }
export const DAY_WORDS = ['Mon', 'Tue', 'Wed', 'Thu', 'Fri', 'Sat', 'Sun'] as const

/** 'at 05:00, 13:00 and 21:00', 'every 6 h from 00:15'. */
export function defrostWords(defrosts: DefrostSchedule | null): string {
  if (defrosts === null) return 'no times'
  return 'times' in defrosts ? `at ${listWords(defrosts.times)}` : `every ${defrosts.everyHours} h from ${defrosts.offset}`
}

/** 'Mon, Tue and Fri 16:00 to 20:00: rush hours'. */
export function quietWords({ days, start, end, why }: QuietHours): string {
  const named = days.length === 7 ? 'Every day' : listWords([...days].sort((a, b) => a - b).map(day => DAY_WORDS[day - 1]!))
  return `${named} ${start} to ${end}: ${why}`
}

/** '12 new, 3 changed, 11 unchanged'. */
export function outcomeWords(counts: { new: number, changed: number, unchanged: number }): string {
  return `${counts.new} new, ${counts.changed} changed, ${counts.unchanged} unchanged`
}

export const optionsOf = <T extends string>(words: Record<T, string>) => (Object.keys(words) as T[]).map(value => ({ value, label: words[value][0]!.toUpperCase() + words[value].slice(1) }))
