import { minuteWords, temperatureWords } from '~~/shared/charts/words'
import type { FoodClass, Rule } from '~~/server/utils/holding'

const VERDICTS = { above: 'above its limit', act: 'act now', discard: 'discard' }

/** A food class's rules as sentences, each ending in where it is written. @param unit the rulebook's own */
export function ruleLines(food: FoodClass, unit: 'F' | 'C'): string[] {
  const degrees = (mark: number | 'limit') => temperatureWords(mark === 'limit' ? food.limit : mark, unit)
  return [...food.rules.flatMap(rule => linesOf(rule, degrees)), ...food.notes]
}

function linesOf(rule: Rule, degrees: (mark: number | 'limit') => string): string[] {
  if (rule.kind === 'chart') {
    const cells = rule.rows.flatMap((row, index) => row.cells.map((cell) => {
      const from = rule.rows[index - 1]?.until ?? 0
      const when = row.until === null ? `after ${minuteWords(from)}` : `to ${minuteWords(row.until)}`
      return `${when}, ${cell.to === null ? 'warmer' : `${cell.included ? 'up to' : 'below'} ${degrees(cell.to)}`}: ${VERDICTS[cell.verdict]}${cell.ask ? `, to ${degrees(cell.ask.to)} within ${minuteWords(cell.ask.minutes)}` : ''}`
    }))
    return [...cells, written(rule)]
  }
  if (rule.kind === 'clock') return [...rule.steps.map(step => `${rule.counts === 'over' ? 'Over' : 'At or over'} ${degrees(rule.over)} ${step.reached === 'after' ? 'for more than' : 'for'} ${minuteWords(step.minutes)}${step.reached === 'at' ? ' or more' : ''}: ${VERDICTS[step.verdict]}. ${step.act}`), written(rule)]
  if (rule.kind === 'mark') return [`Over ${degrees(rule.over)}: ${VERDICTS[rule.verdict]}. ${rule.act} ${written(rule)}`]
  if (rule.kind === 'rises') return [`On rise ${rule.from} above the limit: ${VERDICTS[rule.verdict]}. ${rule.act} ${written(rule)}`]
  return [`Started warm: ${VERDICTS[rule.verdict]}. ${rule.act} ${written(rule)}`]
}

const written = ({ authority }: Rule) => `(${authority.clause}; ${authority.source})`
