/** How a window is chosen is common practice of the trade; no published source. */
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { parseWindowInput, planWindow, type PlannedWindow } from '../../../server/utils/window'
import type { PlanWindowRequest } from '../../../shared/schemas/plan-window'

const MINUTE = 60_000

function plan(request: PlanWindowRequest): PlannedWindow {
  const parsed = parseWindowInput(request)
  if (!parsed.ok) throw new Error(parsed.reason)
  return planWindow(parsed.input)
}

/** A Monday at Quarry Street: two circuits, 20 minutes with 10 of drip at 06:00 and 18:00, 30 with 10 every 8 hours from 01:00. */
const quarryStreet: PlanWindowRequest = {
  timeZone: 'UTC',
  from: '2026-06-01T05:00:00Z',
  days: 1,
  leadMin: 20,
  darkMin: 40,
  circuits: [
    { id: 'dairy', defrosts: { times: ['06:00', '18:00'] }, durationMin: 20, dripMin: 10 },
    { id: 'freezer', defrosts: { everyHours: 8, offset: '01:00' }, durationMin: 30, dripMin: 10 },
  ],
}

describe('starts', () => {
  it('are the first of each clean stretch, then those with the fewest defrosts', () => {
    // Freezer 01:00, 09:00, 17:00 to :40; dairy 06:00, 18:00 to :30. Before 05:00 ends at 06:00, which touches.
    const { starts } = plan(quarryStreet)
    expect(starts.map(({ at, clean }) => `${at.slice(8, 16)} ${clean}`)).toEqual([
      '01T05:00 true', '01T07:00 true', '01T10:10 true', '01T19:00 true', '02T02:10 true',
    ])
    expect(starts[1]!.because).toBe('No circuit is in defrost or drip from Mon 06:30 to Mon 08:00 local time. No avoided hours lie in it.')
  })

  it('touch a defrost before and after without a conflict, and conflict a minute on', () => {
    const clean = (from: string) => plan({ ...quarryStreet, from }).starts.find(({ at }) => Date.parse(at) === Date.parse(from))?.clean
    expect([clean('2026-06-01T05:00:00Z'), clean('2026-06-01T05:01:00Z')]).toEqual([true, false])
    expect(plan({ ...quarryStreet, from: '2026-06-01T05:01:00Z' }).conflicts).toHaveLength(1)
    expect(plan({ ...quarryStreet, from: '2026-06-01T07:00:00Z' }).conflicts).toEqual([])
    expect(plan({ ...quarryStreet, from: '2026-06-01T06:59:00Z' }).conflicts).toHaveLength(1)
  })

  it('leave avoided hours for the last of the clean ones, and say why', () => {
    const avoid = [{ days: [1], start: '04:00', end: '08:30', why: 'morning delivery' }, { days: [2], start: '00:00', end: '23:59', why: 'stocktake' }]
    const { starts } = plan({ ...quarryStreet, avoid })
    expect(starts.map(({ at, clean }) => `${at.slice(8, 16)} ${clean}`)).toEqual([
      '01T10:10 true', '01T19:00 true', '01T05:00 true', '01T07:00 true', '02T02:10 true',
    ])
    expect(starts[2]!.because).toContain('avoided hours: morning delivery')
    expect(starts[4]!.because).toContain('stocktake')
  })

  it('are avoided when any moment until the end of dark is, and not when they only touch', () => {
    const first = (start: string, end: string) =>
      plan({ ...quarryStreet, circuits: [], avoid: [{ days: [1], start, end, why: 'x' }] }).starts.map(({ at }) => at.slice(11, 16))
    expect(first('06:00', '07:00')).toEqual(['05:00'])
    expect(first('05:59', '07:00')).toEqual(['07:00'])
    expect(first('04:00', '05:00')).toEqual(['05:00'])
    expect(first('04:00', '05:01')).toEqual(['05:05'])
  })

  it('know avoided hours that go over midnight by the day on which they begin', () => {
    const first = (day: number) => plan({
      ...quarryStreet, from: '2026-06-01T23:00:00Z', circuits: [], avoid: [{ days: [day], start: '22:00', end: '02:00', why: 'x' }],
    }).starts[0]!.at
    expect(first(1)).toBe('2026-06-02T02:00:00.000Z')
    expect(first(7)).toBe('2026-06-01T23:00:00.000Z')
    expect(plan({ ...quarryStreet, from: '2026-06-01T05:00:00Z', circuits: [], avoid: [{ days: [7], start: '08:00', end: '08:00', why: 'x' }] }).starts[0]!.at)
      .toBe('2026-06-01T08:00:00.000Z')
  })

  it('with no clean one are those with the fewest defrosts, the earliest first', () => {
    const { starts } = plan({
      ...quarryStreet,
      from: '2026-06-01T00:00:00Z',
      stepMin: 30,
      circuits: [
        { id: 'a', defrosts: { everyHours: 1, offset: '00:00' }, durationMin: 40, dripMin: 20 },
        { id: 'b', defrosts: { times: ['00:00'] }, durationMin: 60, dripMin: 0 },
      ],
    })
    // Until 01:00 the one of circuit b counts too; after it each window holds two of circuit a.
    expect(starts.map(({ at, clean }) => `${at.slice(11, 16)} ${clean}`)).toEqual(['01:30 false', '02:00 false', '02:30 false', '03:00 false', '03:30 false'])
    expect(starts[0]!.because).toBe('2 defrosts lie in it from Mon 01:00 to Mon 02:30 local time: circuit a at Mon 01:00, circuit a at Mon 02:00.')
  })

  it('come every step for as many days as asked, by default five minutes and a week', () => {
    const busy: PlanWindowRequest = {
      timeZone: 'UTC', from: '2026-06-01T00:00:00Z', leadMin: 0, darkMin: 10,
      circuits: [{ id: 'a', defrosts: { everyHours: 24, offset: '00:05' }, durationMin: 1430, dripMin: 0 }],
    }
    // From 00:05 to 23:55 each day: no gap between two is long enough, so every start has a conflict.
    expect(plan(busy).starts.every(({ clean }) => !clean)).toBe(true)
    const open = { ...busy, circuits: [{ ...busy.circuits[0]!, durationMin: 1380 }] }
    expect(plan(open).starts.map(({ at }) => at.slice(8, 16))).toEqual(['01T23:35', '02T23:35', '03T23:35', '04T23:35', '05T23:35'])
    expect(plan({ ...open, days: 2, stepMin: 20 }).starts.filter(({ clean }) => clean).map(({ at }) => at.slice(8, 16))).toEqual(['01T23:40', '02T23:40'])
  })

  it('without circuits are one, the first that is not avoided', () => {
    expect(plan({ ...quarryStreet, circuits: [] }).starts).toHaveLength(1)
    expect(plan({ ...quarryStreet, circuits: [], avoid: [{ days: [1, 2], start: '00:00', end: '00:00', why: 'closed' }] }).starts)
      .toEqual([{ at: '2026-06-01T05:00:00.000Z', clean: true, because: expect.stringContaining('closed') }])
  })
})

