import type { StartedWarmRule } from '../types'
import { temperatureWords } from '../words'
import type { Case, Finding } from './finding'
import { NOTHING_FOUND } from './finding'

/** Judges a log whose first reading is already above the within figure. */
export function findByStart(rule: StartedWarmRule, { startedWarm, first, foodClass, unit }: Case): Finding {
  if (!startedWarm) return NOTHING_FOUND
  return {
    ...NOTHING_FOUND,
    stays: {
      verdict: rule.verdict,
      act: rule.act,
      reason: `the first reading, ${temperatureWords(first.value, unit)}, was not at or below ${temperatureWords(foodClass.limit, unit)}, which means at least ${rule.verdict}`,
      authority: rule.authority,
    },
  }
}
