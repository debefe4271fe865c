/** How acts open and end: this project's own rules; page 3-501.19 and the like stand in the rulebooks, no published source here. */
import { describe, expect, it } from 'vitest'
import { actNeeded, holdsAgain } from '../../../server/utils/hold/act-needed'
import { openingOf, proveAct } from '../../../shared/record/act-course'
import { discards, openActFaults } from '../../../shared/record/act-words'
import { isoTime } from '../../../shared/record/entry'
import { foldLog } from '../../../shared/record/fold'
import { submitGate } from '../../../shared/record/gates'
import type { BodyInput } from '../../../shared/record/kinds'
import { asNewest } from '../../../shared/record/newest'
import { nextToDo } from '../../../shared/record/next-to-do'
import type { ActCause } from '../../../shared/record/kinds/server'
import type { RecordWriter } from '../../support/record'
import { supervisor, technician } from '../../support/record'
import { DAIRY, FISH, reading, storyTo } from './store'

const act = (kind: BodyInput<'act-signed'>['act'], more: Partial<BodyInput<'act-signed'>> = {}): BodyInput<'act-signed'> => ({ caseId: DAIRY, act: kind, product: 'milk', quantity: 3, unit: 'crates', place: 'cold room', takenBy: kind === 'discarded' ? 'Piet Harrow' : '', ...more })
const dairy = (writer: RecordWriter) => writer.state.cases[DAIRY]!

/** In the dark, with an act open on the dairy wall. */
function open(cause: ActCause): RecordWriter {
  const writer = storyTo('dark')
  writer.pass(10)
  if (cause === 'act' || cause === 'discard') writer.serverEntry('verdict-changed', { caseId: DAIRY, verdict: cause, deadline: null, minutesAbove: 300, clause: '-', source: '-', act: 'Do it.', why: [], judgedAt: isoTime(writer.now) })
  else writer.serverEntry('act-opened', { caseId: DAIRY, cause, deadline: isoTime(writer.now + 600_000), openedAt: isoTime(writer.now) })
  return writer
}

const CAUSES: ActCause[] = ['hold-short', 'deadline-near', 'act', 'discard']

describe('what is signed ends an open act or only records a measure', () => {
  it.each<[BodyInput<'act-signed'>['act'], ActCause[]]>([
    ['cool-by', []], ['night-covers', []], ['ice', []], ['restored-by-hand', []], ['accepted-warm', []],
    ['moved', ['hold-short', 'deadline-near', 'act']], ['used', ['hold-short', 'deadline-near', 'act']], ['emptied', ['hold-short', 'deadline-near', 'act']],
    ['discarded', CAUSES],
  ])('%s ends %j', (kind, ends) => {
    for (const cause of CAUSES) {
      const writer = open(cause)
      writer.pass(1).sign(technician, 'act-signed', act(kind, { coolBy: kind === 'cool-by' ? isoTime(writer.now + 600_000) : null }))
      expect(dairy(writer).openAct === null, cause).toBe(ends.includes(cause))
      if (ends.includes(cause)) expect(dairy(writer).openings.at(-1)!.closed).toMatchObject({ how: 'act', mark: { seq: writer.entries.length } })
    }
  })

  it.each(['moved', 'used', 'discarded'] as const)('%s with product left ends nothing and leaves the case to be judged', (kind) => {
    const writer = open('act')
    writer.pass(1).sign(technician, 'act-signed', act(kind, { left: true }))
    expect([dairy(writer).openAct === null, dairy(writer).empty]).toEqual([false, false])
    writer.pass(1).sign(technician, 'act-signed', act(kind))
    expect([dairy(writer).openAct, dairy(writer).empty]).toEqual([null, true])
  })

  it.each(CAUSES)('a supervisor ends %s by deciding otherwise, with the clause', (cause) => {
    const writer = open(cause)
    writer.pass(1).sign(supervisor, 'decided-otherwise', { caseId: DAIRY, reason: 'hard cheese', clause: '3-501.19' })
    expect(dairy(writer)).toMatchObject({ openAct: null, decidedOtherwise: { clause: '3-501.19' }, openings: [{ cause, closed: { how: 'decision' } }] })
  })

  it('reads an act of version 1 as one that left nothing', () => {
    const writer = storyTo('dark')
    const signed = writer.entries.at(-1)!.entry
    expect(asNewest({ ...signed, v: 1, kind: 'act-signed', body: { caseId: DAIRY, act: 'cooled' } } as never).body).toEqual({ caseId: DAIRY, act: 'cooled', coolBy: null, takenBy: '', left: false })
    expect(asNewest({ ...signed, v: 1, kind: 'decided-otherwise', body: { caseId: DAIRY, reason: 'x' } } as never).body).toEqual({ caseId: DAIRY, reason: 'x', clause: '' })
  })
})

