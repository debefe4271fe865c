/** How a site's stricter settings bear on its rulebook: what is wrong with them, and what they make of one class. */
import type { AssessSite } from '~~/shared/schemas/assess'
import type { SiteHolding, StricterClass } from '~~/shared/schemas/equipment'
import { longestMinutes } from './resolve'
import { classById } from './rulebooks'
import type { FoodClass, Rulebook } from './types'
import { isOver, SAME_TEMPERATURE } from './units'
import { allowedWords, temperatureWords } from './words'

export interface SettingFault {
  /** as `classes[2].limit` */
  field: string
  reason: string
}

/** The lawful choices that a rulebook leaves to a site. */
export function choicesOf(rulebook: Rulebook): FoodClass[] {
  return rulebook.classes.filter(foodClass => foodClass.choice !== null)
}

/** Everything that keeps settings from applying under a rulebook, in words; none: each is stricter, or a choice that the law leaves. */
export function settingFaults(rulebook: Rulebook, holding: SiteHolding): SettingFault[] {
  const faults: SettingFault[] = holding.allowsMinus12 && choicesOf(rulebook).length === 0
    ? [{ field: 'allowsMinus12', reason: `${rulebook.name} leaves no such choice` }]
    : []
  const seen = new Set<string>()
  holding.classes.forEach((setting, index) => {
    const at = (name: string) => `classes[${index}].${name}`
    const foodClass = classById(rulebook, setting.foodClass)
    if (!foodClass) faults.push({ field: at('foodClass'), reason: `${rulebook.name} has no class ${setting.foodClass}` })
    else if (seen.has(setting.foodClass)) faults.push({ field: at('foodClass'), reason: `${foodClass.name} stands twice` })
    else faults.push(...classFaults(rulebook, foodClass, holding, setting).map(({ field, reason }) => ({ field: at(field), reason })))
    seen.add(setting.foodClass)
  })
  return faults
}

function classFaults(rulebook: Rulebook, foodClass: FoodClass, holding: SiteHolding, { limit, minutes }: StricterClass): SettingFault[] {
  if (limit === null && minutes === null) return [{ field: 'limit', reason: 'Enter a limit or minutes, or leave the class as the rulebook has it' }]
  const faults: SettingFault[] = []
  const own = ownLimit(foodClass, holding)
  if (limit !== null && isOver(limit + 2 * SAME_TEMPERATURE, own))
    faults.push({ field: 'limit', reason: `Below ${temperatureWords(own, rulebook.unit)}, the rulebook's own limit: a site may only be stricter` })
  const longest = longestMinutes(foodClass)
  if (minutes !== null && longest === null) faults.push({ field: 'minutes', reason: 'The rulebook gives this class no time that could be shorter' })
  else if (minutes !== null && minutes >= longest!)
    faults.push({ field: 'minutes', reason: `Shorter than ${allowedWords(longest!)}, the rulebook's own time: a site may only be stricter` })
  return faults
}

/** The class's limit under the choice that the site has made, before anything stricter. */
function ownLimit(foodClass: FoodClass, holding: SiteHolding): number {
  return foodClass.choice && holding[foodClass.choice.flag] ? foodClass.choice.limit : foodClass.limit
}

/** What the engine is told of a site for one class. */
export function siteFor(holding: SiteHolding, foodClass: string): AssessSite {
  const setting = holding.classes.find(item => item.foodClass === foodClass)
  return {
    addAccuracy: holding.addAccuracy,
    allowsMinus12: holding.allowsMinus12,
    ...setting?.limit != null ? { limit: setting.limit } : {},
    ...setting?.minutes != null ? { minutes: setting.minutes } : {},
  }
}

/** The limit that counts for a case: the strictest of the rulebook's, the site's for its class and the case's own, in the rulebook's unit. */
export function caseLimit(foodClass: FoodClass, holding: SiteHolding, ownOfCase: number | null): { value: number, stricter: boolean } {
  const lawful = ownLimit(foodClass, holding)
  const value = Math.min(lawful, siteFor(holding, foodClass.id).limit ?? lawful, ownOfCase ?? lawful)
  return { value, stricter: value < lawful }
}
