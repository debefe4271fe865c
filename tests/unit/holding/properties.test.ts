/** What must hold of every log under every rulebook. */
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { AssessInput } from '../../../shared/schemas/assess'
import { assess, rulebooks } from '../../../server/utils/holding'
import type { Assessment, Verdict } from '../../../server/utils/holding'
import { convertDifference, convertTemperature } from '../../../server/utils/holding/units'
import { at, DARK_AT } from './log'

const RUNS = { numRuns: 40 }

/** `unknown` is worse than within, since nobody looked, and milder than anything that a reading says. */
const RANK: Record<Verdict, number> = { within: 0, unknown: 1, above: 2, act: 3, discard: 4 }

const rows = rulebooks.flatMap(rulebook => rulebook.classes.map(foodClass => ({ rulebook, foodClass, name: `${rulebook.id}/${foodClass.id}` })))
type Row = (typeof rows)[number]

/** True of a row that counts its periods: there a warmer reading may join two of them to one, which is milder. */
const countsPeriods = ({ foodClass }: Row) => foodClass.rules.some(({ kind }) => kind === 'rises')

/** Temperatures about the marks of a row, in its own unit, below hot holding. */
function temperatures({ rulebook, foodClass }: Row): fc.Arbitrary<number> {
  const marks = foodClass.rules.flatMap((rule) => {
    if (rule.kind === 'clock' || rule.kind === 'mark') return rule.over === 'limit' ? [] : [rule.over]
    return rule.kind === 'chart' ? rule.rows[0]!.cells.flatMap(({ to }) => to === null ? [] : [to]) : []
  })
  const about = [foodClass.limit, ...marks].flatMap(mark => [mark - 1, mark, mark + 0.5])
  const span = rulebook.unit === 'F' ? 20 : 11
  return fc.oneof(
    fc.constantFrom(...about),
    fc.integer({ min: -10 * span, max: 10 * span }).map(tenths => foodClass.limit + tenths / 10),
  )
}

/** Logs of a row: gaps in whole minutes, some of them long. */
function logs(row: Row, values = temperatures(row)): fc.Arbitrary<AssessInput> {
  const gap = fc.oneof(fc.integer({ min: 1, max: 15 }), fc.integer({ min: 1, max: 150 }))
  return fc.record({
    first: fc.integer({ min: -60, max: 90 }),
    steps: fc.array(fc.tuple(gap, values), { minLength: 1, maxLength: 8 }),
    rest: fc.oneof(fc.constant(0), fc.integer({ min: 0, max: 200 })),
    intervalMinutes: fc.constantFrom(5, 10, 30),
    addAccuracy: fc.boolean(),
  }).map(({ first, steps, rest, intervalMinutes, addAccuracy }) => {
    let minutes = first
    const readings = steps.map(([step, value], index) => {
      if (index > 0) minutes += step
      return { at: at(minutes), value }
    })
    return {
      rulebook: row.rulebook.id,
      foodClass: row.foodClass.id,
      unit: row.rulebook.unit,
      darkAt: at(0),
      intervalMinutes,
      readings,
      now: at(Math.max(0, minutes) + rest),
      site: { addAccuracy },
    }
  })
}

const rank = (assessment: Assessment) => RANK[assessment.verdict]
const later = (instant: string, minutes: number) => new Date(Date.parse(instant) + minutes * 60_000).toISOString()

/** The log as far as it was known at a moment between two of its readings. */
function asKnownAt(log: AssessInput, now: string): AssessInput | null {
  const readings = log.readings.filter(reading => reading.at <= now)
  return readings.length > 0 && Date.parse(now) >= DARK_AT ? { ...log, readings, now } : null
}

describe.each(rows.filter(row => !countsPeriods(row)))('$name', (row) => {
  it('never grows milder with a warmer reading', () => {
    fc.assert(fc.property(logs(row), fc.nat(), fc.integer({ min: 1, max: 100 }), (log, pick, tenths) => {
      const index = pick % log.readings.length
      const readings = log.readings.map((reading, at) => at === index ? { ...reading, value: reading.value + tenths / 10 } : reading)
      const warmer = assess({ ...log, readings })
      const cooler = assess(log)
      expect(rank(warmer)).toBeGreaterThanOrEqual(rank(cooler))
      expect(warmer.minutesAbove.careful).toBeGreaterThanOrEqual(cooler.minutesAbove.careful)
      expect(warmer.minutesAbove.linear).toBeGreaterThanOrEqual(cooler.minutesAbove.linear - 1e-9)
    }), RUNS)
  })
})

