/**
 * Every rulebook that an outage may be judged by. A new one is one file here and one line below; a new version of
 * one is a further entry with the same id, after the earlier ones, since an outage keeps the version that it was
 * planned with. Rulebooks are kept apart and never averaged: authorities contradict each other.
 */
import type { AssessSite } from '~~/shared/schemas/assess'
import { effectiveClass } from '../resolve'
import type { FoodClass, Limit, Rulebook } from '../types'
import { au322 } from './au-3-2-2'
import { ca4c } from './ca-4c'
import { eu8532004 } from './eu-853-2004'
import { ukEngland2013 } from './uk-england-2013'
import { usFoodCode2022 } from './us-food-code-2022'
import { usMiCounty } from './us-mi-county'
import { usSfDph } from './us-sf-dph'
import { usWaDoh } from './us-wa-doh'

export const rulebooks: Rulebook[] = [
  usFoodCode2022,
  usWaDoh,
  usSfDph,
  usMiCounty,
  ukEngland2013,
  au322,
  eu8532004,
  ca4c,
]

/** A rulebook by its id, in the version asked for or else the newest; undefined when there is none. */
export function rulebookById(id: string, version?: string): Rulebook | undefined {
  return rulebooks.findLast(rulebook => rulebook.id === id && (version === undefined || rulebook.version === version))
}

/** Every version of a rulebook, the newest first. */
export function versionsOf(id: string): Rulebook[] {
  return rulebooks.filter(rulebook => rulebook.id === id).reverse()
}

export function classById(rulebook: Rulebook, id: string): FoodClass | undefined {
  return rulebook.classes.find(foodClass => foodClass.id === id)
}

/**
 * The within figure of a class at a site, in the rulebook's own unit.
 * @throws RangeError when the rulebook or the class does not exist
 */
export function limitFor(rulebookId: string, foodClass: string, site?: AssessSite): Limit {
  const rulebook = rulebookById(rulebookId)
  const found = rulebook && classById(rulebook, foodClass)
  if (!rulebook || !found) throw new RangeError(`No rulebook ${rulebookId} with a class ${foodClass}`)
  return { value: effectiveClass(found, site).limit, unit: rulebook.unit }
}
