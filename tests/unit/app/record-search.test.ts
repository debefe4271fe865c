// The search as it stands in an address, and what a row says; promises of this project's own, no published source.
import { describe, expect, it } from 'vitest'
import { countFound, darkWords, holdWords, becameWords, searchFault, searchOf, searchWords, sortOf } from '../../../app/utils/record-search'

const SITE = '0190a000-0000-7000-8000-000000000001'
const ADA = '0190a000-0000-7000-8000-000000000002'
const choices = { sites: [{ id: SITE, code: 'Q027', name: 'Quarry Street' }], controllers: [], people: [{ id: ADA, name: 'Ada Quill', role: 'technician' as const }], workKinds: ['Software update'] }

describe('an address', () => {
  it('gives what it asks for, and leaves out what nobody can answer', () => {
    expect(searchOf({ words: ' dairy  wall ', site: SITE, phase: 'dark,sealed', from: '2026-03-02', sort: 'oldest' })).toEqual({ words: 'dairy  wall', site: SITE, phase: 'dark,sealed', from: '2026-03-02', sort: 'oldest' })
    expect(searchOf({ words: '', site: 'Quarry Street', phase: 'lunch', outcome: 'discard,luck', from: '2026-02-31', sort: 'best', person: [ADA, ADA], callback: 'x' })).toEqual({})
  })

  it('says nothing of the usual order', () => {
    expect(searchOf({ sort: 'newest' })).toEqual({})
    expect([sortOf({}), sortOf({ sort: 'longest-dark' })]).toEqual(['newest', 'longest-dark'])
  })

  it('is faulty where its days lie the wrong way round', () => {
    expect(searchFault({ from: '2026-03-02', to: '2026-03-01' })).toBe('The last day lies before the first')
    expect(searchFault({ from: '2026-03-02', to: '2026-03-02' })).toBeNull()
  })

  it('is told in words, field by field', () => {
    expect(searchWords({ words: 'dairy', site: SITE, person: ADA, phase: 'dark,sealed', outcome: 'discard,late-rounds', tag: 'C-1', from: '2026-03-02', to: '2026-03-31', sort: 'oldest' }, choices)).toEqual([
      { field: 'words', words: 'words “dairy”' }, { field: 'site', words: 'Quarry Street' }, { field: 'person', words: 'signed by Ada Quill' }, { field: 'phase', words: 'Dark or Sealed' },
      { field: 'outcome', words: 'With discard and With late rounds' }, { field: 'tag', words: 'point C-1' }, { field: 'from', words: 'from Mon 2 Mar 2026' }, { field: 'to', words: 'to Tue 31 Mar 2026' },
    ])
    expect(searchWords({ site: ADA }, null)).toEqual([{ field: 'site', words: 'one that is not listed' }])
  })
})

describe('in words', () => {
  it.each([
    [{ found: 0, more: false }, 'No record'], [{ found: 1, more: false }, '1 record'], [{ found: 412, more: false }, '412 records'], [{ found: 1000, more: false }, '1,000 records'], [{ found: 1000, more: true }, 'More than 1,000 records'],
  ])('%j is %s', (count, words) => {
    expect(countFound(count)).toBe(words)
  })

  const site = { id: SITE, code: 'Q027', name: 'Quarry Street', timeZone: 'America/Chicago' }
  it('time without control: what is over, and since when it is away', () => {
    expect(darkWords({ darkSince: null, darkSeconds: 0, site })).toBe('none')
    expect(darkWords({ darkSince: null, darkSeconds: 1452, site })).toBe('24 min 12 s')
    expect(darkWords({ darkSince: '2026-03-03T08:24:00.000Z', darkSeconds: 0, site })).toBe('away since 02:24')
    expect(darkWords({ darkSince: '2026-03-03T08:24:00.000Z', darkSeconds: 60, site })).toBe('1 min, away since 02:24')
  })

  it('a hold in whole minutes, since it is an estimate', () => {
    expect([holdWords({ holdSeconds: 2620 }), holdWords({ holdSeconds: 59 }), holdWords({ holdSeconds: null })]).toEqual(['43 min', '0 s', '–'])
  })

  it('what became of it', () => {
    expect(becameWords({ outcomes: ['unplanned', 'discard', 'late-rounds'], lateReadings: 3 })).toBe('Not planned, discard, 3 late readings')
    expect(becameWords({ outcomes: ['late-rounds'], lateReadings: 1 })).toBe('1 late reading')
    expect(becameWords({ outcomes: [], lateReadings: 0 })).toBe('')
  })
})