describe('conflicts', () => {
  it('say by when to run each defrost, or after when to start', () => {
    expect(plan({ ...quarryStreet, from: '2026-06-01T17:30:00Z' }).conflicts).toEqual([
      // Minutes: 17:30 − 30 − 40 = 16:20; 17:00 + 40 + 30 = 18:10.
      { circuit: 'freezer', at: '2026-06-01T17:00:00.000Z', runBy: '2026-06-01T16:20:00.000Z', orStartAfter: '2026-06-01T18:10:00.000Z' },
      { circuit: 'dairy', at: '2026-06-01T18:00:00.000Z', runBy: '2026-06-01T16:30:00.000Z', orStartAfter: '2026-06-01T19:00:00.000Z' },
    ])
  })

  it('include a defrost of the evening before that still drips', () => {
    const { conflicts } = plan({
      ...quarryStreet, from: '2026-06-01T00:00:00Z',
      circuits: [{ id: 'a', defrosts: { times: ['22:00'] }, durationMin: 60, dripMin: 45 }],
    })
    expect(conflicts.map(({ at }) => at)).toEqual(['2026-05-31T22:00:00.000Z'])
  })

  /** Changes of the clocks are those of the IANA time zone database. */
  it('put a defrost that the clock skips at the first moment after, once', () => {
    const spring = plan({
      timeZone: 'Europe/London', from: '2026-03-29T00:45:00Z', leadMin: 20, darkMin: 60,
      circuits: [
        { id: 'times', defrosts: { times: ['01:30'] }, durationMin: 20, dripMin: 5 },
        { id: 'hours', defrosts: { everyHours: 1, offset: '00:00' }, durationMin: 10, dripMin: 0 },
      ],
    })
    expect(spring.conflicts.map(({ circuit, at }) => `${circuit} ${at.slice(11, 16)}`)).toEqual([
      'hours 01:00', 'times 01:00', 'hours 02:00',
    ])
  })

  it('put a defrost whose time comes twice at the first of them', () => {
    const autumn = plan({
      timeZone: 'Europe/London', from: '2026-10-25T00:00:00Z', leadMin: 30, darkMin: 150,
      circuits: [{ id: 'a', defrosts: { times: ['01:30'] }, durationMin: 20, dripMin: 5 }, { id: 'b', defrosts: { everyHours: 1, offset: '00:00' }, durationMin: 20, dripMin: 5 }],
    })
    expect(autumn.conflicts.map(({ circuit, at }) => `${circuit} ${at.slice(11, 16)}`)).toEqual(['b 00:00', 'a 00:30', 'b 02:00'])
  })

  it('follow the offset of the local day, whatever the hours', () => {
    const { conflicts } = plan({
      timeZone: 'America/New_York', from: '2026-01-15T12:00:00Z', leadMin: 60, darkMin: 1320,
      circuits: [{ id: 'a', defrosts: { everyHours: 6, offset: '20:15' }, durationMin: 5, dripMin: 0 }],
    })
    // Local 08:15, 14:15, 20:15 and 02:15, five hours behind UTC.
    expect(conflicts.map(({ at }) => at.slice(8, 16))).toEqual(['15T13:15', '15T19:15', '16T01:15', '16T07:15'])
  })
})

