// Addresses and words of insights and exports are this project's own; no published source.
import { describe, expect, it } from 'vitest'
import { byteWords, exportWords } from '~/utils/export-words'
import { lastDays, recordsLink, tableAddress } from '~/utils/insight-links'
import type { ExportItem } from '~~/shared/schemas/exports'

describe('the records behind a number', () => {
  it('are the choice, narrowed; what is not chosen stands nowhere', () => {
    expect(recordsLink({ site: 'mill', from: '2026-03-01', to: undefined }, { outcome: 'late-rounds' })).toEqual({ path: '/records', query: { site: 'mill', from: '2026-03-01', phase: 'submitted,sealed', outcome: 'late-rounds' } })
    expect(recordsLink({ site: 'mill' }, { site: 'quarry', tag: 'C-1' })).toEqual({ path: '/records', query: { site: 'quarry', phase: 'submitted,sealed', tag: 'C-1' } })
  })

  it('a table has the address of its choice', () => {
    expect(tableAddress({}, 'work')).toBe('/api/insights/work.csv')
    expect(tableAddress({ site: 'mill', to: '2026-03-31' }, 'holds')).toBe('/api/insights/holds.csv?site=mill&to=2026-03-31')
  })

  it('the last thirty days are today and twenty-nine before', () => {
    expect(lastDays(Date.UTC(2026, 2, 31, 12), 30)).toEqual({ from: '2026-03-02' })
    expect(lastDays(Date.UTC(2026, 2, 31, 12), 1)).toEqual({ from: '2026-03-31' })
  })
})

describe('an export in words', () => {
  const item: ExportItem = { id: 'x', kind: 'pdf', state: 'waiting', fileName: 'x.zip', total: 12, done: 0, bytes: null, fault: null, askedAt: '', doneAt: null, expiresAt: null }
  const words = (change: Partial<ExportItem>) => exportWords({ ...item, ...change }, iso => `the day ${iso}`)

  it('says how far it is, how long its file is kept, or why there is none', () => {
    expect(words({})).toBe('Waits for its turn.')
    expect(words({ state: 'working', done: 3 })).toBe('3 of 12 records done.')
    expect(words({ state: 'working', done: 12 })).toContain('being closed')
    expect(words({ state: 'done', done: 12, bytes: 4_210_000, expiresAt: 'T' })).toBe('4.2 MB, kept until the day T.')
    expect(words({ state: 'failed', fault: 'A record is gone' })).toBe('It failed: A record is gone.')
    expect([words({ state: 'cancelled' }), words({ state: 'expired' })]).toEqual(['Cancelled.', expect.stringContaining('not kept')])
  })

  it('says bytes in the unit that people read', () => {
    expect([byteWords(1), byteWords(999), byteWords(12_345), byteWords(999_999), byteWords(1_000_000)]).toEqual(['1 byte', '999 bytes', '12 kB', '1000 kB', '1.0 MB'])
  })
})
