import { listWords, numberWords, temperatureWords } from '../charts/words'
import { MEASURES } from '../schemas/plan-facts'
import type { AssumptionKind } from '../schemas/plan-facts'
import type { Assumption, Measure, Plan } from './plan'
import { groupName, inUnit } from './select'
import type { Snapshot } from './snapshot'

/** A measure in words: what, at which cases, what was written beside it. */
export function measureWords(measure: Measure, cases: Snapshot['cases']): string {
  const at = listWords(measure.caseIds.map(id => cases.find(item => item.id === id)?.name ?? 'a case no longer known'))
  const what = measure.kind === 'other' ? measure.words : MEASURES[measure.kind].words
  const beside = measure.kind === 'other' ? '' : measure.words
  return [`${what}${at ? `: ${at}` : ''}`, beside].filter(Boolean).join(' · ')
}

/** A measure that is only said, without a case or an effect on a hold time. */
export function otherMeasure(words: string): Measure {
  return { kind: 'other', caseIds: [], factor: 1, words }
}

/** What the plan assumes of a thing instead of what the product would; null: as the product does. */
export function assumed(plan: Pick<Plan, 'assumptions'>, about: AssumptionKind, id: string | null = null): number | null {
  return plan.assumptions.find(item => item.about === about && item.id === id)?.value ?? null
}

const OF_PLAN = 'the plan'

/** What an assumption is about: 'start temperature of Fish service', 'load of Rack A', 'air of the shop'. */
export function assumptionName(about: AssumptionKind, id: string | null, snapshot: Snapshot): string {
  const caseName = snapshot.cases.find(item => item.id === id)?.name ?? OF_PLAN
  switch (about) {
    case 'start-c': return `start temperature of ${caseName}`
    case 'tau-hours': return `time constant of ${caseName}`
    case 'load-kw': return `load of ${id === null ? OF_PLAN : groupName({ snapshot }, id)}`
    case 'air-c': return 'air of the shop'
    case 'lead-minutes': return 'time until control is taken away'
    case 'mains-hz': return 'mains frequency'
  }
}

/** A figure of an assumption with its unit, temperatures in the site's. */
export function assumptionValue(about: AssumptionKind, value: number, unit: 'F' | 'C'): string {
  switch (about) {
    case 'start-c':
    case 'air-c': return temperatureWords(inUnit(value, unit), unit)
    case 'tau-hours': return `${numberWords(value)} h`
    case 'load-kw': return `${numberWords(value)} kW`
    case 'lead-minutes': return `${numberWords(value, 0)} min`
    case 'mains-hz': return `${numberWords(value, 0)} Hz`
  }
}

/** 'load of Rack A 64.0 kW (metered last week)'. */
export function assumptionWords({ about, id, value, reason }: Assumption, snapshot: Snapshot): string {
  return `${assumptionName(about, id, snapshot)} ${assumptionValue(about, value, snapshot.site.temperatureUnit)} (${reason})`
}
