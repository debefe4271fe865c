/** The rule engine asked about a case of a real outage. */
import { isoTime } from '~~/shared/record/entry'
import { firstDarkAt, judgedReadings } from '~~/shared/record/select'
import type { SnapshotCase } from '~~/shared/record/snapshot'
import type { OutageState } from '~~/shared/record/state'
import type { TemperatureUnit } from '~~/shared/schemas/assess'
import { assessTimed } from './judge'
import { rulebookById } from './rulebooks'
import { siteFor } from './site-settings'
import type { Assessment } from './types'
import { convertDifference, convertTemperature } from './units'

/** A case judged; `ruleMinutes` is the whole time of the rule that sets the deadline, null where there is none. */
export interface JudgedCase extends Assessment { ruleMinutes: number | null }

/** Verdicts from the best to the worst. */
const RANK: Record<Assessment['verdict'], number> = { within: 0, unknown: 1, above: 2, act: 3, discard: 4 }

/**
 * The verdict on a case at a moment, or null while there is nothing to judge: no loss of control
 * yet, no reading, or nothing left in the case. A questioned reading can make it worse, never better.
 * @param now Unix ms
 */
export function assessCase(state: OutageState, caseId: string, now: number): JudgedCase | null {
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

function assessReadings(state: OutageState, known: SnapshotCase, darkAt: number, taken: Reading[], now: number): JudgedCase | null {
  const readings = oneInstantEach(taken)
  if (readings.length === 0) return null
  const { rulebook, site } = state.snapshot
  const unit = site.temperatureUnit
  const { assessment, ruleMinutes } = assessTimed({
    rulebook: rulebook.id,
    version: rulebook.version,
    foodClass: known.foodClass,
    unit,
    darkAt: isoTime(darkAt),
    intervalMinutes: site.intervalMinutes,
    readings: readings.map(reading => ({
      at: isoTime(reading.at),
      value: convertTemperature(reading.value, reading.unit, unit),
      method: reading.method,
      ...accuracyOf(state, reading, unit),
    })),
    now: isoTime(now),
    site: { ...siteFor(site.holding, known.foodClass), ...known.stricter ? { limit: stricterLimit(state, known) } : {} },
  })
  return { ...assessment, ruleMinutes }
}

/** The accuracy of the instrument that a reading names, degrees of the site's unit; without one the engine takes what the code demands. */
function accuracyOf(state: OutageState, reading: Reading, unit: TemperatureUnit): { accuracy?: number } {
  const instrument = state.snapshot.instruments.find(item => item.id === reading.instrumentId)
  return instrument ? { accuracy: convertDifference(instrument.accuracyC, 'C', unit) } : {}
}

type Reading = ReturnType<typeof judgedReadings>[number]

/** Two readings of one instant: the warmer is judged. */
function oneInstantEach(readings: Reading[]): Reading[] {
  const kept: Reading[] = []
  for (const reading of readings) {
    const last = kept.at(-1)
    if (last?.at !== reading.at) kept.push(reading)
    else if (convertTemperature(reading.value, reading.unit, 'C') > convertTemperature(last.value, last.unit, 'C')) kept[kept.length - 1] = reading
  }
  return kept
}

/** The case's stricter limit in the unit of the rulebook, in the version that the outage was planned with. */
function stricterLimit(state: OutageState, known: SnapshotCase): number {
  const { id, version } = state.snapshot.rulebook
  return convertTemperature(known.limit.value, known.limit.unit, rulebookById(id, version)?.unit ?? known.limit.unit)
}
