import type { RisesRule } from '../types'
import { isOver } from '../units'
import { instantWords, temperatureWords } from '../words'
import type { Case, Finding } from './finding'
import { NOTHING_FOUND } from './finding'

/** Judges a log by how often product rose above the within figure; a reading within ends each period. */
export function findByRises(rule: RisesRule, { log, foodClass, unit }: Case): Finding {
  const isAbove = (index: number) => index >= 0 && isOver(log.readings[index]!.value, foodClass.limit)
  const rises = log.readings.filter((_, index) => isAbove(index) && !isAbove(index - 1))
  const decisive = rises[rule.from - 1]
  if (!decisive) return NOTHING_FOUND
  return {
    ...NOTHING_FOUND,
    stays: {
      verdict: rule.verdict,
      act: rule.act,
      reason: `period ${rule.from} over ${temperatureWords(foodClass.limit, unit)} began at ${instantWords(decisive.at)}, which means ${rule.verdict}`,
      authority: rule.authority,
    },
  }
}
