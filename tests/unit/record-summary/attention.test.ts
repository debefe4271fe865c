// What is pointed out of a record and what stands in the way of its seal; the rules are this project's own.
import { describe, expect, it } from 'vitest'
import { recordFacts } from '../../../server/utils/hold/record-facts'
import type { Attention } from '../../../shared/record/attention'
import { attentionOf, openCount } from '../../../shared/record/attention'
import { clockWords } from '../../../shared/charts/words'
import { isoTime } from '../../../shared/record/entry'
import { sealGate } from '../../../shared/record/gates'
import { summaryOf } from '../../../shared/record/summary'
import type { RecordWriter } from '../../support/record'
import { supervisor, technician } from '../../support/record'
import { buildRecord, caseId } from '../../support/scenario'

function pointedOut({ state, entries, now }: RecordWriter): Attention[] {
  return attentionOf(state, summaryOf(state, entries, recordFacts(state, now), now))
}
const itemsOf = (writer: RecordWriter, what: string) => pointedOut(writer).find(group => group.what === what)?.items ?? []

describe('a question about an entry', () => {
  it('stands in the way of the seal until it is answered, and names the entry that it is about', () => {
    const writer = buildRecord({ until: 'submitted' })
    const about = writer.entries.find(stored => stored.entry.kind === 'reading-taken')!
    const question = writer.pass(1).sign(supervisor, 'question-asked', { about: about.entry.id, words: 'Which shelf?' })
    const seq = writer.entries.at(-1)!.seq
    expect(itemsOf(writer, 'Questions without an answer')).toEqual([{ words: 'Ines Calloway: Which shelf?', seq, open: true }])
    expect(openCount(pointedOut(writer))).toBe(sealGate(writer.state, []).length)
    writer.pass(1).sign(technician, 'question-answered', { question: question.id, words: 'The top one.' })
    expect(itemsOf(writer, 'Questions without an answer')).toEqual([])
    expect(openCount(pointedOut(writer))).toBe(0)
    const { questions } = summaryOf(writer.state, writer.entries, recordFacts(writer.state, writer.now), writer.now)
    expect(questions[0]).toMatchObject({ about: { seq: about.seq, did: expect.stringContaining('round') as string }, answer: { words: 'The top one.' } })
  })
})

describe('a record that was given back', () => {
  it('says so, with the reason, when it is reviewed again', () => {
    const writer = buildRecord({ until: 'submitted' })
    writer.pass(1).sign(supervisor, 'returned', { reason: 'Say who was told' })
    expect(itemsOf(writer, 'Returned before')).toEqual([{ words: 'Ines Calloway: Say who was told', seq: writer.entries.at(-1)!.seq, open: false }])
  })
})

describe('a late round', () => {
  it('leads to the reading that was latest, and cases that nobody read to none', () => {
    const writer = buildRecord({ until: 'dark', roundsAt: [] })
    writer.pass(40).sign(technician, 'reading-taken', { round: 1, caseId: caseId('Fish service'), value: 38, unit: 'F', method: 'product', instrumentId: null })
    const { seq } = writer.entries.findLast(stored => stored.entry.kind === 'reading-taken')!
    const [late, never] = itemsOf(writer, 'Late rounds')
    expect(late).toMatchObject({ words: expect.stringMatching(/^Round 1: 1 reading late, by \d+ min at most$/) as string, seq })
    expect(never).toMatchObject({ words: expect.stringMatching(/cases not read when due$/) as string, seq: null })
  })
})

describe('an alert', () => {
  it('says whom it reached, and whether anybody acknowledged it', () => {
    const writer = buildRecord({ until: 'dark' })
    const at = isoTime(writer.now)
    const raised = { alert: 'round-late' as const, about: [caseId('Fish service')], level: 1 as const, words: 'Quarry Street: Fish service is late', until: null, to: ['Ines Calloway'], judgedAt: at }
    writer.serverEntry('alert-raised', { key: 'round-late one', ...raised })
    writer.serverEntry('alert-raised', { key: 'round-late two', ...raised, to: [] })
    writer.serverEntry('alert-acknowledged', { key: 'round-late one', person: supervisor.id, name: supervisor.name, acknowledgedAt: at })
    const clock = clockWords(at, 'America/Chicago')
    expect(itemsOf(writer, 'Alerts').map(({ words }) => words)).toEqual([
      `Round late at ${clock}, sent to Ines Calloway; acknowledged by Ines Calloway at ${clock}`,
      `Round late at ${clock}, sent to nobody: no one is named for it; acknowledged by nobody`,
    ])
  })
})

describe('a case warmer than foretold', () => {
  it('leads to the reading that found it over its limit too soon', () => {
    const writer = buildRecord({ until: 'dark', roundsAt: [5, 10] })
    writer.pass(2).sign(technician, 'reading-taken', { round: 4, caseId: caseId('Meat cooler'), value: 45, unit: 'F', method: 'product', instrumentId: null })
    const { seq } = writer.entries.findLast(stored => stored.entry.kind === 'reading-taken')!
    expect(itemsOf(writer, 'Warmer than foretold')).toMatchObject([{ seq, words: expect.stringContaining('Meat cooler') as string }])
  })
})
