/** Whatever happens, the same thing is alerted once: properties over invented histories. The promises are this project's own. */
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { alertsDue } from '../../../server/utils/alerts'
import { foldLog } from '../../../shared/record/fold'
import { isoTime } from '../../../shared/record/entry'
import { RecordWriter, technician } from '../../support/record'
import { BEGAN, DAIRY, FISH, pressure, reading, unplanned } from '../record/store'
import { acknowledge, look, SETTINGS } from './clock'

type Step = { do: 'wait', minutes: number } | { do: 'read', which: string, value: number } | { do: 'press', suction: number } | { do: 'silence', minutes: number } | { do: 'acknowledge' } | { do: 'ice', which: string } | { do: 'back' }

const step: fc.Arbitrary<Step> = fc.oneof(
  { weight: 5, arbitrary: fc.record({ do: fc.constant('wait' as const), minutes: fc.integer({ min: 1, max: 20 }) }) },
  { weight: 4, arbitrary: fc.record({ do: fc.constant('read' as const), which: fc.constantFrom(DAIRY, FISH), value: fc.integer({ min: 330, max: 560 }).map(value => value / 10) }) },
  fc.record({ do: fc.constant('press' as const), suction: fc.constantFrom(21, 40, 48) }),
  fc.record({ do: fc.constant('silence' as const), minutes: fc.integer({ min: 5, max: 60 }) }),
  fc.record({ do: fc.constant('acknowledge' as const) }),
  fc.record({ do: fc.constant('ice' as const), which: fc.constantFrom(DAIRY, FISH) }),
  { weight: 1, arbitrary: fc.record({ do: fc.constant('back' as const) }) },
)

function take(writer: RecordWriter, what: Step): void {
  if (what.do === 'wait') writer.pass(what.minutes)
  if (what.do === 'acknowledge') acknowledge(writer, technician)
  if (writer.state.phase !== 'dark') return
  if (what.do === 'read') writer.pass(0.1).sign(technician, 'reading-taken', reading(what.which, what.value))
  if (what.do === 'press') writer.pass(0.1).sign(technician, 'pressure-read', pressure(what.suction))
  if (what.do === 'silence') writer.sign(technician, 'silence-announced', { until: isoTime(writer.now + what.minutes * 60_000) })
  if (what.do === 'ice') writer.sign(technician, 'act-signed', { caseId: what.which, act: 'ice', quantity: null })
  if (what.do === 'back') writer.sign(technician, 'control-back', { backAt: isoTime(writer.now) })
}

function begun(): RecordWriter {
  const writer = new RecordWriter('Mill Lane', BEGAN)
  writer.sign(technician, 'outage-opened', unplanned(writer.now))
  return writer
}

describe('alerts', () => {
  it('of any history: a second look finds nothing to do, no key comes twice, none is open twice for one thing, and nothing is done to one that is over', () => {
    fc.assert(fc.property(fc.array(step, { minLength: 5, maxLength: 24 }), (steps) => {
      const writer = begun()
      const keys = new Set<string>()
      const told = new Set<string>()
      for (const what of steps) {
        take(writer, what)
        const before = new Map(writer.state.alerts.map(alert => [alert.key, alert.over]))
        const { raise, passOn } = look(writer)
        expect(alertsDue(writer.state, writer.now, SETTINGS)).toEqual({ raise: [], passOn: [], over: [] })
        for (const { key } of raise) { expect(keys.has(key)).toBe(false); keys.add(key) }
        for (const { key } of passOn) expect(before.get(key)).toBeNull()
        // Nobody is told of the same alert twice.
        for (const { key, to } of [...raise, ...passOn]) for (const person of to) { const each = `${key} ${person.id}`; expect(told.has(each)).toBe(false); told.add(each) }
        const open = writer.state.alerts.filter(alert => alert.over === null && alert.about.length === 1 && !alert.alert.startsWith('round'))
        expect(new Set(open.map(alert => `${alert.alert} ${alert.about[0]}`)).size).toBe(open.length)
      }
      // The log alone holds all of it.
      expect(foldLog(writer.id, writer.entries).alerts).toEqual(writer.state.alerts)
    }), { numRuns: 60, seed: 20_261_201 })
  })

  it('come of the log and the time alone: two that look at the same say the same', () => {
    fc.assert(fc.property(fc.array(step, { maxLength: 15 }), (steps) => {
      const writer = begun()
      for (const what of steps) take(writer, what)
      const again = foldLog(writer.id, writer.entries)
      expect(alertsDue(again, writer.now, SETTINGS)).toEqual(alertsDue(writer.state, writer.now, SETTINGS))
    }), { numRuns: 30, seed: 20_261_201 })
  })
})