describe('any window', () => {
  const time = fc.nat(95).map(quarter => `${String(Math.floor(quarter / 4)).padStart(2, '0')}:${String(quarter % 4 * 15).padStart(2, '0')}`)
  const requests: fc.Arbitrary<PlanWindowRequest> = fc.record({
    timeZone: fc.constantFrom('UTC', 'Europe/London', 'America/New_York', 'Australia/Lord_Howe'),
    from: fc.constantFrom('2026-03-28T20:00:00Z', '2026-10-24T22:00:00Z', '2026-03-07T22:10:00Z', '2026-10-03T10:00:00Z', '2026-06-01T05:00:00Z'),
    days: fc.constant(1),
    leadMin: fc.constantFrom(0, 20),
    darkMin: fc.constantFrom(15, 40),
    stepMin: fc.constantFrom(5, 15, 60),
    avoid: fc.array(fc.record({ days: fc.subarray([1, 2, 3, 4, 5, 6, 7], { minLength: 1 }), start: time, end: time, why: fc.constant('busy') }), { maxLength: 2 }),
    circuits: fc.array(fc.record({
      defrosts: fc.oneof(
        fc.record({ times: fc.array(time, { maxLength: 3 }) }),
        fc.record({ everyHours: fc.constantFrom(2, 4, 8, 12), offset: time }),
      ),
      durationMin: fc.constantFrom(10, 30), dripMin: fc.constantFrom(0, 5),
    }), { maxLength: 3 }).map(circuits => circuits.map((circuit, index) => ({ id: `c${index}`, ...circuit }))),
  })

  /** Starts of a circuit's defrosts by asking the wall clock minute by minute. */
  function startsByTheMinute({ timeZone, from, circuits }: PlanWindowRequest): number[][] {
    const format = new Intl.DateTimeFormat('en-GB', { timeZone, dateStyle: 'short', timeStyle: 'short' })
    const wanted = circuits.map(({ defrosts }) => 'times' in defrosts
      ? defrosts.times
      : Array.from({ length: 24 / defrosts.everyHours }, (_, index) => {
          const minute = (Number(defrosts.offset.slice(0, 2)) * 60 + Number(defrosts.offset.slice(3)) + index * defrosts.everyHours * 60) % 1440
          return `${String(Math.floor(minute / 60)).padStart(2, '0')}:${String(minute % 60).padStart(2, '0')}`
        }))
    const found = circuits.map(() => new Set<number>())
    const seen = new Set<string>()
    const first = Date.parse(from) - 26 * 60 * MINUTE
    let before = ''
    for (let moment = first; moment < first + 56 * 60 * MINUTE; moment += MINUTE) {
      const text = format.format(moment)
      const [day, now] = [text.slice(0, 10), text.slice(12)]
      if (!seen.has(text)) {
        // What lies between the last wall time and this one on the same day was skipped.
        wanted.forEach((times, circuit) => times.forEach((one) => {
          if (one === now || (before.slice(0, 10) === day && one > before.slice(12) && one < now)) found[circuit]!.add(moment)
        }))
      }
      seen.add(text)
      before = text > before || before.slice(0, 10) !== day ? text : before
    }
    return found.map(set => [...set])
  }

  it('is judged as a person with a clock would judge it, minute by minute', { timeout: 60_000 }, () => {
    fc.assert(fc.property(requests, (request) => {
      const planned = plan(request)
      const starts = startsByTheMinute(request)
      const reach = (request.leadMin + request.darkMin) * MINUTE
      const inWindow = (at: number) => request.circuits.flatMap(({ id, durationMin, dripMin }, circuit) => starts[circuit]!
        .filter(start => start < at + reach && start + (durationMin + dripMin) * MINUTE > at - 30 * MINUTE)
        .map(start => `${id} ${new Date(start).toISOString()}`)).sort()
      expect(planned.conflicts.map(({ circuit, at }) => `${circuit} ${at}`).sort()).toEqual(inWindow(Date.parse(request.from)))
      for (const { at, clean } of planned.starts) expect(clean).toBe(inWindow(Date.parse(at)).length === 0)

      const all: number[] = []
      for (let at = Date.parse(request.from); at < Date.parse(request.from) + 86_400_000; at += request.stepMin! * MINUTE) all.push(at)
      const cleanOnes = all.filter(at => inWindow(at).length === 0)
      expect(planned.starts.length).toBeLessThanOrEqual(5)
      expect(planned.starts[0]!.clean).toBe(cleanOnes.length > 0)
      const avoided = planned.starts.map(({ because }) => because.includes('avoided hours:'))
      const rank = planned.starts.map(({ at, clean }, index) => [clean ? Number(avoided[index]) : 2, inWindow(Date.parse(at)).length, Date.parse(at)])
      const sorted = [...rank].sort((one, other) => one[0]! - other[0]! || one[1]! - other[1]! || one[2]! - other[2]!)
      expect(rank).toEqual(sorted)
    }), { numRuns: 40 })
  })
})

