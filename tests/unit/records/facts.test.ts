// What records are found by, told from whole records of our own; promises of this project, no published source.
import { describe, expect, it } from 'vitest'
import { chilledAt } from '../../../server/utils/hold/chilled'
import { shortestHold } from '../../../server/utils/hold/shortest-hold'
import { bearsOnSearch, searchFacts } from '../../../server/utils/records/facts'
import { writtenIn } from '../../../server/utils/records/words'
import { foldLog } from '../../../shared/record/fold'
import { isoTime } from '../../../shared/record/entry'
import { inUnit } from '../../../shared/record/select'
import { supervisor, technician, RecordWriter } from '../../support/record'
import { buildRecord } from '../../support/scenario'
import { BEGAN, DAIRY, FISH, goOn, inHand, reading, snapshot, storyTo, unplanned } from '../record/store'

const factsOf = (writer: RecordWriter) => searchFacts(writer.state, BEGAN)

describe('what a record is found by', () => {
  it('a quiet record: who signed, its points, its time without control', () => {
    const writer = storyTo('sealed')
    const facts = factsOf(writer)
    expect(facts).toMatchObject({ openedOn: '2026-03-02', darkSince: null, darkSeconds: 20 * 60 + 12, people: [technician.id, supervisor.id].sort() })
    expect(facts.endedAt).toBe(writer.now)
    expect(facts.tags).toEqual(['C-1', 'C-2', 'CF-1', 'DH-1', 'EF-1', 'LLS-1'])
  })

  it('the day is that of the site', () => {
    const { state } = storyTo('plan')
    expect(searchFacts(state, Date.UTC(2026, 2, 3, 5, 59)).openedOn).toBe('2026-03-02') // Chicago is six hours behind in winter
    expect(searchFacts(state, Date.UTC(2026, 2, 3, 6, 0)).openedOn).toBe('2026-03-03')
  })

  it('without control now: since when, and no time that is over', () => {
    const writer = storyTo('dark')
    expect(factsOf(writer)).toMatchObject({ darkSince: writer.now, darkSeconds: 0, holdSeconds: null })
  })

  it('an outage that nobody planned, with a case over its limit', () => {
    const writer = new RecordWriter('Lost', BEGAN)
    writer.sign(technician, 'outage-opened', unplanned(BEGAN - 600_000))
    expect(factsOf(writer).outcomes).toEqual(['unplanned'])
    writer.pass(2).sign(technician, 'reading-taken', reading(DAIRY, 42))
    expect(factsOf(writer).outcomes).toContain('above-limit')
  })

  it('a reading that was struck out leaves no record above a limit', () => {
    const writer = storyTo('dark')
    const { id } = writer.pass(2).sign(technician, 'reading-taken', reading(DAIRY, 48))
    expect(factsOf(writer).outcomes).toContain('above-limit')
    writer.sign(technician, 'correction', { corrects: id, reason: 'read off the wrong probe', reading: 'struck' })
    expect(factsOf(writer).outcomes).not.toContain('above-limit')
  })

  it('acts and discards', () => {
    const writer = storyTo('dark')
    writer.pass(2).sign(technician, 'act-signed', { caseId: FISH, act: 'night-covers', product: '', quantity: null, place: '', words: '', photos: [] })
    expect(factsOf(writer).outcomes).toEqual(['act'])
    writer.sign(technician, 'act-signed', { caseId: FISH, act: 'discarded', product: 'cod', quantity: 4, unit: 'kg', place: 'bin', takenBy: 'the shop', words: '', photos: [] })
    expect(factsOf(writer).outcomes).toEqual(['act', 'discard'])
  })

  it('a point beside the plan counts once it is touched, an excused one as excused', () => {
    const writer = storyTo('in-hand')
    expect(factsOf(writer).tags).not.toContain('LA-1')
    writer.sign(technician, 'point-excused', { tag: 'LA-1', reason: 'no switch', measure: 'watched', photos: [] })
    expect(factsOf(writer)).toMatchObject({ outcomes: ['excused'], tags: expect.arrayContaining(['LA-1']) })
  })

  it('readings that came late, once the record has ended', () => {
    const onTime = buildRecord()
    expect(searchFacts(onTime.state, BEGAN)).toMatchObject({ lateReadings: 0, outcomes: ['act'] }) // under a quarter of an hour of hold was left
    const gap = { roundsAt: [5, 22] }
    expect(searchFacts(buildRecord({ ...gap, until: 'settle' }).state, BEGAN).lateReadings).toBe(0)
    const late = searchFacts(buildRecord(gap).state, BEGAN)
    expect(late.lateReadings).toBeGreaterThan(0)
    expect(late.outcomes).toContain('late-rounds')
  })

  it('an entry that asks for nothing anew changes nothing', () => {
    for (const writer of [storyTo('sealed'), buildRecord({ excuse: ['CF-3'] })]) {
      let before = ''
      let still = 0
      for (let size = 1; size <= writer.entries.length; size++) {
        const state = foldLog(writer.id, writer.entries.slice(0, size))
        const now = JSON.stringify([state.phase, state.plan.workKind, searchFacts(state, BEGAN)])
        const { entry: { kind }, standing } = writer.entries[size - 1]!
        if (!bearsOnSearch({ kind, standing })) {
          expect(now).toBe(before)
          still++
        }
        before = now
      }
      expect(still).toBeGreaterThan(10)
    }
  })

  it('a questioned entry of any kind asks anew', () => {
    expect([bearsOnSearch({ kind: 'note-added', standing: 'accepted' }), bearsOnSearch({ kind: 'note-added', standing: 'questioned' })]).toEqual([false, true])
  })
})

