/** Thermometers and their checks. Ice point 0 °C, 32 °F; accuracies by Food Code 4-203.11; 90 days are this project's default, no source. */
import { describe, expect, it } from 'vitest'
import { isoTime } from '../../../shared/record/entry'
import { checkStanding, instrumentLines, lastInstrument, readingDoubt, readsIcePoint } from '../../../shared/record/instruments'
import { accuracyWords, doubtWords, standingWords } from '../../../shared/record/instrument-words'
import { readingsCsv } from '../../../shared/record/readings-csv'
import type { RecordWriter } from '../../support/record'
import { secondTechnician, technician, uuidFor } from '../../support/record'
import { DAIRY, FISH, INSTRUMENT, reading, storyTo } from './store'

const check = (writer: RecordWriter, value: number, within: boolean) => writer.pass(1).sign(technician, 'instrument-checked', { instrumentId: INSTRUMENT, value, unit: 'F', within })
const read = (writer: RecordWriter, caseId = DAIRY) => writer.pass(1).sign(technician, 'reading-taken', reading(caseId, 38, { instrumentId: INSTRUMENT }))

/** In the dark, the thermometer last checked on a day. */
function dark(lastCheckOn: string | null): RecordWriter {
  const writer = storyTo('dark')
  writer.state.snapshot.instruments[0]!.lastCheckOn = lastCheckOn
  return writer
}

describe('the ice point', () => {
  it.each([[0, 'C', 0.5, true], [0.5, 'C', 0.5, true], [-0.5, 'C', 0.5, true], [0.6, 'C', 0.5, false], [32, 'F', 1, true], [33.8, 'F', 1, true], [33.9, 'F', 1, false], [30.2, 'F', 1, true], [30.1, 'F', 1, false]] as const)('%s °%s within ±%s K: %s', (value, unit, accuracy, within) => {
    expect(readsIcePoint(value, unit, accuracy)).toBe(within)
  })
})

describe('the standing of a check', () => {
  // The story is dark on 2 March 2026 in Chicago.
  it('is overdue when it is older than the site asks, and not on the last day', () => {
    const writer = dark('2025-12-02')
    expect(checkStanding(writer.state, INSTRUMENT, writer.now)).toEqual({ lastOn: '2025-12-02', days: 90, overdue: false, out: false })
    expect(checkStanding(writer.state, INSTRUMENT, writer.now, 89).overdue).toBe(true)
    expect(checkStanding(dark('2025-12-01').state, INSTRUMENT, writer.now)).toMatchObject({ days: 91, overdue: true })
    expect(checkStanding(dark(null).state, INSTRUMENT, writer.now)).toEqual({ lastOn: null, days: null, overdue: true, out: false })
    writer.state.snapshot.site.instrumentCheckDays = 30
    expect(checkStanding(writer.state, INSTRUMENT, writer.now).overdue).toBe(true)
  })
  it('is renewed by a check in ice that it passed, and not by one that it failed', () => {
    const writer = dark('2025-06-01')
    const before = writer.now
    check(writer, 34, false)
    expect(checkStanding(writer.state, INSTRUMENT, writer.now)).toMatchObject({ lastOn: '2025-06-01', overdue: true, out: true })
    check(writer, 32.4, true)
    expect(checkStanding(writer.state, INSTRUMENT, writer.now)).toEqual({ lastOn: '2026-03-02', days: 0, overdue: false, out: false })
    expect(checkStanding(writer.state, INSTRUMENT, before)).toMatchObject({ overdue: true, out: false })
  })
  it('is said in words only when something is wrong', () => {
    const writer = dark('2025-11-22')
    expect(standingWords(writer.state, INSTRUMENT, writer.now)).toBe('Last checked Sat 22 Nov 2025, 100 days ago. The site asks for a check every 90 days.')
    expect(standingWords(dark(null).state, INSTRUMENT, writer.now)).toBe('It was never checked. The site asks for a check every 90 days.')
    expect(standingWords(dark('2026-02-01').state, INSTRUMENT, writer.now)).toBeNull()
    check(writer, 34, false)
    expect(standingWords(writer.state, INSTRUMENT, writer.now)).toBe('It was out of tolerance in ice: use another one.')
    expect([accuracyWords(0.5, 'F'), accuracyWords(0.5, 'C')]).toEqual(['±0.9 °F', '±0.5 °C'])
  })
})

describe('readings by a doubtful thermometer', () => {
  it('are pointed out: before and after a failed check, until one is passed', () => {
    const writer = dark('2026-02-01')
    const doubts = () => writer.state.cases[DAIRY]!.readings.filter(taken => taken.instrumentId !== null).map(taken => readingDoubt(writer.state, taken))
    read(writer)
    expect(doubts()).toEqual([null])
    check(writer, 32, true)
    read(writer)
    check(writer, 34, false)
    read(writer)
    check(writer, 32, true)
    read(writer)
    expect(doubts()).toEqual([null, 'out', 'out', null])
    const [line] = instrumentLines(writer.state)
    expect(line).toMatchObject({ name: 'T-1', readings: 4, overdueReadings: 0, outReadings: 2, out: false })
    expect(line!.checks.map(item => item.within)).toEqual([true, false, true])
    expect(doubtWords(line!)).toBe('T-1: out of tolerance in ice, 2 readings by it')
  })
  it('are pointed out while its check is overdue, and in the CSV', () => {
    const writer = dark(null)
    read(writer)
    check(writer, 32, true)
    read(writer, FISH)
    expect(instrumentLines(writer.state).map(doubtWords)).toEqual(['T-1: check overdue, 1 reading by it'])
    const csv = readingsCsv(writer.state, writer.entries).split('\r\n')
    const column = csv[0]!.split(',').indexOf('instrument_check')
    const said = csv.slice(1, -1).map(row => row.split(',')[column])
    expect(said.slice(-2)).toEqual(['never checked', 'in time'])
    expect(said[0]).toBe('')
  })
  it('none where no reading names one', () => {
    expect([instrumentLines(storyTo('dark').state), readingDoubt(storyTo('dark').state, { instrumentId: null, at: 0 })]).toEqual([[], null])
  })
})

describe('the thermometer offered', () => {
  it('is the one that the person used last, else the first for product', () => {
    const writer = dark(null)
    const other = uuidFor('another thermometer')
    writer.state.snapshot.instruments.push({ id: other, name: 'T-2', kind: 'product', accuracyC: 1, lastCheckOn: null })
    expect(lastInstrument(writer.state, technician.id)).toBe(INSTRUMENT)
    writer.pass(1).sign(technician, 'reading-taken', reading(DAIRY, 38, { instrumentId: other }))
    read(writer, FISH)
    writer.pass(1).sign(technician, 'reading-taken', reading(DAIRY, 38, { instrumentId: other }))
    expect(lastInstrument(writer.state, technician.id)).toBe(other)
    expect(lastInstrument(writer.state, secondTechnician.id)).toBe(INSTRUMENT)
    writer.state.snapshot.instruments = []
    expect(lastInstrument(writer.state, secondTechnician.id)).toBeNull()
    expect(isoTime(writer.now)).toContain('2026-03-03')
  })
})
