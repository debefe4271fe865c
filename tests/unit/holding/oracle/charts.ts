/** The second implementation's charts of temperature by time without control, written out as questions. */
import type { OracleCase } from './case'
import { over, reaches } from './case'
import type { Word } from './table'

/** A look at the chart: at a moment, a value, the place of the reading at hand. */
interface Look { at: number, value: number, place: number }

/** Every reading, every interval at its end and warmer value, and now where product is warm. */
function looks(of: OracleCase): Look[] {
  const found: Look[] = []
  for (let place = 0; place < of.seen.length; place += 1) {
    const { at, value } = of.seen[place]!
    if (place > 0) found.push({ at, value: Math.max(of.seen[place - 1]!.value, value), place })
    found.push({ at, value, place })
  }
  if (of.isWarm) found.push({ at: of.now, value: of.last.value, place: of.seen.length - 1 })
  return found.filter(({ value }) => over(value, of.limit))
}

/** When the time without control begins: a warm first reading may come before it. */
const begins = (of: OracleCase) => of.beganWarm && of.first.at < of.dark ? of.first.at : of.dark

/** Washington State Department of Health (V). */
export function washington(of: OracleCase): Word {
  for (const { at, value } of looks(of)) {
    const without = at - begins(of)
    if (reaches(value, 51) && without > of.allowed(120)) return 'discard'
    if (over(value, 45) && without > of.allowed(240)) return 'discard'
  }
  if (of.beganWarm) return 'act'
  return of.isWarm ? 'above' : 'within'
}

/** Since when product was seen over a temperature without one at or below it, looking back from a reading. */
function seenOverSince(of: OracleCase, place: number, mark: number): number {
  let back = place
  while (back > 0 && over(of.seen[back - 1]!.value, mark)) back -= 1
  return of.seen[back]!.at
}

/** San Francisco Department of Public Health (V): its 2 to 3 hours are read up to 4. */
export function sanFrancisco(of: OracleCase): Word {
  const start = begins(of)
  const secondRow = start + of.allowed(120)
  const thirdRow = start + of.allowed(240)
  /** Asked to be at or below a mark within an hour of being seen, or of the row's beginning. */
  const missed = ({ at, place }: Look, mark: number, row: number) => at > Math.max(seenOverSince(of, place, mark), row) + of.allowed(60)
  let word: Word = 'within'
  for (const look of looks(of)) {
    const { at, value } = look
    word = 'above'
    if (reaches(value, 50)) return 'discard'
    if (at > thirdRow) {
      if (over(value, 45) || missed(look, of.limit, thirdRow)) return 'discard'
      word = 'act'
    } else if (at > secondRow && over(value, 45)) {
      if (missed(look, 45, secondRow)) return 'discard'
      word = 'act'
    }
  }
  return of.isWarm ? word : 'within'
}
