/**
 * Figures and instants in words, for the reasons that go with a verdict. Instants are in UTC: a screen that
 * shows site-local time has the deadline itself to show.
 */
import type { TemperatureUnit } from '~~/shared/schemas/assess'
import { MINUTE } from './log'
import type { SourceMark } from './types'

/** How a rule was come by, in words. */
export const MARK_WORDS: Record<SourceMark, string> = {
  'V': 'read in the official text',
  'VA': 'read in a law that adopts the same text',
  'VS': 'read in a secondary copy',
  'M': 'from memory',
  'common practice': 'common practice, no source',
}

/** A figure with at most two decimals and a true minus sign. */
export function figureWords(value: number): string {
  return String(Number(value.toFixed(2)) + 0).replace('-', '−')
}

export function temperatureWords(value: number, unit: TemperatureUnit): string {
  return `${figureWords(value)} °${unit}`
}

/** What is to be measured for a class. */
export function temperatureKind({ judgedBy }: { judgedBy: 'product' | 'air' }): string {
  return judgedBy === 'air' ? 'an air temperature' : 'a product temperature'
}

/** A duration in minutes, from ms. */
export function minutesWords(ms: number): string {
  const minutes = figureWords(ms / MINUTE)
  return minutes === '1' ? '1 minute' : `${minutes} minutes`
}

/** A time allowed, in minutes: whole hours as hours. */
export function allowedWords(minutes: number): string {
  if (minutes % 60 !== 0) return minutesWords(minutes * MINUTE)
  return minutes === 60 ? '1 hour' : `${minutes / 60} hours`
}

/** An instant to the second, or to the minute when it is a whole one. */
export function instantWords(ms: number): string {
  const text = new Date(ms).toISOString()
  const end = ms % MINUTE === 0 ? 16 : 19
  return `${text.slice(0, 10)} ${text.slice(11, end)} UTC`
}
