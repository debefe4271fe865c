/**
 * The second implementation's own table: every row's figures written out again as plain decisions, each from the
 * published text that is named beside it (V read in the text, VA in a law that adopts it, VS in a secondary copy).
 */
import type { OracleCase } from './case'
import { sanFrancisco, washington } from './charts'

export type Word = 'within' | 'above' | 'act' | 'discard'

export interface OracleRow {
  unit: 'C' | 'F'
  limit: number
  /** Air decides, as for shell eggs alone. */
  byAir?: boolean
  /** Below this, product may be freezing. */
  cold?: number
  hot?: number
  /** The longest time that a site may still set for itself, minutes; 240 unless given. */
  longest?: number
  /** The verdict falls at the minute itself; otherwise the minute itself is still allowed. */
  fallsAtTheMinute?: boolean
  says: (of: OracleCase) => Word
}

/** What the last reading alone says. */
const stands = (of: OracleCase): Word => of.isWarm ? 'above' : 'within'
/** Lost after more than so many minutes over a mark. */
const lostAfter = (mark: number | null, minutes: number) => (of: OracleCase): Word =>
  of.carefulOver(mark ?? of.limit) > of.allowed(minutes) ? 'discard' : stands(of)
/** Something must be done as soon as the limit was passed once. */
const actsAtOnce = (of: OracleCase): Word => of.wasOver(of.limit) ? 'act' : 'within'
/** Ice cream: to be moved over the mark, lost over the second one. */
const melts = (at: number) => (of: OracleCase): Word => of.wasOver(at) ? 'discard' : actsAtOnce(of)

function michigan(of: OracleCase): Word {
  const lost = of.carefulAt(of.limit) >= of.allowed(300) || of.carefulAt(46) >= of.allowed(240) || of.carefulAt(50) >= of.allowed(120)
  return lost ? 'discard' : stands(of)
}

function england(of: OracleCase): Word {
  return of.periods() > 1 || of.carefulOver(of.limit) >= of.allowed(240) ? 'discard' : stands(of)
}

function australia(mark: number | null) {
  return (of: OracleCase): Word => {
    const sum = of.carefulOver(mark ?? of.limit)
    if (sum >= of.allowed(240)) return 'discard'
    return sum >= of.allowed(120) ? 'act' : stands(of)
  }
}

function australiaFrozen(of: OracleCase): Word {
  const clock = australia(5)(of)
  return clock !== 'discard' && of.periods() > 1 ? 'act' : clock
}

function canada(of: OracleCase): Word {
  return of.carefulOver(of.limit) + of.unwatched() > of.allowed(120) ? 'discard' : stands(of)
}

/** A Union product: its own limit, no clock. */
const union = (limit: number): OracleRow => ({ unit: 'C', limit, cold: -1, says: actsAtOnce })

export const ORACLE_ROWS: Record<string, OracleRow> = {
  // FDA Food Code 2022 3-501.16(A)(2) (VA); four hours: Iowa DIAL, El Paso, Washoe (V)
  'us-food-code-2022/tcs': { unit: 'F', limit: 41, cold: 30, says: lostAfter(null, 240) },
  // 3-501.16(B) (VA)
  'us-food-code-2022/shell-eggs': { unit: 'F', limit: 45, byAir: true, says: lostAfter(null, 240) },
  // keep mark: common practice, no source; 41 °F for four hours: Iowa DIAL (V)
  'us-food-code-2022/frozen': { unit: 'F', limit: 10, says: lostAfter(41, 240) },
  // FoodSafety.gov (V); 22 °F from memory
  'us-food-code-2022/ice-cream': { unit: 'F', limit: 10, says: melts(22) },
  // Washington State Department of Health (V)
  'us-wa-doh/tcs': { unit: 'F', limit: 41, cold: 30, says: washington },
  // San Francisco Department of Public Health (V)
  'us-sf-dph/tcs': { unit: 'F', limit: 41, cold: 30, says: sanFrancisco },
  // Berrien County, Michigan (VS)
  'us-mi-county/tcs': { unit: 'F', limit: 41, cold: 30, fallsAtTheMinute: true, says: michigan },
  // SI 2013/2996 Schedule 4 paragraphs 2 (V) and 5(1) (VA)
  'uk-england-2013/chilled': { unit: 'C', limit: 8, cold: -1, fallsAtTheMinute: true, says: england },
  'uk-england-2013/chilled-storage': { unit: 'C', limit: 8, cold: -1, says: actsAtOnce },
  // SI 2007/191 paragraph 2(b)(ii) (V); 8 °C for four hours: local-authority advice (V)
  'uk-england-2013/quick-frozen': { unit: 'C', limit: -12, says: lostAfter(8, 240) },
  // SI 2007/191 paragraph 1 (V)
  'uk-england-2013/quick-frozen-storage': { unit: 'C', limit: -18, says: actsAtOnce },
  // common practice, no source; −5.6 °C from memory
  'uk-england-2013/ice-cream': { unit: 'C', limit: -12, says: melts(-5.6) },
  // Standard 3.2.2 and the 2-hour/4-hour rule (V)
  'au-3-2-2/tcs': { unit: 'C', limit: 5, cold: -1, hot: 60, fallsAtTheMinute: true, says: australia(null) },
  // keep mark: common practice, no source
  'au-3-2-2/frozen': { unit: 'C', limit: -15, hot: 60, fallsAtTheMinute: true, says: australiaFrozen },
  // Regulation (EC) 853/2004 Annex III (V)
  'eu-853-2004/meat': union(7),
  'eu-853-2004/offal': union(3),
  'eu-853-2004/poultry': union(4),
  'eu-853-2004/minced-meat': union(2),
  'eu-853-2004/meat-preparations': union(4),
  'eu-853-2004/fish': union(2),
  // Directive 89/108/EEC Article 5(2), 3 K (V)
  'eu-853-2004/quick-frozen': { unit: 'C', limit: -18, says: of => of.wasOver(-15) ? 'act' : stands(of) },
  'eu-853-2004/quick-frozen-storage': { unit: 'C', limit: -18, says: actsAtOnce },
  // Canadian outage sheet for food service (V copy)
  'ca-4c/tcs': { unit: 'C', limit: 4, cold: -1, longest: 120, says: canada },
}

/** Directive 89/108/EEC Article 5(2): what a Member State may choose for retail cabinets (V). */
export const MINUS_12: OracleRow = { unit: 'C', limit: -12, says: actsAtOnce }
