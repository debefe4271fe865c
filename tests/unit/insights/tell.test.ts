// Insights over several outages, each worked out by hand beside it; promises of this project's own, no published source.
import { describe, expect, it } from 'vitest'
import { correctionsOf, offersFor } from '../../../server/utils/insights/offer'
import { insightsOf, medianOf } from '../../../server/utils/insights/tell'
import type { CountedOutage, OutageFacts } from '../../../shared/schemas/insights'

const mill = { id: 'mill', name: 'Mill Lane' }
const quarry = { id: 'quarry', name: 'Quarry Street' }
const update = { kindId: 'update', name: 'Software update', planned: true, likely: 20, within: 30, took: 24 }
const load = { step: 'load', name: 'Load', back: false, minutes: 12, planned: { shortest: 5, likely: 10, longest: 15 } }

function counted(id: string, site: typeof mill, change: Partial<OutageFacts> = {}): CountedOutage {
  return {
    id, code: id.toUpperCase(), site, controller: { id: `controller of ${site.id}`, name: 'Rack controller' }, sealed: true,
    facts: { work: update, steps: [], holds: [], touched: ['C-1', 'C-2'], excused: [], notProven: [], rounds: { taken: 0, late: 0, worst: 0 }, discards: [], ...change },
  }
}

describe('kinds of work', () => {
  it('take the median, and count those over their time of 19 times in 20', () => {
    const { work } = insightsOf([
      counted('a', mill, { work: { ...update, took: 31 } }), // 1 over
      counted('b', mill, { work: { ...update, took: 44.5 } }), // 14.5 over
      counted('c', quarry, { work: { ...update, took: 30 } }), // just in time
      counted('d', quarry, { work: { ...update, planned: false, likely: null, within: null, took: 90 } }), // nothing to compare with
    ])
    // Took 30, 31, 44.5, 90: the middle lies between 31 and 44.5.
    expect(work).toEqual([{ kindId: 'update', name: 'Software update', outages: 4, planned: 3, took: 37.8, likely: 20, within: 30, over: 2, worst: { id: 'b', code: 'B', minutes: 14.5 }, steps: [] }])
  })

  it('are told apart by their name, as they are searched for, and those furthest over come first', () => {
    const { work } = insightsOf([
      counted('a', mill, { work: { ...update, kindId: null } }),
      counted('b', mill),
      counted('c', mill, { work: { ...update, kindId: null, name: 'Fuse', took: 40 } }),
      counted('d', mill, { work: { ...update, kindId: null, name: 'Relay', took: 20 } }),
    ])
    expect(work.map(({ kindId, name, outages, over, worst }) => [kindId, name, outages, over, worst?.minutes ?? null])).toEqual([[null, 'Fuse', 1, 1, 10], ['update', 'Software update', 2, 0, null], [null, 'Relay', 1, 0, null]])
  })

  it('count steps against the times of their own plans', () => {
    const [kind] = insightsOf([
      counted('a', mill, { steps: [{ ...load, minutes: 16, planned: { shortest: 6, likely: 11, longest: 16 } }] }), // within its own 16
      counted('b', mill, { steps: [{ ...load, minutes: 15.5 }] }), // over its own 15
      counted('c', mill, { steps: [{ ...load, minutes: 4 }, { ...load, step: 'old', name: 'Old one back', back: true, minutes: 8 }] }), // under its own 5
    ]).work
    expect(kind!.steps).toEqual([
      { step: 'load', name: 'Load', back: false, planned: { shortest: 6, likely: 11, longest: 16 }, median: 15.5, over: 1, under: 1, took: [{ id: 'a', code: 'A', minutes: 16 }, { id: 'b', code: 'B', minutes: 15.5 }, { id: 'c', code: 'C', minutes: 4 }] },
      { step: 'old', name: 'Old one back', back: true, planned: load.planned, median: 8, over: 0, under: 0, took: [{ id: 'c', code: 'C', minutes: 8 }] },
    ])
  })

  it('a median is the middle value, or the mean of the two in the middle', () => {
    expect([medianOf([7]), medianOf([9, 1, 4]), medianOf([9, 1, 4, 2])]).toEqual([7, 4, 3])
  })
})

describe('holds', () => {
  it('give each case its shortest and longest with the outage of each, the shortest of all first', () => {
    const hold = (caseId: string, minutes: number | null, reckoned: number | null = 50) => ({ caseId, name: `Case ${caseId}`, minutes, reckoned, readings: 4 })
    const { holds } = insightsOf([
      counted('a', mill, { holds: [hold('x', 60), hold('y', 31, 44)] }),
      counted('b', mill, { holds: [hold('x', 45.5, 52), hold('z', null, null)] }),
      counted('c', mill, { holds: [hold('x', null)] }),
    ])
    expect(holds).toEqual([
      { caseId: 'y', name: 'Case y', site: mill, outages: 1, shortest: { id: 'a', code: 'A', minutes: 31 }, longest: { id: 'a', code: 'A', minutes: 31 }, never: 0, reckoned: 44 },
      { caseId: 'x', name: 'Case x', site: mill, outages: 3, shortest: { id: 'b', code: 'B', minutes: 45.5 }, longest: { id: 'a', code: 'A', minutes: 60 }, never: 1, reckoned: 52 },
      { caseId: 'z', name: 'Case z', site: mill, outages: 1, shortest: null, longest: null, never: 1, reckoned: null },
    ])
  })
})

