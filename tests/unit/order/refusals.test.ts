/** Rules of overrides I1, I2, I3, I7, I9 and I12: common practice of the trade, no published source. */
import { describe, expect, it } from 'vitest'
import { change, plan, quarryStreetRack, refused, tags, without } from './rack'
import type { OrderPoint } from '../../../shared/schemas/plan-order'

const everythingOfTheGroup = { C1: 'I1', C2: 'I1', C3: 'I1', VS3: 'I1', L1: 'I1', L2: 'I1' }

it('refuses nothing on a rack that is in order', () => {
  expect(plan(quarryStreetRack()).refusals).toEqual([])
})

describe('I1', () => {
  it('needs a condenser fan of the rack on', () => {
    expect(refused(plan(change(quarryStreetRack(), { F1: { hand: 'off' } })))).toEqual(everythingOfTheGroup)
    expect(refused(plan(change(quarryStreetRack(), { F1: { hand: 'as-found' } })))).toEqual(everythingOfTheGroup)
    expect(refused(plan(change(quarryStreetRack(), { F1: { rack: 'B' }, F2: { rack: 'B' } })))).toEqual(everythingOfTheGroup)
  })

  it('takes heat rejection elsewhere for the condenser fans, and says so', () => {
    const planned = plan(without(quarryStreetRack(), 'F1', 'F2'), { externalHeatRejection: true })
    expect(planned.refusals).toEqual([])
    expect(planned.order.find(({ tag }) => tag === 'C1')!.because).toContain('stands for the condenser fans')
  })

  it('is content with one circuit that is open and has all its fans on', () => {
    expect(plan(change(quarryStreetRack(), { L1: { hand: 'closed' } })).refusals).toEqual([])
    expect(plan(change(quarryStreetRack(), { E1: { hand: 'off' } })).refusals).toEqual([])
    expect(refused(plan(change(quarryStreetRack(), { L1: { hand: 'closed' }, E2: { hand: 'off' } })))).toEqual({
      C1: 'I1', C2: 'I1', C3: 'I1', VS3: 'I1', L2: 'I1',
    })
  })

  it('counts a circuit as open when every liquid valve in it is asked open', () => {
    const shut: OrderPoint = { tag: 'X1', kind: 'expansion-valve', hand: 'closed', circuit: '1' }
    const points = without(quarryStreetRack(), 'L2', 'E2', 'G2')
    expect(refused(plan([...points, shut]))).toEqual({ C1: 'I1', C2: 'I1', C3: 'I1', VS3: 'I1', L1: 'I1' })
    expect(plan([...points, { ...shut, hand: { percent: 30 } }]).refusals).toEqual([])
  })

  it('looks in the own suction group', () => {
    const other = change(quarryStreetRack(), { L1: { suctionGroup: 'LT' }, L2: { suctionGroup: 'LT' }, H1: { suctionGroup: 'LT' }, G2: { suctionGroup: 'LT' } })
    expect(refused(plan(other))).toEqual(everythingOfTheGroup)
  })

  it('counts a circuit without points as on and open, and says so', () => {
    const planned = plan(without(quarryStreetRack(), 'E1', 'L2'))
    expect(planned.refusals).toEqual([])
    const because = planned.order.find(({ tag }) => tag === 'C1')!.because
    expect(because).toContain('Circuit 1 has no evaporator fan point here')
    expect(because).toContain('Circuit 2 has no liquid valve point here')
  })

  it('counts a rack without circuit points as fed, and says so', () => {
    const planned = plan(quarryStreetRack().filter(point => point.circuit === undefined))
    expect(planned.refusals).toEqual([])
    expect(planned.order.find(({ tag }) => tag === 'C1')!.because).toContain('counts as fed')
  })

  it('takes a liquid valve without a circuit for one of its own', () => {
    const rack: OrderPoint[] = [
      { tag: 'C', kind: 'compressor', hand: 'on', rack: 'A' },
      { tag: 'F', kind: 'condenser-fan', hand: 'on', rack: 'A' },
      { tag: 'L', kind: 'liquid-line-valve', hand: 'open', rack: 'A' },
      { tag: 'E', kind: 'evaporator-fan', hand: 'on', rack: 'A' },
    ]
    expect(plan(rack).refusals).toEqual([])
    expect(refused(plan(change(rack, { L: { hand: 'closed' } })))).toEqual({ C: 'I1' })
    expect(refused(plan(change(rack, { E: { hand: 'off' } })))).toEqual({ C: 'I1', L: 'I1' })
  })

  it('keeps the liquid valves of a group without a machine on closed', () => {
    const off = change(quarryStreetRack(), { C1: { hand: 'off' }, C2: { hand: 'off' }, C3: { hand: 'off' } })
    expect(refused(plan(off))).toEqual({ L1: 'I1', L2: 'I1' })
  })
})

describe('I2', () => {
  it('never holds a defrost heater or hot-gas valve on', () => {
    expect(refused(plan(change(quarryStreetRack(), { H1: { hand: 'on' }, G2: { hand: 'open' } })))).toEqual({ H1: 'I2', G2: 'I2' })
    expect(refused(plan(change(quarryStreetRack(), { G2: { hand: { percent: 10 } } })))).toEqual({ G2: 'I2' })
  })
})

