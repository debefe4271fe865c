import { minuteWords, temperatureWords } from '~~/shared/charts/words'
import type { Verdict } from '~~/shared/record/kinds/server'
import type { SiteHolding } from '~~/shared/schemas/equipment'
import type { SettingMark } from '~~/shared/schemas/changes'
import { classById, MARK_WORDS } from '~~/server/utils/holding'
import type { Authority, FoodClass, Rule, Rulebook } from '~~/server/utils/holding'

/** A verdict in two words or so, where it stands beside others. */
export const SHORT_VERDICTS: Record<Verdict, string> = { within: 'within', above: 'above its limit', act: 'act now', discard: 'discard', unknown: 'not known' }

/** One rule as a row: when it holds, what it says, what is to be done, where it is written. */
export interface RuleRow { key: string, when: string, verdict: Verdict, act: string, authority: Authority }

/** Where something is written, with how it was come by: '3-501.16(A)(2); FDA Food Code 2022 (read in …)'. */
export function writtenWords({ clause, source, mark }: Authority): string {
  return source === MARK_WORDS[mark] ? `${clause}; ${source}` : `${clause}; ${source} (${MARK_WORDS[mark]})`
}

/** The rules of a class as rows, mildest reading first. @param unit the rulebook's own */
export function ruleRows(food: Pick<FoodClass, 'limit' | 'within' | 'rules'>, unit: 'F' | 'C'): RuleRow[] {
  const degrees = (mark: number | 'limit') => temperatureWords(mark === 'limit' ? food.limit : mark, unit)
  const within: RuleRow = { key: 'within', when: `At ${degrees(food.limit)} or below`, verdict: 'within', act: '', authority: food.within }
  return [within, ...food.rules.flatMap((rule, index) => rowsOf(rule, degrees).map((row, at) => ({ ...row, key: `${index}-${at}`, authority: rule.authority })))]
}

function rowsOf(rule: Rule, degrees: (mark: number | 'limit') => string): Omit<RuleRow, 'key' | 'authority'>[] {
  switch (rule.kind) {
    case 'clock': {
      const over = `${rule.counts === 'over' ? 'Over' : 'At or over'} ${degrees(rule.over)}`
      const overdue = rule.overdueCounts ? ', time without a reading included' : ''
      const [first] = rule.steps
      return [
        ...first ? [{ when: `${over}, ${first.reached === 'after' ? 'up to' : 'for less than'} ${minuteWords(first.minutes)}${overdue}`, verdict: 'above' as const, act: rule.act }] : [],
        ...rule.steps.map(step => ({ when: `${over} for ${step.reached === 'after' ? 'more than ' : ''}${minuteWords(step.minutes)}${step.reached === 'at' ? ' or more' : ''}`, verdict: step.verdict, act: step.act })),
      ]
    }
    case 'mark':
      return [{ when: `Over ${degrees(rule.over)}`, verdict: rule.verdict, act: rule.act }]
    case 'rises':
      return [{ when: rule.from === 2 ? 'A second time above the limit' : `Above the limit for the ${rule.from}th time`, verdict: rule.verdict, act: rule.act }]
    case 'started-warm':
      return [{ when: 'Above the limit at its first reading', verdict: rule.verdict, act: rule.act }]
    case 'chart':
      return rule.rows.flatMap((row, index) => {
        const from = rule.rows[index - 1]?.until ?? null
        const time = row.until === null ? `Later than ${minuteWords(from ?? 0)}` : from === null ? `Until ${minuteWords(row.until)}` : `Over ${minuteWords(from)} to ${minuteWords(row.until)}`
        return row.cells.map(cell => ({
          when: `${time} without control, ${cell.to === null ? 'warmer' : `${cell.included ? 'up to' : 'below'} ${degrees(cell.to)}`}`,
          verdict: cell.verdict,
          act: cell.ask ? `Bring it to ${degrees(cell.ask.to)} or below within ${minuteWords(cell.ask.minutes)}. ${cell.act}` : cell.act,
        }))
      })
  }
}

/** A site's settings under its rulebook, each in words with the field of its history; nothing: as the rulebook has it. */
export function settingLines(rulebook: Rulebook, { holding, instrumentCheckDays }: { holding: SiteHolding, instrumentCheckDays: number }): { field: string, words: string }[] {
  return [
    ...holding.classes.map(({ foodClass, limit, minutes }) => ({
      field: `class:${foodClass}`,
      words: `${classById(rulebook, foodClass)?.name ?? foodClass}: ${[limit === null ? '' : `within ${temperatureWords(limit, rulebook.unit)}`, minutes === null ? '' : `no time longer than ${minuteWords(minutes)}`].filter(Boolean).join(', ')}`,
    })),
    ...holding.addAccuracy ? [{ field: 'addAccuracy', words: 'The accuracy of the thermometer is added to each reading' }] : [],
    ...holding.allowsMinus12 ? [{ field: 'allowsMinus12', words: 'The state\'s choice of −12 °C for quick-frozen food in retail cabinets applies' }] : [],
    { field: 'instrumentCheckDays', words: `A thermometer's check is overdue after ${instrumentCheckDays} days` },
  ]
}

/** 'Maud Pennington, Tue 3 Mar 2026'. @param day how a date is written */
export function setByWords(mark: SettingMark | undefined, day: (iso: string) => string): string {
  return mark ? `${mark.by}, ${day(mark.at)}` : 'as at the start'
}
