/** The rule engine asked about a case of a real outage. */
import { isoTime } from '~~/shared/record/entry'
import { firstDarkAt, judgedReadings } from '~~/shared/record/select'
import type { SnapshotCase } from '~~/shared/record/snapshot'
import type { OutageState } from '~~/shared/record/state'
import { assess } from './judge'
import { limitFor } from './rulebooks'
import type { Assessment } from './types'

/** Verdicts from the best to the worst. */
const RANK: Record<Assessment['verdict'], number> = { within: 0, unknown: 1, above: 2, act: 3, discard: 4 }

/**
 * The verdict on a case at a moment, or null while there is nothing to judge: no loss of control
 * yet, no reading, or nothing left in the case. A questioned reading can make it worse, never better.
 * @param now Unix ms
 */
export function assessCase(state: OutageState, caseId: string, now: number): Assessment | null {
  const known = state.snapshot.cases.find(item => item.id === caseId)
  const item = state.cases[caseId]
  const darkAt = firstDarkAt(state)
  if (!known || !item || darkAt === null || darkAt > now) return null
  const readings = judgedReadings(item).filter(reading => reading.at <= now)
  const firm = readings.filter(reading => !reading.questioned)
  const all = assessReadings(state, known, darkAt, readings, now)
  const without = firm.length < readings.length ? assessReadings(state, known, darkAt, firm, now) : all
  return without && all && RANK[without.verdict] > RANK[all.verdict] ? without : all
}

function assessReadings(state: OutageState, known: SnapshotCase, darkAt: number, taken: Reading[], now: number): Assessment | null {
  const readings = oneInstantEach(taken)
  if (readings.length === 0) return null
  const unit = state.snapshot.site.temperatureUnit
  return assess({
    rulebook: state.snapshot.rulebook.id,
    version: state.snapshot.rulebook.version,
    foodClass: known.foodClass,
    unit,
    darkAt: isoTime(darkAt),
    intervalMinutes: state.snapshot.site.intervalMinutes,
    readings: readings.map(reading => ({ at: isoTime(reading.at), value: convert(reading.value, reading.unit, unit), method: reading.method })),
    now: isoTime(now),
    ...(known.stricter ? { site: { limit: stricterLimit(state, known) } } : {}),
  })
}

type Reading = ReturnType<typeof judgedReadings>[number]

/** Two readings of one instant: the warmer is judged. */
function oneInstantEach(readings: Reading[]): Reading[] {
  const kept: Reading[] = []
  for (const reading of readings) {
    const last = kept.at(-1)
    if (last?.at !== reading.at) kept.push(reading)
    else if (convert(reading.value, reading.unit, 'C') > convert(last.value, last.unit, 'C')) kept[kept.length - 1] = reading
  }
  return kept
}

function convert(value: number, from: 'F' | 'C', to: 'F' | 'C'): number {
  if (from === to) return value
  return to === 'C' ? (value - 32) * 5 / 9 : value * 9 / 5 + 32
}

/** The site's stricter limit in the rulebook's own unit. */
function stricterLimit(state: OutageState, known: OutageState['snapshot']['cases'][number]): number {
  const own = limitFor(state.snapshot.rulebook.id, known.foodClass)
  return convert(known.limit.value, known.limit.unit, own.unit)
}
