/**
 * A class of a rulebook as it applies at one site. A site may be stricter than its rulebook and never laxer;
 * the one other choice is the law's own.
 */
import type { AssessSite } from '~~/shared/schemas/assess'
import type { ChartCell, EffectiveClass, FoodClass, Rule } from './types'
import { isOver } from './units'

type ClassFigures = Pick<FoodClass, 'limit' | 'within' | 'rules'>

/** The class's figures under the law's own choice, where the site has made it. */
function chosenFigures(foodClass: FoodClass, site: AssessSite): ClassFigures {
  const choice = foodClass.choice
  return choice && site[choice.flag] ? choice : foodClass
}

/** Every number of minutes that a rule holds. */
function minutesOf(rule: Rule): number[] {
  if (rule.kind === 'clock') return rule.steps.map(step => step.minutes)
  if (rule.kind === 'chart') return rule.rows.flatMap(row => row.until === null ? [] : [row.until])
  return []
}

/** The longest time that any rule of the class allows, in minutes; null where no rule has a number. */
export function longestMinutes(foodClass: FoodClass): number | null {
  const minutes = foodClass.rules.flatMap(minutesOf)
  return minutes.length === 0 ? null : Math.max(...minutes)
}

/** What is wrong with a site's figures for a class, in words; null when they are stricter or the same. */
export function siteFault(foodClass: FoodClass, site: AssessSite): { field: string, reason: string } | null {
  const { limit } = chosenFigures(foodClass, site)
  if (site.limit !== undefined && isOver(site.limit, limit))
    return { field: 'site.limit', reason: `must not be above the rulebook's own limit of ${limit}: a site may only be stricter` }
  const longest = longestMinutes(foodClass)
  if (site.minutes !== undefined && longest !== null && site.minutes > longest)
    return { field: 'site.minutes', reason: `must not be above the rulebook's own ${longest} minutes: a site may only be stricter` }
  return null
}

/**
 * The class with the site's limit and minutes in place. A laxer figure is not taken over.
 * A site's minutes shorten every number of the class that is longer.
 */
export function effectiveClass(foodClass: FoodClass, site: AssessSite = {}): EffectiveClass {
  const figures = chosenFigures(foodClass, site)
  const limit = Math.min(figures.limit, site.limit ?? figures.limit)
  const shorten = (minutes: number) => Math.min(minutes, site.minutes ?? minutes)
  const temperature = (mark: number | 'limit') => mark === 'limit' ? limit : mark
  const cell = (of: ChartCell): ChartCell<number> => ({
    ...of,
    ask: of.ask && { to: temperature(of.ask.to), minutes: shorten(of.ask.minutes) },
  })
  const rules = figures.rules.map((rule): Rule<number> => {
    switch (rule.kind) {
      case 'clock':
        return {
          ...rule,
          over: temperature(rule.over),
          steps: rule.steps.map(step => ({ ...step, minutes: shorten(step.minutes) })),
        }
      case 'mark':
        return { ...rule, over: temperature(rule.over) }
      case 'chart':
        return {
          ...rule,
          rows: rule.rows.map(row => ({ until: row.until === null ? null : shorten(row.until), cells: row.cells.map(cell) })),
        }
      case 'rises':
      case 'started-warm':
        return rule
    }
  })
  const { id, name, judgedBy, lowMark, hotFrom, notes } = foodClass
  return { id, name, judgedBy, lowMark, hotFrom, notes, limit, within: figures.within, rules }
}
