// The insights as CSV (cells by RFC 4180); the tables are this project's own.
import { describe, expect, it } from 'vitest'
import { insightsCsv } from '../../../server/utils/insights/csv'
import type { Insights } from '../../../shared/schemas/insights'
import { INSIGHT_TABLES } from '../../../shared/schemas/insights'

const site = { id: 's', name: 'Mill Lane' }
const insights: Insights = {
  outages: 1,
  work: [{ kindId: 'k', name: 'Update, software', outages: 1, planned: 1, took: 31, likely: 20, within: 30, over: 1, worst: { id: 'a', code: 'Q001-0001', minutes: 1 }, steps: [{ step: 'load', name: 'Load', back: false, planned: { shortest: 5, likely: 10, longest: 15 }, took: [{ id: 'a', code: 'Q001-0001', minutes: 16 }], median: 16, over: 1, under: 0 }] }],
  holds: [{ caseId: 'x', name: 'Fish', site, outages: 1, shortest: null, longest: null, never: 1, reckoned: null }],
  points: [{ tag: 'C-1', name: 'Compressor', site, controller: { id: 'c', name: 'Rack' }, outages: 2, excused: 1, notProven: 0, reasons: ['=no key', 'night'] }],
  late: [{ site, outages: 1, rounds: 4, late: 1, share: 25, worst: { id: 'a', code: 'Q001-0001', minutes: 9.5 } }],
  discards: [{ caseId: 'x', name: 'Fish', product: 'Cod', quantity: 3, unit: 'kg', cause: 'it must be discarded', at: Date.UTC(2026, 2, 3), seq: 7, outage: { id: 'a', code: 'Q001-0001' }, site }],
}
const lines = (table: (typeof INSIGHT_TABLES)[number]) => insightsCsv(insights, table).replace('\uFEFF', '').split('\r\n')

describe('a table of the insights', () => {
  it.each(INSIGHT_TABLES)('%s has a head and as many cells in each row', (table) => {
    const [head, row, end] = lines(table)
    expect(end).toBe('')
    // The one quoted cell holds the one comma that parts no cells.
    expect(row!.replace(/"[^"]*"/g, '').split(',')).toHaveLength(head!.split(',').length)
  })

  it('quotes commas, leaves empty what is not known, and lets no spreadsheet take words for a formula', () => {
    expect(lines('work')[1]).toBe('"Update, software",1,1,31,20,30,1,1,Q001-0001')
    expect(lines('holds')[1]).toBe('Mill Lane,Fish,1,,,,,,1')
    expect(lines('points')[1]).toBe('Mill Lane,Rack,C-1,Compressor,2,1,0,\'=no key; night')
    expect(lines('discards')[1]).toBe('2026-03-03T00:00:00.000Z,Mill Lane,Q001-0001,7,Fish,Cod,3,kg,it must be discarded')
  })
})
