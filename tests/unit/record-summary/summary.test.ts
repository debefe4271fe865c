// The figures are counted by hand from the scenario that is signed; no published source.
import { beforeAll, describe, expect, it } from 'vitest'
import { attentionOf, numbered, openCount } from '../../../shared/record/attention'
import { recordFacts } from '../../../server/utils/hold/record-facts'
import { sealHolds } from '../../../shared/record/record-document'
import { recordDisc, temperatureCharts } from '../../../shared/record/record-charts'
import { summaryOf } from '../../../shared/record/summary'
import type { RecordSummary } from '../../../shared/record/summary'
import { hashWords, signatureDigits, spanWords, summaryRows, zoneWords } from '../../../shared/record/summary-words'
import { busyRecord } from '../../support/busy'
import type { RecordWriter } from '../../support/record'
import { buildRecord } from '../../support/scenario'

function summed(writer: RecordWriter, now = writer.now): RecordSummary {
  return summaryOf(writer.state, writer.entries, recordFacts(writer.state, now), now)
}
const said = (summary: RecordSummary) => Object.fromEntries(summaryRows(summary).map(row => [row.label, row.parts.map(part => part.text).join('')]))

describe('an outage without trouble', () => {
  let writer: RecordWriter
  let summary: RecordSummary
  beforeAll(() => {
    writer = buildRecord()
    summary = summed(writer)
  })

  it('says the figures of the front page', () => {
    expect(said(summary)).toEqual({
      'Without control': '23 min 10 s of 25 min planned',
      'Points in hand': '18 set, 18 back in auto, 18 proven',
      'Rounds': '9 taken, none late',
      'Forecasts': expect.stringMatching(/^0\.\d °F off in the median of \d+ readings, no case came early$/) as string,
      'Highest product': '40.2 °F, Dairy wall 4–7',
      'Above a limit': '0 of 10 cases',
      'Product discarded': 'none',
      'Limits': 'FDA Food Code 2022, 3-501.16(A)(2)',
    })
    expect(spanWords(summary.heading)).toBe('Tue 3 Mar 2026, 01:59 to 03:35')
    expect(zoneWords(summary.heading)).toBe('America/Chicago (UTC−6)')
  })

  it('names both signatures with their meaning, and nothing to look at but readings that were missing', () => {
    expect(summary.signatures.map(({ what, by, role, stands }) => ({ what, by, role, stands }))).toEqual([
      { what: 'submitted', by: 'Ada Quill', role: 'technician', stands: true },
      { what: 'sealed', by: 'Ines Calloway', role: 'supervisor', stands: true },
    ])
    expect(summary.signatures[0]!.meaning).toContain('I did or saw')
    expect(attentionOf(writer.state, summary).map(item => item.what)).toEqual(['No reading in time'])
    expect(sealHolds(writer.state, writer.entries)).toBe(true)
  })

  it('has a line for each point, in hand before it is back and proven after', () => {
    expect(summary.pointLines).toHaveLength(18)
    for (const line of summary.pointLines) {
      expect(line.inHand!.at).toBeLessThan(line.back!.at)
      expect(line.proven!.at).toBeGreaterThanOrEqual(line.back!.at)
    }
    expect(summary.pointLines.find(line => line.tag === 'DH-A1')).toMatchObject({ seen: 'off, 0 A', backSeen: 'not-called' })
  })

  it('draws the disc to the end of the time without control, and each limit once', () => {
    const disc = recordDisc(writer.state, writer.now)!
    expect(disc.elapsedMinutes).toBeCloseTo(23 + 10 / 60, 6)
    expect(disc.plannedMinutes).toBe(25)
    expect(disc.cases).toHaveLength(10)
    expect(disc.cases.find(item => item.shortest)!.name).toBe('Dairy wall 4–7')
    const charts = temperatureCharts(writer.state, writer.now)
    expect(charts.map(chart => chart.limit)).toEqual([41])
    expect(charts[0]!.cases).toHaveLength(10)
  })
})