describe('a reading proves', () => {
  const read = (writer: RecordWriter, value: number, more: Partial<BodyInput<'reading-taken'>> = {}) => writer.pass(1).sign(technician, 'reading-taken', reading(DAIRY, value, more))

  it('at or under the limit, in °F or °C, that a case with a near deadline is cool', () => {
    for (const [value, unit, ends] of [[41, 'F', true], [41.1, 'F', false], [5, 'C', true], [5.1, 'C', false]] as const) {
      const writer = open('deadline-near')
      read(writer, value, { unit })
      expect(dairy(writer).openAct === null, `${value} °${unit}`).toBe(ends)
      if (ends) expect(dairy(writer).openings[0]!.closed).toMatchObject({ how: 'reading' })
    }
  })
  it('not by air or infrared', () => {
    for (const method of ['air', 'infrared'] as const) {
      const writer = open('deadline-near')
      read(writer, 35, { method })
      expect(dairy(writer).openAct).not.toBeNull()
    }
  })
  it('not when it was taken before the act was opened', () => {
    const writer = open('deadline-near')
    writer.pass(-1).sign(technician, 'reading-taken', reading(DAIRY, 38))
    expect(dairy(writer).openAct).not.toBeNull()
  })
  it('not under the limit by less than the accuracy, where the site adds it', () => {
    const writer = open('deadline-near')
    writer.state.snapshot.site.holding = { addAccuracy: true, allowsMinus12: false, classes: [] }
    // Without an instrument ±2 °F is demanded (Food Code 4-203.11).
    read(writer, 39.1)
    expect(dairy(writer).openAct).not.toBeNull()
    read(writer, 39)
    expect(dairy(writer).openAct).toBeNull()
  })
  it('a short hold only after a measure, or once control is back', () => {
    const writer = open('hold-short')
    read(writer, 40)
    expect(dairy(writer).openAct).not.toBeNull()
    writer.pass(1).sign(technician, 'act-signed', act('ice'))
    expect(dairy(writer).openAct).not.toBeNull()
    read(writer, 40)
    expect(dairy(writer).openAct).toBeNull()
    const back = open('hold-short')
    back.pass(1).sign(technician, 'control-back', { backAt: isoTime(back.now) })
    read(back, 40)
    expect(dairy(back).openAct).toBeNull()
  })
  it.each(['act', 'discard'] as const)('never that a verdict %s is answered', (cause) => {
    const writer = open(cause)
    writer.pass(1).sign(technician, 'act-signed', act('ice'))
    const { state } = open('deadline-near')
    const cold = { ...state.cases[DAIRY]!.readings.at(-1)!, value: 35, at: writer.now }
    for (const of of [writer.state, state]) {
      of.cases[DAIRY]!.readings.push(cold)
      proveAct(of, DAIRY, { ...state.opened!, at: writer.now })
    }
    expect([openingOf(dairy(writer))?.cause, state.cases[DAIRY]!.openAct]).toEqual([cause, null])
  })
  it('and proves nothing any more once it is corrected to above the limit or struck', () => {
    for (const corrected of [{ value: 45 }, 'struck'] as const) {
      const writer = open('deadline-near')
      read(writer, 38)
      const proof = writer.entries.filter(stored => stored.entry.kind === 'reading-taken').at(-1)!.entry.id
      expect(dairy(writer).openAct).toBeNull()
      writer.pass(1).sign(technician, 'correction', { corrects: proof, reason: 'read off the wrong probe', reading: corrected })
      expect(openingOf(dairy(writer))).toMatchObject({ cause: 'deadline-near', closed: null })
    }
  })
})

