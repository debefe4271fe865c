/** The second implementation: a whole log judged, its deadline found by trying later moments one after another. */
import type { AssessInput } from '../../../../shared/schemas/assess'
import type { Seen } from './case'
import { OracleCase, over } from './case'
import type { OracleRow, Word } from './table'
import { MINUS_12, ORACLE_ROWS } from './table'

export interface OracleVerdict {
  verdict: Word | 'unknown'
  deadline: string | null
  limit: { value: number, unit: 'C' | 'F' }
  carefulMinutes: number
  linearMinutes: number
  startedWarm: boolean
  tooCold: boolean
  suspect: boolean
}

const WORDS: Word[] = ['within', 'above', 'act', 'discard']
/** Longer than any number in any row. ms */
const FAR = 50 * 3_600_000

function inUnit(value: number, from: 'C' | 'F', to: 'C' | 'F') {
  if (from === to) return value
  return to === 'F' ? value * 9 / 5 + 32 : (value - 32) * 5 / 9
}

/** How far off the reading may be: what it says of itself, or what the Food Code demands (4-203.11, 4-203.12, VA). */
function accuracyOf(reading: AssessInput['readings'][number], isAir: boolean, from: 'C' | 'F', to: 'C' | 'F') {
  if (reading.accuracy !== undefined) return inUnit(reading.accuracy, from, to) - inUnit(0, from, to)
  if (to === 'F') return isAir ? 3 : 2
  return isAir ? 1.5 : 1
}

/** The first ms, later than now, at which product that stays as it is has a worse verdict; null when it never has. */
function firstWorse(row: OracleRow, at: (now: number) => OracleCase, now: number): number | null {
  const rank = (moment: number) => WORDS.indexOf(row.says(at(moment)))
  const today = rank(now)
  if (rank(now + FAR) === today) return null
  let still = now
  let worse = now + FAR
  while (worse - still > 1) {
    const middle = Math.floor((still + worse) / 2)
    if (rank(middle) > today) worse = middle
    else still = middle
  }
  return worse
}

export function oracle(input: AssessInput): OracleVerdict {
  const name = `${input.rulebook}/${input.foodClass}`
  const row = name === 'eu-853-2004/quick-frozen' && input.site?.allowsMinus12 ? MINUS_12 : ORACLE_ROWS[name]!
  const limit = Math.min(row.limit, input.site?.limit ?? row.limit)
  const own = row.byAir ? 'air' : 'product'
  const seen: Seen[] = []
  let tooCold = false
  let suspect = false
  for (const reading of input.readings) {
    const method = reading.method ?? own
    const read = inUnit(reading.value, input.unit, row.unit)
    const value = input.site?.addAccuracy ? read + accuracyOf(reading, method === 'air', input.unit, row.unit) : read
    if (method === own) seen.push({ at: Date.parse(reading.at), value })
    if (method === own && row.cold !== undefined && over(row.cold, read)) tooCold = true
    if (method !== own && over(value, limit)) suspect = true
  }
  const now = Date.parse(input.now)
  const flags = { limit: { value: limit, unit: row.unit }, tooCold, suspect }
  if (seen.length === 0)
    return { verdict: 'unknown', deadline: null, carefulMinutes: 0, linearMinutes: 0, startedWarm: false, ...flags }

  const at = (moment: number) => new OracleCase(seen, Date.parse(input.darkAt), moment, input.intervalMinutes * 60_000, limit, input.site ?? {}, row.hot ?? Infinity)
  const of = at(now)
  const word = row.says(of)
  const worse = of.isWarm && word !== 'discard' ? firstWorse(row, at, now) : null
  return {
    verdict: word === 'within' && of.isLate ? 'unknown' : word,
    deadline: worse === null ? null : new Date(row.fallsAtTheMinute ? worse : worse - 1).toISOString(),
    carefulMinutes: of.carefulOver(limit) / 60_000,
    linearMinutes: of.linear() / 60_000,
    startedWarm: of.beganWarm,
    ...flags,
  }
}