describe('an outage with everything in it', () => {
  let writer: RecordWriter
  let summary: RecordSummary
  beforeAll(() => {
    writer = busyRecord('submitted')
    summary = summed(writer)
  })

  it('counts what is left, excused, discarded and above a limit; a struck reading counts no more', () => {
    expect(said(summary)).toMatchObject({
      'Points in hand': '17 set, 16 back in auto, 16 proven, 1 excused',
      'Highest product': '42.3 °F, Dairy wall 4–7',
      'Above a limit': '1 of 10 cases',
      'Product discarded': '3.5 kg oysters',
    })
    expect(summary.above.cases).toEqual(['Dairy wall 4–7'])
  })

  it('points out every kind of trouble', () => {
    const attention = attentionOf(writer.state, summary)
    expect(attention.map(item => item.what)).toEqual(['Questioned entries', 'Turned back', 'Still in hand', 'Left by exception', 'Excused points', 'Verdicts', 'Acts', 'Decided otherwise', 'No reading in time', 'Warmer than foretold', 'Clock differences', 'Corrections', 'Refused entries'])
    const of = (what: string) => attention.find(item => item.what === what)!.items.map(numbered).join('\n')
    expect(of('Questioned entries')).toContain('there is no such step. Dealt with by Ada Quill: pressed the wrong line')
    expect(of('Clock differences')).toContain('7 min ahead, 1 entry')
    expect(of('Corrections')).toContain('42.3 °F, misread the display')
    expect(of('Corrections')).toContain('does not count, probe was in my hand')
    expect(of('Left by exception')).toContain('ASH-1: Bram Oster')
    expect(of('Still in hand')).toMatch(/^No\. \d+: ASH-1 anti-sweat heaters, doors, on$/)
    expect(openCount(attention)).toBe(0)
  })

  it('leads each thing to the entry that it comes from', () => {
    const kinds = new Map(writer.entries.map(stored => [stored.seq, stored.entry.kind]))
    const led = Object.fromEntries(attentionOf(writer.state, summary).map(({ what, items }) => [what, [...new Set(items.map(({ seq }) => seq === null ? null : kinds.get(seq)))]]))
    expect(led).toEqual({
      'Questioned entries': ['step-ticked'], 'Turned back': ['turned-back'], 'Still in hand': ['point-in-hand'], 'Left by exception': ['left-in-exception'], 'Excused points': ['point-excused'],
      'Verdicts': ['verdict-changed'], 'Acts': ['act-signed'], 'Decided otherwise': ['decided-otherwise'], 'No reading in time': ['verdict-changed'], 'Warmer than foretold': ['reading-taken'], 'Clock differences': ['note-added'], 'Corrections': ['correction'], 'Refused entries': ['entry-refused'],
    })
  })

  it('says what a correction corrects, in its first words', () => {
    expect(summary.corrections[0]!.of).toMatchObject({ did: 'Dairy wall 4–7, round 5' })
    expect(summary.corrections[0]!.of!.seen).toContain('43.2 °F')
  })
})

describe('an outage under way', () => {
  it('runs on until now while it is dark', () => {
    const writer = buildRecord({ until: 'dark' })
    const lost = writer.state.darks[0]!.from
    expect(summed(writer, lost + 30 * 60_000).dark).toEqual({ ms: 30 * 60_000, plannedMinutes: 25, running: true, times: 1 })
  })

  it('counts readings that never came', () => {
    const writer = buildRecord({ until: 'dark', roundsAt: [] })
    const summary = summed(writer, writer.state.darks[0]!.from + 40 * 60_000)
    // Open cases are due after ten minutes at the latest, closed walk-ins after an hour: common practice, no source.
    expect(summary.rounds.never).toBeGreaterThanOrEqual(8)
    expect(said(summary)['Rounds']).toContain('overdue')
  })

  it('says so where control was never lost', () => {
    const summary = summed(buildRecord({ until: 'approved' }))
    expect(said(summary)['Without control']).toBe('control was never lost')
    expect(summary.heading.to).toBeNull()
    expect(spanWords(summary.heading)).toMatch(/still open$/)
  })

  it('finds a seal that does not fit its entries', () => {
    const writer = buildRecord()
    const changed = writer.entries.map((stored, index) => index === 3 ? { ...stored, receivedAt: '2026-03-02T00:00:00.000Z' } : stored)
    expect(sealHolds(writer.state, changed)).toBe(false)
  })
})

describe('digits on paper', () => {
  it('are the first four and last two of the signature\'s bytes', () => {
    // 64 bytes 00 01 … 3f in base64url; hexadecimal by hand.
    const signature = Buffer.from(Array.from({ length: 64 }, (_, index) => index)).toString('base64url')
    expect(signatureDigits(signature)).toBe('0001…3f')
  })

  it('are four groups and the last four of a root', () => {
    expect(hashWords('0123456789abcdef'.repeat(4))).toBe('0123 4567 89ab cdef … cdef')
  })
})