describe('a verdict', () => {
  it('takes the place of a milder act, and takes its own away when it grows milder', () => {
    const writer = open('deadline-near')
    const verdict = (kind: 'act' | 'above' | 'discard') => writer.serverEntry('verdict-changed', { caseId: DAIRY, verdict: kind, deadline: null, minutesAbove: 1, clause: '-', source: '-', act: null, why: [], judgedAt: isoTime(writer.now) })
    verdict('act')
    expect(dairy(writer).openings.map(opening => [opening.cause, opening.closed?.how ?? null])).toEqual([['deadline-near', 'worse'], ['act', null]])
    verdict('above')
    expect(dairy(writer).openAct).toBeNull()
    expect(dairy(writer).openings[1]!.closed!.how).toBe('verdict')
  })
  it('that is milder leaves an act of a near deadline open', () => {
    const writer = open('deadline-near')
    writer.serverEntry('verdict-changed', { caseId: DAIRY, verdict: 'above', deadline: null, minutesAbove: 1, clause: '-', source: '-', act: null, why: [], judgedAt: isoTime(writer.now) })
    expect(openingOf(dairy(writer))?.cause).toBe('deadline-near')
  })
})

describe('when an act is needed', () => {
  const warm = () => {
    const writer = storyTo('dark')
    writer.pass(10).sign(technician, 'reading-taken', reading(FISH, 38))
    writer.sign(technician, 'reading-taken', reading(DAIRY, 46))
    return writer
  }
  it('is in the last third of the rule\'s time: for four hours, from 160 minutes on', () => {
    const writer = warm()
    // The dairy rises through 41 °F between its reading at 37 °F and this one; the whole interval counts (the careful clock).
    const before = writer.state.cases[DAIRY]!.readings.at(-2)!.at
    const at = (minutes: number) => actNeeded(writer.state, DAIRY, before + minutes * 60_000)?.cause ?? null
    expect([at(159.9), at(160), at(240)]).toEqual([null, 'deadline-near', 'deadline-near'])
    expect(at(240.1)).toBe('discard')
  })
  it('is said on the phone before the log has it, and as entered afterwards', () => {
    const writer = warm()
    const before = writer.state.cases[DAIRY]!.readings.at(-2)!.at
    const now = before + 170 * 60_000
    expect(actNeeded(writer.state, DAIRY, now)).toMatchObject({ cause: 'deadline-near', entered: false, deadline: before + 240 * 60_000 })
    writer.now = now
    writer.sign(technician, 'note-added', { words: 'still here' })
    expect(actNeeded(writer.state, DAIRY, now)).toMatchObject({ cause: 'deadline-near', entered: true })
    expect(writer.entries.filter(stored => stored.entry.kind === 'act-opened' && stored.entry.body.caseId === DAIRY)).toHaveLength(1)
    expect(foldLog(writer.id, writer.entries).cases[DAIRY]!.openings).toHaveLength(1)
  })
  it('is not asked for again under the same verdict once it was decided', () => {
    const writer = warm()
    writer.now = writer.state.cases[DAIRY]!.readings.at(-2)!.at + 170 * 60_000
    writer.sign(supervisor, 'decided-otherwise', { caseId: DAIRY, reason: 'hard cheese', clause: '3-501.19' })
    writer.pass(5).sign(technician, 'note-added', { words: 'x' })
    expect([actNeeded(writer.state, DAIRY, writer.now), dairy(writer).openAct]).toEqual([null, null])
  })
  it('is with less than 15 minutes of hold in the dark, once, until something is done', () => {
    const writer = storyTo('dark')
    writer.pass(5).sign(technician, 'reading-taken', reading(DAIRY, 37.1))
    expect(actNeeded(writer.state, DAIRY, writer.now)).toBeNull()
    // 3.6 °F in ten minutes leaves little to 41 °F.
    writer.pass(10).sign(technician, 'reading-taken', reading(DAIRY, 40.7))
    expect(actNeeded(writer.state, DAIRY, writer.now)).toMatchObject({ cause: 'hold-short', entered: true })
    writer.pass(1).sign(technician, 'act-signed', act('ice', { product: '', quantity: null }))
    writer.pass(1).sign(technician, 'reading-taken', reading(DAIRY, 40.8))
    expect([actNeeded(writer.state, DAIRY, writer.now), dairy(writer).openings.length]).toEqual([null, 1])
  })
  it('lapses by an entry of the server once readings show a hold of 20 minutes, and is asked for again when it grows short', () => {
    const writer = open('hold-short')
    expect(holdsAgain(writer.state, DAIRY, writer.now)).toBeNull()
    writer.pass(3).sign(technician, 'reading-taken', reading(DAIRY, 35))
    expect(writer.entries.filter(stored => stored.entry.kind === 'act-lapsed')).toHaveLength(1)
    expect(dairy(writer)).toMatchObject({ openAct: null, openings: [{ cause: 'hold-short', closed: { how: 'hold' } }] })
    for (const value of [37, 38.6, 40.2, 40.8]) writer.pass(5).sign(technician, 'reading-taken', reading(DAIRY, value))
    expect(openingOf(dairy(writer))?.cause).toBe('hold-short')
  })
  it('is not of a case that is empty', () => {
    const writer = warm()
    writer.sign(technician, 'act-signed', act('moved'))
    expect(actNeeded(writer.state, DAIRY, writer.now + 300 * 60_000)).toBeNull()
  })
})