describe('the body of a window', () => {
  const circuit = quarryStreet.circuits[0]!
  it.each([
    ['nothing', undefined, 'body'],
    ['no time zone', { ...quarryStreet, timeZone: undefined }, 'timeZone'],
    ['an unknown time zone', { ...quarryStreet, timeZone: 'Quarry/Street' }, 'timeZone'],
    ['from without a time', { ...quarryStreet, from: '2026-06-01' }, 'from'],
    ['from long ago', { ...quarryStreet, from: '0001-01-01T00:00:00Z' }, 'from'],
    ['no days', { ...quarryStreet, days: 0 }, 'days'],
    ['too many days', { ...quarryStreet, days: 32 }, 'days'],
    ['no lead', { ...quarryStreet, leadMin: undefined }, 'leadMin'],
    ['dark below zero', { ...quarryStreet, darkMin: -1 }, 'darkMin'],
    ['no step', { ...quarryStreet, stepMin: 0 }, 'stepMin'],
    ['an eighth day', { ...quarryStreet, avoid: [{ days: [8], start: '01:00', end: '02:00', why: 'x' }] }, 'avoid[0].days[0]'],
    ['an impossible time of day', { ...quarryStreet, avoid: [{ days: [1], start: '25:00', end: '02:00', why: 'x' }] }, 'avoid[0].start'],
    ['avoided hours without a why', { ...quarryStreet, avoid: [{ days: [1], start: '01:00', end: '02:00' }] }, 'avoid[0].why'],
    ['no circuits', { ...quarryStreet, circuits: undefined }, 'circuits'],
    ['no defrosts', { ...quarryStreet, circuits: [{ ...circuit, defrosts: {} }] }, 'circuits[0].defrosts'],
    ['both forms of defrosts', { ...quarryStreet, circuits: [{ ...circuit, defrosts: { times: [], everyHours: 6, offset: '00:00' } }] }, 'circuits[0].defrosts'],
    ['hours that do not divide 24', { ...quarryStreet, circuits: [circuit, { ...circuit, defrosts: { everyHours: 5, offset: '00:00' } }] }, 'circuits[1].defrosts.everyHours'],
    ['hours of 0', { ...quarryStreet, circuits: [{ ...circuit, defrosts: { everyHours: 0, offset: '00:00' } }] }, 'circuits[0].defrosts.everyHours'],
    ['a time without minutes', { ...quarryStreet, circuits: [{ ...circuit, defrosts: { times: ['2'] } }] }, 'circuits[0].defrosts.times[0]'],
    ['no drip', { ...quarryStreet, circuits: [{ ...circuit, dripMin: undefined }] }, 'circuits[0].dripMin'],
    ['a duration below zero', { ...quarryStreet, circuits: [{ ...circuit, durationMin: -5 }] }, 'circuits[0].durationMin'],
  ])('is refused with %s', (_what, body, field) => {
    const parsed = parseWindowInput(body)
    expect(parsed.ok ? 'accepted' : parsed.field).toBe(field)
    expect(parsed.ok ? '' : parsed.reason).toMatch(/\w+ \w+/)
  })

  it('may leave out days, step and avoided hours', () => {
    const { timeZone, from, leadMin, darkMin, circuits } = quarryStreet
    expect(parseWindowInput({ timeZone, from, leadMin, darkMin, circuits })).toEqual({
      ok: true, input: { timeZone, from, leadMin, darkMin, circuits, days: 7, stepMin: 5, avoid: [] },
    })
  })
})