describe.each(rows)('$name', (row) => {
  it('gives the same for °C and °F', () => {
    fc.assert(fc.property(logs(row), fc.option(fc.double({ min: 0, max: 3, noNaN: true })), (log, accuracy) => {
      const own = { ...log, readings: log.readings.map(reading => accuracy === null ? reading : { ...reading, accuracy }) }
      const unit = log.unit === 'C' ? 'F' : 'C'
      const other = {
        ...own,
        unit,
        readings: own.readings.map(reading => ({
          ...reading,
          value: convertTemperature(reading.value, log.unit, unit),
          ...(accuracy === null ? {} : { accuracy: convertDifference(accuracy, log.unit, unit) }),
        })),
      } as const
      const { minutesAbove, why, ...rest } = assess(own)
      const { minutesAbove: otherMinutes, why: otherWhy, ...otherRest } = assess(other)
      expect(otherRest).toEqual(rest)
      expect(otherWhy).toEqual(why)
      expect(otherMinutes.careful).toBe(minutesAbove.careful)
      expect(otherMinutes.linear).toBeCloseTo(minutesAbove.linear, 4)
    }), RUNS)
  })

  it('has the same linear minutes with one reading more on the line between two', () => {
    const hot = row.foodClass.hotFrom === null ? [] : [row.foodClass.hotFrom, row.foodClass.hotFrom + 8]
    const between = fc.tuple(logs(row, fc.oneof(temperatures(row), ...hot.map(value => fc.constant(value)))), fc.nat(), fc.double({ min: 0.01, max: 0.99, noNaN: true }))
    fc.assert(fc.property(between, ([log, pick, part]) => {
      const [from, to] = [pick % log.readings.length, pick % log.readings.length + 1].map(index => log.readings[index])
      if (!from || !to) return
      const length = Date.parse(to.at) - Date.parse(from.at)
      const ms = Math.round(length * part)
      const more = { at: new Date(Date.parse(from.at) + ms).toISOString(), value: from.value + (to.value - from.value) * ms / length }
      const readings = log.readings.toSpliced(pick % log.readings.length + 1, 0, more)
      expect(assess({ ...log, readings }).minutesAbove.linear).toBeCloseTo(assess(log).minutesAbove.linear, 3)
    }), RUNS)
  })

  it('never grows milder as time passes', () => {
    fc.assert(fc.property(logs(row), fc.integer({ min: 1, max: 400 }), (log, minutes) => {
      expect(rank(assess({ ...log, now: later(log.now, minutes) }))).toBeGreaterThanOrEqual(rank(assess(log)))
    }), RUNS)
  })

  it('keeps a discard, and an act that no chart ends, whatever is read later', () => {
    const endsActs = row.foodClass.rules.some(({ kind }) => kind === 'chart')
    fc.assert(fc.property(logs(row), fc.integer({ min: 0, max: 900 }), (log, minutes) => {
      const known = asKnownAt(log, at(minutes))
      if (!known || known.now > log.now) return
      const then = assess(known)
      const now = assess(log)
      if (then.verdict === 'discard') expect(now.verdict).toBe('discard')
      if (then.verdict === 'act' && !endsActs) expect(rank(now)).toBeGreaterThanOrEqual(RANK.act)
    }), RUNS)
  })

  it('has a deadline exactly where the verdict then gets worse, and not before', () => {
    fc.assert(fc.property(logs(row), (log) => {
      const assessment = assess(log)
      if (assessment.deadline === null) {
        if (assessment.verdict === 'above' || (assessment.verdict === 'act' && Date.parse(log.now) === Date.parse(log.readings.at(-1)!.at))) {
          expect(rank(assess({ ...log, now: later(log.now, 5_000) }))).toBe(rank(assessment))
        }
        return
      }
      expect(['above', 'act']).toContain(assessment.verdict)
      expect(assessment.deadline >= log.now).toBe(true)
      expect(rank(assess({ ...log, now: later(assessment.deadline, 0.001) }))).toBeGreaterThan(rank(assessment))
      const before = later(assessment.deadline, -0.001)
      if (before >= log.now) expect(rank(assess({ ...log, now: before }))).toBe(rank(assessment))
    }), RUNS)
  })

  it('never lets unknown hide a clock that runs', () => {
    fc.assert(fc.property(logs(row), (log) => {
      const { verdict, limit } = assess({ ...log, site: {} })
      const last = log.readings.at(-1)!
      if (last.value > limit.value + 1e-6) expect(rank({ verdict } as Assessment)).toBeGreaterThanOrEqual(RANK.above)
      else expect(['within', 'unknown', 'act', 'discard']).toContain(verdict)
      // Where nobody has looked for long, a discard of any moment before still stands.
      const worst = Math.max(...log.readings.map(reading => assess({ ...log, site: {}, readings: log.readings.filter(({ at }) => at <= reading.at), now: reading.at > log.darkAt ? reading.at : log.darkAt })).map(rank))
      if (verdict === 'unknown') expect(worst).toBeLessThan(RANK.discard)
    }), RUNS)
  })

  it('has no more linear than careful minutes, and a reason always', () => {
    fc.assert(fc.property(logs(row), (log) => {
      const { minutesAbove, why, clause, source, verdict, act } = assess(log)
      expect(minutesAbove.linear).toBeLessThanOrEqual(minutesAbove.careful)
      expect(why.length).toBeGreaterThan(1)
      expect(clause).not.toBe('')
      expect(source).not.toBe('')
      expect(act === null).toBe(verdict === 'within')
    }), RUNS)
  })

  it('is stricter, never milder, by a site’s own figures', () => {
    fc.assert(fc.property(logs(row), fc.double({ min: 0, max: countsPeriods(row) ? 0 : 5, noNaN: true }), fc.integer({ min: 1, max: 300 }), (log, lower, minutes) => {
      const site = { ...log.site, limit: row.foodClass.limit - lower, minutes }
      expect(rank(assess({ ...log, site }))).toBeGreaterThanOrEqual(rank(assess(log)))
    }), RUNS)
  })
})
