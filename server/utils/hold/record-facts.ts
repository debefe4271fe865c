/** What the engines add to a record that its own log does not hold. */
import type { OutageState } from '~~/shared/record/state'
import type { RecordFacts } from '~~/shared/record/summary'
import { classById, effectiveClass, rulebookById, siteFor } from '../holding'
import { historyOf } from './history'

/**
 * The forecasts of each moment beside what came, the readings that were late by them, and where the limits of the watched cases are written.
 * @param until Unix ms; until when a case that was not read counts as overdue
 */
export function recordFacts(state: OutageState, until: number): RecordFacts {
  return { ...historyOf(state, until), limits: limitSources(state) }
}

/** "FDA Food Code 2022, 3-501.16(A)(2)", one for each class of food in the cases that are watched. */
export function limitSources(state: OutageState): string[] {
  const { rulebook: { id, version, name }, site, cases } = state.snapshot
  const rulebook = rulebookById(id, version)
  const watched = cases.filter(item => !item.runsAlone && state.cases[item.id]?.touched)
  const sources = watched.flatMap((item) => {
    const foodClass = rulebook && classById(rulebook, item.foodClass)
    const held = siteFor(site.holding, item.foodClass)
    const within = foodClass && effectiveClass(foodClass, held).within
    const own = item.stricter ? [`the site's own ${item.limit.value} °${item.limit.unit} for ${item.name}`] : []
    const sooner = held.minutes === undefined ? [] : [`the site's own ${held.minutes} minutes for ${foodClass?.name ?? item.foodClass}`]
    return [within ? authorityWords(within) : name, ...own, ...sooner]
  })
  if (site.holding.addAccuracy) sources.push('each reading counted with its thermometer\'s accuracy added')
  return [...new Set(sources)]
}

/** Source first; where there is none, what is asked comes first. */
function authorityWords({ clause, source }: { clause: string, source: string }): string {
  return source.startsWith('common practice') ? `${clause}: ${source}` : `${source}, ${clause}`
}
