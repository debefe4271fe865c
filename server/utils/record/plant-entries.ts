import { isoTime } from '../../../shared/record/entry'
import { plantWarnings } from '../../../shared/record/plant'
import type { BodyOf } from '../../../shared/record/kinds'
import type { OutageState } from '../../../shared/record/state'

/** What has changed in the warnings of the plant since they were last entered: new ones, and those that are over. @param now Unix ms */
export function plantChanges(state: OutageState, now: number): BodyOf<'plant-warned'>[] {
  // Nothing is said of a plant once the record is handed in: what was open then stays as it was.
  if (state.phase === 'submitted' || state.phase === 'sealed' || state.phase === 'called-off') return []
  const judgedAt = isoTime(now)
  const warnings = plantWarnings(state)
  const same = (a: { fault: string, about: string }, b: { fault: string, about: string }) => a.fault === b.fault && a.about === b.about
  return [
    ...warnings.filter(item => !state.plant.some(known => same(known, item))).map(item => ({ ...item, over: false, judgedAt })),
    ...state.plant.filter(known => !warnings.some(item => same(item, known))).map(({ fault, about, words }) => ({ fault, about, words, act: '', over: true, judgedAt })),
  ]
}
