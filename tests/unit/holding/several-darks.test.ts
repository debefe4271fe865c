/** A case through several losses of control in one outage; figures worked by hand on the charts named, no published source for the sequence. */
import { describe, expect, it } from 'vitest'
import { rulebookById } from '../../../server/utils/holding'
import { assessCase } from '../../../server/utils/holding/for-outage'
import { isoTime } from '../../../shared/record/entry'
import { technician } from '../../support/record'
import type { RecordWriter } from '../../support/record'
import { DAIRY, reading, storyTo } from '../record/store'

/** Control back after 20 minutes, product at 39 °F, and lost again at once. */
function lostTwice(rulebook: string): { writer: RecordWriter, firstLost: number } {
  const writer = storyTo('hand-back')
  const { id, version, name } = rulebookById(rulebook)!
  writer.state.snapshot.rulebook = { id, version, name }
  const firstLost = writer.state.darks[0]!.from
  writer.pass(40).sign(technician, 'control-lost', { lostAt: isoTime(writer.now), words: 'again' })
  expect(writer.state.darks.map(({ from, to }) => [(from - firstLost) / 60_000, to === null ? null : (to - firstLost) / 60_000])).toEqual([[0, 20.2], [60.2, null]])
  return { writer, firstLost }
}

describe('several dark intervals', () => {
  it('have one clock in the charts, from the first loss of control (Washington State Department of Health, V)', () => {
    const { writer, firstLost } = lostTwice('us-wa-doh')
    writer.pass(10).sign(technician, 'reading-taken', reading(DAIRY, 47))
    expect(assessCase(writer.state, DAIRY, writer.now)).toMatchObject({ verdict: 'above', deadline: isoTime(firstLost + 240 * 60_000) })
    expect(assessCase(writer.state, DAIRY, firstLost + 240 * 60_000)!.verdict).toBe('above')
    expect(assessCase(writer.state, DAIRY, firstLost + 241 * 60_000)!.verdict).toBe('discard')
  })

  it('have their minutes above summed, the time within between them left out (Food Code outage practice: Iowa DIAL, V)', () => {
    const { writer } = lostTwice('us-food-code-2022')
    writer.pass(10).sign(technician, 'reading-taken', reading(DAIRY, 44))
    writer.pass(30).sign(technician, 'reading-taken', reading(DAIRY, 40))
    const before = assessCase(writer.state, DAIRY, writer.now)!
    expect(before).toMatchObject({ verdict: 'within', deadline: null })
    writer.pass(50).sign(technician, 'reading-taken', reading(DAIRY, 40))
    writer.pass(10).sign(technician, 'reading-taken', reading(DAIRY, 44))
    const after = assessCase(writer.state, DAIRY, writer.now)!
    expect(after.minutesAbove.careful).toBe(before.minutesAbove.careful + 10)
    expect(after.deadline).toBe(isoTime(writer.now + (240 - after.minutesAbove.careful) * 60_000))
  })
})

describe('the change of the clocks', () => {
  it('neither adds an hour nor takes one: what counts is UTC (daylight saving time begins in Chicago on 8 March 2026, 08:00 UTC)', () => {
    const { writer } = lostTwice('us-food-code-2022')
    // The same record, five days later, so that the hour is skipped while the case is above its limit.
    const shift = Date.UTC(2026, 2, 8, 7, 30) - writer.now
    const state = structuredClone(writer.state)
    for (const dark of state.darks) Object.assign(dark, { from: dark.from + shift, to: dark.to === null ? null : dark.to + shift })
    const item = state.cases[DAIRY]!
    for (const taken of item.readings) taken.at += shift
    item.readings.push({ ...item.readings.at(-1)!, at: writer.now + shift, value: 44 })
    const { minutesAbove, deadline } = assessCase(state, DAIRY, writer.now + shift + 120 * 60_000)!
    const earlier = (writer.now + shift - item.readings.at(-2)!.at) / 60_000
    expect(minutesAbove.careful).toBeCloseTo(earlier + 120, 9)
    expect(deadline).toBe(isoTime(writer.now + shift + Math.round((240 - earlier) * 60_000)))
  })
})