describe('I3', () => {
  it('never turns off what keeps people safe', () => {
    const kinds = ['leak-alarm', 'person-trapped-alarm', 'machinery-room-ventilation', 'egress-light'] as const
    for (const kind of kinds) {
      expect(refused(plan([{ tag: 'S', kind, hand: 'off' }]))).toEqual({ S: 'I3' })
      expect(plan([{ tag: 'S', kind, hand: 'on' }]).refusals).toEqual([])
      expect(plan([{ tag: 'S', kind, hand: 'as-found' }]).refusals).toEqual([])
    }
    expect(plan([{ tag: 'S', kind: 'ventilation', hand: 'off' }, { tag: 'T', kind: 'light', hand: 'off' }]).refusals).toEqual([])
  })
})

describe('I7', () => {
  const back = (changes: Record<string, Partial<OrderPoint>>) => plan(change(quarryStreetRack(), changes), { direction: 'hand-back' })

  it('keeps liquid valves in hand while a machine that they feed stays on', () => {
    const planned = back({ C1: { stays: true } })
    expect(refused(planned)).toEqual({ L1: 'I7', L2: 'I7' })
    expect(planned.refusals[0]!.because).toContain('C1')
    expect(tags(planned)).not.toContain('L1')
  })

  it('does not mind a machine that stays off, or one of another group', () => {
    expect(back({ C1: { stays: true, hand: 'off' } }).refusals).toEqual([])
    expect(back({ C1: { stays: true, suctionGroup: 'LT' } }).refusals).toEqual([])
  })

  it('says nothing of a valve that stays itself', () => {
    expect(refused(back({ C1: { stays: true }, L1: { stays: true } }))).toEqual({ L2: 'I7' })
  })
})

describe('I9', () => {
  it('holds nothing on whose guards are not in series', () => {
    expect(refused(plan(change(quarryStreetRack(), { C1: { guardInSeries: false }, W1: { guardInSeries: false } })))).toEqual({ C1: 'I9', W1: 'I9' })
    expect(plan(change(quarryStreetRack(), { C1: { guardInSeries: false, hand: 'off' } })).refusals).toEqual([])
  })

  it('takes the drive of a refused compressor with it, and the open valves with the last machine', () => {
    expect(refused(plan(change(quarryStreetRack(), { C3: { guardInSeries: false } })))).toEqual({ C3: 'I9', VS3: 'I9' })
    expect(refused(plan(change(quarryStreetRack(), { C1: { guardInSeries: false }, C2: { guardInSeries: false }, C3: { guardInSeries: false } }))))
      .toEqual({ C1: 'I9', C2: 'I9', C3: 'I9', VS3: 'I9', L1: 'I1', L2: 'I1' })
  })
})

describe('I12', () => {
  const machine = (tag: string, stage: 'low' | 'medium', more: Partial<OrderPoint> = {}): OrderPoint =>
    ({ tag, kind: 'compressor', hand: 'on', rack: 'B', suctionGroup: stage, stage, ...more })
  const booster: OrderPoint[] = [
    machine('L1', 'low'), machine('M1', 'medium'),
    { tag: 'F', kind: 'condenser-fan', hand: 'on', rack: 'B' },
    { tag: 'LV', kind: 'liquid-line-valve', hand: 'open', rack: 'B', suctionGroup: 'low', circuit: '1' },
    { tag: 'MV', kind: 'liquid-line-valve', hand: 'open', rack: 'B', suctionGroup: 'medium', circuit: '2' },
  ]

  it('leaves no low-stage machine on without a medium-stage one', () => {
    expect(plan(booster).refusals).toEqual([])
    expect(refused(plan(change(booster, { M1: { hand: 'off' } })))).toEqual({ L1: 'I12', LV: 'I1', MV: 'I1' })
    expect(refused(plan(change(booster, { M1: { rack: 'C' }, MV: { rack: 'C' } })))).toEqual({ L1: 'I12', M1: 'I1', LV: 'I1', MV: 'I1' })
  })

  it('refuses the low-stage machine, its drive and its valves with the medium-stage one', () => {
    const points = [...change(booster, { M1: { guardInSeries: false } }), { tag: 'V', kind: 'drive', hand: { hz: 40 }, drives: 'L1' } as OrderPoint]
    expect(refused(plan(points))).toEqual({ M1: 'I9', L1: 'I12', V: 'I12', LV: 'I1', MV: 'I1' })
  })

  it('shuts no liquid in between two closed valves', () => {
    const points: OrderPoint[] = [
      { tag: 'L', kind: 'liquid-line-valve', hand: 'closed', circuit: '1' },
      { tag: 'X', kind: 'expansion-valve', hand: 'closed', circuit: '1' },
      { tag: 'M', kind: 'liquid-line-valve', hand: 'closed', circuit: '2' },
    ]
    expect(refused(plan(points))).toEqual({ L: 'I12' })
    expect(plan(change(points, { X: { hand: 'as-found' } })).refusals).toEqual([])
  })

  it('hands the last medium-stage machine back only when no low-stage one stays on', () => {
    const two = [...change(booster, { L1: { stays: true } }), machine('M2', 'medium')]
    expect(refused(plan(two, { direction: 'hand-back' }))).toEqual({ M2: 'I12', LV: 'I7', MV: 'I7' })
    expect(refused(plan(change(two, { M1: { stays: true } }), { direction: 'hand-back' }))).toEqual({ LV: 'I7', MV: 'I7' })
    expect(plan(change(two, { L1: { hand: 'off' } }), { direction: 'hand-back' }).refusals).toEqual([])
  })
})