describe('the shortest hold', () => {
  // Readings on an exponential course with a known time constant: the limit of 41 °F is met at τ · ln((24 − 2.78) / (24 − 5)) hours. No source but the formula.
  const warmed = (minutes: number, tauHours: number) => inUnit(chilledAt(2.78, 24, tauHours, minutes), 'F')
  function lostWith(dairyTau: number, fishTau: number): RecordWriter {
    const writer = storyTo('dark')
    for (const minute of [4, 8, 12, 16, 20]) {
      writer.now = writer.state.darks[0]!.from + minute * 60_000
      writer.sign(technician, 'reading-taken', reading(DAIRY, warmed(minute, dairyTau), { round: minute }))
      writer.sign(technician, 'reading-taken', reading(FISH, warmed(minute, fishTau), { round: minute }))
    }
    return writer
  }

  it('is that of the case that warms fastest, and is told only once control is back', () => {
    const writer = lostWith(3, 8)
    expect(shortestHold(writer.state)).toBeNull()
    writer.pass(1).sign(technician, 'control-back', { backAt: isoTime(writer.now) })
    const expected = 3 * Math.log((24 - 2.78) / (24 - 5)) * 60
    expect(shortestHold(writer.state)!).toBeGreaterThan(0.8 * expected)
    expect(shortestHold(writer.state)!).toBeLessThan(1.35 * expected) // the kind's own time constant pulls at few readings
    expect(factsOf(writer).holdSeconds).toBe(Math.round(shortestHold(writer.state)! * 60))
  })

  it('a record without readings has none', () => {
    const writer = storyTo('dark')
    writer.pass(1).sign(technician, 'control-back', { backAt: isoTime(writer.now) })
    expect(shortestHold(writer.state)).toBeNull()
  })

  it('every case counts, and the shorter one wins wherever it stands', () => {
    const [one, other] = [lostWith(3, 8), lostWith(8, 3)]
    for (const writer of [one, other]) writer.pass(1).sign(technician, 'control-back', { backAt: isoTime(writer.now) })
    expect(shortestHold(one.state)!).toBeCloseTo(shortestHold(other.state)!, 6)
  })
})

describe('words', () => {
  it('are what people wrote, wherever it stands in a body, and no equipment', () => {
    expect(writtenIn({ tag: 'C-1', words: ' runs rough ', points: [{ reason: 'no selector', owner: 'x' }], snapshot: { words: 'not this' } })).toEqual(['runs rough', 'no selector'])
    expect(writtenIn({ words: '', reason: '   ' })).toEqual([])
    expect(writtenIn(null)).toEqual([])
  })

  it('of an opening are its cause and what the plan says, not the place of a point', () => {
    const [opened] = storyTo('plan').entries.filter(({ entry }) => entry.kind === 'outage-opened')
    expect(writtenIn(opened!.entry.body)).toEqual([])
    expect(snapshot.points[0]!.place).toBe('Panel A')
    const writer = storyTo('in-hand')
    writer.sign(technician, 'point-in-hand', inHand('DH-1', { words: 'breaker labelled DH-2' }))
    expect(writer.entries.flatMap(({ entry }) => writtenIn(entry.body))).toContain('breaker labelled DH-2')
  })
})

it('a record told on from a phase has the same facts as one told at once', () => {
  const writer = storyTo('dark')
  goOn(writer, 'dark', 'sealed')
  expect(factsOf(writer)).toEqual(factsOf(storyTo('sealed')))
})