describe('points', () => {
  it('count excuses and missing proofs of one controller\'s point among the outages that touched it', () => {
    const fact = (reason: string) => ({ tag: 'C-1', name: 'Compressor 1', reason })
    const { points } = insightsOf([
      counted('a', mill, { excused: [fact('no key')] }),
      counted('b', mill, { notProven: [fact('not called for')], excused: [fact('no key')] }),
      counted('c', mill, { touched: ['C-2'] }),
      counted('d', mill),
      counted('e', quarry, { notProven: [fact('night')] }), // the same tag on another controller is another point
    ])
    expect(points.map(({ tag, site, outages, excused, notProven, reasons }) => [tag, site.name, outages, excused, notProven, reasons])).toEqual([
      ['C-1', 'Mill Lane', 3, 2, 1, ['no key', 'not called for']],
      ['C-1', 'Quarry Street', 1, 0, 1, ['night']],
    ])
  })
})

describe('late rounds', () => {
  it('give each site its share of all rounds without control and the latest one', () => {
    const { late } = insightsOf([
      counted('a', mill, { rounds: { taken: 8, late: 1, worst: 3 } }),
      counted('b', mill, { rounds: { taken: 4, late: 2, worst: 9.5 } }),
      counted('c', quarry, { rounds: { taken: 0, late: 0, worst: 0 } }),
    ])
    // 3 of 12 is a quarter.
    expect(late).toEqual([
      { site: mill, outages: 2, rounds: 12, late: 3, share: 25, worst: { id: 'b', code: 'B', minutes: 9.5 } },
      { site: quarry, outages: 1, rounds: 0, late: 0, share: null, worst: null },
    ])
  })
})

describe('discards', () => {
  it('stand one by one, the newest first', () => {
    const discard = (at: number, seq: number) => ({ caseId: 'x', name: 'Fish', product: 'Cod', quantity: 3, unit: 'kg', cause: 'it must be discarded', at, seq })
    const { discards } = insightsOf([counted('a', mill, { discards: [discard(1000, 7), discard(1000, 9)] }), counted('b', quarry, { discards: [discard(2000, 5)] })])
    expect(discards.map(({ outage, site, seq }) => [outage.code, site.name, seq])).toEqual([['B', 'Quarry Street', 5], ['A', 'Mill Lane', 9], ['A', 'Mill Lane', 7]])
  })
})

describe('an offer to correct the times of a kind of work', () => {
  const step = { id: 'load', name: 'Load', shortest: 5, likely: 10, longest: 20, dark: true, after: [] }
  const took = (step: string, minutes: number, id: string) => ({ step, minutes, outage: { id, code: id.toUpperCase() } })

  it('takes one outage after another: 14 min makes 12 of 10, then 6 min makes 10 of 12', () => {
    // likely + (took − likely) / (outages before + 2): 10 + 4/2 = 12; 12 − 6/3 = 10.
    expect(correctionsOf(step, 0, [took('load', 14, 'a'), took('other', 99, 'a'), took('load', 6, 'b')]).map(({ before, after }) => [before.likely, after.likely])).toEqual([[10, 12], [12, 10]])
    // Two outages count already: 10 + 4/4 = 11.
    expect(correctionsOf(step, 2, [took('load', 14, 'a')])[0]!.after).toEqual({ shortest: 5, likely: 11, longest: 20 })
  })

  it('names what it was, what it becomes and where that comes from; a step that no outage timed is not offered', () => {
    const offers = offersFor({ steps: [step, { ...step, id: 'start', name: 'Start' }], rollBack: [{ ...step, id: 'old', name: 'Old one back' }] }, new Map(), [took('old', 25, 'a'), took('load', 26, 'a'), took('load', 3, 'b')])
    // load: likely 10 + 16/2 = 18, then 18 − 15/3 = 13; the ends reach out to 3 and 26. old: 10 + 15/2 = 17.5.
    expect(offers).toEqual([
      { step: 'load', name: 'Load', was: { shortest: 5, likely: 10, longest: 20 }, proposed: { shortest: 3, likely: 13, longest: 26 }, outages: [{ id: 'a', code: 'A' }, { id: 'b', code: 'B' }] },
      { step: 'old', name: 'Old one back', was: { shortest: 5, likely: 10, longest: 20 }, proposed: { shortest: 5, likely: 17.5, longest: 25 }, outages: [{ id: 'a', code: 'A' }] },
    ])
  })
})
