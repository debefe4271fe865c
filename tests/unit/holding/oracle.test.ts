/**
 * The engine beside a second implementation, which walks every log span by span with a table of its own and finds
 * deadlines by trying later moments. The logs are random and the same every time; there is no published source.
 */
import { describe, expect, it } from 'vitest'
import type { Assessment } from '../../../server/utils/holding'
import { assess, parseAssessInput, rulebooks } from '../../../server/utils/holding'
import type { OracleVerdict } from './oracle/judge'
import { oracle } from './oracle/judge'
import { randomLog, seeded } from './oracle/random-logs'
import { ORACLE_ROWS } from './oracle/table'

/** Fewer where every mutant of the engine is tried. */
const LOGS = Number(process.env.ORACLE_LOGS ?? 24_000)

/** Everything but the words; linear minutes to a ten-thousandth, since crossings are worked out in another way. */
function agree(first: Assessment, second: OracleVerdict): boolean {
  return first.verdict === second.verdict && first.deadline === second.deadline
    && first.limit.value === second.limit.value && first.limit.unit === second.limit.unit
    && first.startedWarm === second.startedWarm && first.tooCold === second.tooCold && first.suspect === second.suspect
    && Math.abs(first.minutesAbove.careful - second.carefulMinutes) < 1e-9
    && Math.abs(first.minutesAbove.linear - second.linearMinutes) < 1e-4
}

describe('the second implementation', () => {
  it('has every row of every rulebook', () => {
    const rows = rulebooks.flatMap(({ id, classes }) => classes.map(foodClass => `${id}/${foodClass.id}`))
    expect(Object.keys(ORACLE_ROWS).sort()).toEqual(rows.sort())
  })

  it(`agrees with the engine on ${LOGS} logs`, () => {
    const random = seeded(20_260_301)
    const met = new Map<string, number>()
    for (let index = 0; index < LOGS; index += 1) {
      const log = randomLog(random)
      const parsed = parseAssessInput(log)
      if (!parsed.ok) throw new Error(`log ${index}: ${parsed.field} ${parsed.reason}\n${JSON.stringify(log)}`)
      const first = assess(parsed.input)
      const second = oracle(log)
      if (!agree(first, second)) expect(first, `log ${index}: ${JSON.stringify(log)}`).toEqual(second)
      const { verdict, deadline } = first
      for (const key of [`${log.rulebook}/${log.foodClass} ${verdict}`, deadline === null ? 'no deadline' : 'deadline', `${log.unit} as input`])
        met.set(key, (met.get(key) ?? 0) + 1)
    }
    // The comparison is worth something only where every verdict of every row was met.
    for (const name of Object.keys(ORACLE_ROWS)) {
      const verdicts = ['within', 'above', 'act', 'discard', 'unknown'].filter(verdict => (met.get(`${name} ${verdict}`) ?? 0) > 0)
      expect(verdicts.length, `${name}: ${verdicts.join(', ')}`).toBeGreaterThanOrEqual(3)
    }
    expect(met.get('deadline')).toBeGreaterThan(LOGS / 20)
    expect(met.get('C as input')).toBeGreaterThan(LOGS / 3)
  }, 60_000)
})