describe('words', () => {
  it('the gate names each case with why and what ends it', () => {
    const writer = open('deadline-near')
    expect(openActFaults(writer.state)).toEqual(['Dairy wall: an act is open, its deadline is near: sign what is done, or read it at or under its limit'])
    writer.pass(1).sign(technician, 'act-signed', act('cool-by', { coolBy: isoTime(Date.UTC(2026, 2, 3, 9, 10)) }))
    const [line] = openActFaults(writer.state)
    expect(line).toBe('Dairy wall: an act is open, its deadline is near: to be cooled by 03:10, a reading at or under 41.0 °F proves it')
    expect(submitGate(writer.state)).toContain(line)
  })

  it('the next thing to do follows from the act, the promise and the verdict', () => {
    const due = { judged: { verdict: 'above', act: 'Cool it before the deadline.' } as const, cause: 'deadline-near' as const, dueAt: null }
    const writer = open('deadline-near')
    const say = (standing: Parameters<typeof nextToDo>[2], now = writer.now) => nextToDo(writer.state, DAIRY, standing, now)
    expect(say(due)).toEqual({ kind: 'act', words: 'Cool it before the deadline. Sign what is done.' })
    const by = Date.UTC(2026, 2, 3, 9, 10)
    writer.pass(1).sign(technician, 'act-signed', act('cool-by', { coolBy: isoTime(by) }))
    expect(say(due)).toEqual({ kind: 'read', words: 'Read it by 03:10: at or under 41.0 °F proves that it is cooled.' })
    expect(say(due, by + 1).words).toBe('It was to be cooled by 03:10, which is past: read it now, or sign what else is done.')
    writer.pass(1).sign(technician, 'act-signed', act('ice'))
    expect(say(due).words).toBe('Read it: at or under 41.0 °F proves what was done (ice or dry ice laid).')
    expect(say({ ...due, cause: 'discard' }).words).toContain('Discard it')
    expect(say({ judged: { verdict: 'act', act: 'Use or sell it now.' }, cause: 'act', dueAt: null }).words).toBe('Use or sell it now. Then sign what was done.')
    expect(say({ judged: { verdict: 'unknown', act: 'Take a product temperature now.' }, cause: null, dueAt: null })).toEqual({ kind: 'read', words: 'Take a product temperature now.' })
    expect(say({ judged: { verdict: 'within', act: null }, cause: null, dueAt: by }).words).toBe('Read it again by 03:10.')
    expect(say({ judged: { verdict: 'within', act: null }, cause: null, dueAt: by }, by).words).toBe('Read it now.')
    expect(say({ judged: null, cause: null, dueAt: null })).toEqual({ kind: 'nothing', words: 'Nothing for now.' })
    writer.pass(1).sign(technician, 'act-signed', act('moved'))
    expect(say(due).kind).toBe('nothing')
    const short = storyTo('dark')
    expect(nextToDo(short.state, DAIRY, { judged: null, cause: 'hold-short', dueAt: null }, short.now).words).toContain('Lay ice, draw night covers')
  })

  it('discards list what the shop is told, in the order of the log', () => {
    const writer = open('discard')
    writer.pass(1).sign(technician, 'act-signed', act('discarded', { product: 'yoghurt', left: true }))
    writer.pass(1).sign(technician, 'act-signed', act('discarded', { caseId: FISH, product: 'oysters', quantity: 2, unit: 'kg' }))
    expect(discards(writer.state).map(({ name, product, quantity, unit, takenBy, by, at }) => ({ name, product, quantity, unit, takenBy, by, at }))).toEqual([
      { name: 'Dairy wall', product: 'yoghurt', quantity: 3, unit: 'crates', takenBy: 'Piet Harrow', by: 'Ada Quill', at: writer.now - 60_000 },
      { name: 'Fish service', product: 'oysters', quantity: 2, unit: 'kg', takenBy: 'Piet Harrow', by: 'Ada Quill', at: writer.now },
    ])
  })
})
