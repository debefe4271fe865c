import type { MarkRule } from '../types'
import { isOver } from '../units'
import { instantWords, temperatureWords } from '../words'
import type { Case, Finding } from './finding'
import { NOTHING_FOUND } from './finding'

/** Judges a log by a temperature alone: `above` holds while product is over it, `act` and `discard` stay. */
export function findByMark(rule: MarkRule<number>, { log, last, unit }: Case): Finding {
  const seen = rule.verdict === 'above' ? last : log.readings.find(reading => isOver(reading.value, rule.over))
  if (!seen || !isOver(seen.value, rule.over)) return NOTHING_FOUND
  const outcome = {
    verdict: rule.verdict,
    act: rule.act,
    reason: `${temperatureWords(seen.value, unit)} at ${instantWords(seen.at)}; over ${temperatureWords(rule.over, unit)} means ${rule.verdict}`,
    authority: rule.authority,
  }
  return rule.verdict === 'above' ? { ...NOTHING_FOUND, now: outcome } : { ...NOTHING_FOUND, stays: outcome }
}
