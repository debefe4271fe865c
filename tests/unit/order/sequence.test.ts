/** The sequence is common practice of the trade; no published source. */
import { describe, expect, it } from 'vitest'
import { change, plan, quarryStreetRack, tags, without } from './rack'
import type { OrderPoint } from '../../../shared/schemas/plan-order'

function before(order: string[], ...sequence: string[]) {
  const places = sequence.map(tag => order.indexOf(tag))
  expect(places).not.toContain(-1)
  expect(places).toEqual([...places].sort((one, other) => one - other))
}

describe('going in hand', () => {
  it('takes heat off, then fans, then what feeds, then machines', () => {
    const order = tags(plan(quarryStreetRack()))
    expect(order).toHaveLength(14)
    for (const heat of ['H1', 'G2']) for (const fan of ['E1', 'E2']) before(order, heat, fan)
    for (const fan of ['E1', 'E2']) for (const roof of ['F1', 'F2']) before(order, fan, roof, 'W1')
    for (const valve of ['L1', 'L2']) before(order, 'W1', valve, 'VS3')
  })

  it('sets a drive immediately before its machine, then fixed-speed machines, those running first', () => {
    expect(tags(plan(quarryStreetRack())).slice(-4)).toEqual(['VS3', 'C3', 'C2', 'C1'])
  })

  it('keeps a drive and its machine together although they stand in different places', () => {
    const order = tags(plan(change(quarryStreetRack(), { VS3: { place: 'Aisle 1' } })))
    expect(order.indexOf('C3')).toBe(order.indexOf('VS3') + 1)
  })

  it('says what comes first, directly or through others', () => {
    const planned = plan(quarryStreetRack())
    const after = new Map(planned.order.map(step => [step.tag, step.after]))
    const reached = new Set<string>()
    const open = ['C1']
    for (let tag = open.pop(); tag; tag = open.pop()) for (const earlier of after.get(tag)!) if (!reached.has(earlier)) { reached.add(earlier); open.push(earlier) }
    expect([...reached].sort()).toEqual(['C2', 'C3', 'E1', 'E2', 'F1', 'F2', 'G2', 'H1', 'L1', 'L2', 'VS3', 'W1'])
    expect(after.get('C1')).toEqual(['C2'])
  })

  it('gives every point a reason that the record can keep', () => {
    for (const { because } of plan(quarryStreetRack()).order) {
      expect(because).toMatch(/^[A-Z].*\.$/)
      expect(because.length).toBeLessThanOrEqual(400)
    }
  })

  it('stops machines asked off before the heat rejection and before the closed valves of their group', () => {
    const points = change(quarryStreetRack(), { C1: { hand: 'off' }, L2: { hand: 'closed' } })
    const order = tags(plan(points))
    before(order, 'C1', 'F1')
    before(order, 'C1', 'F2')
    before(order, 'C1', 'L2')
    const roofless = tags(plan(without(points, 'F1', 'F2'), { externalHeatRejection: true }))
    before(roofless, 'C1', 'L2')
  })

  it('stands pumps and high-pressure valves with the condenser fans, oil and suction valves with the liquid valves', () => {
    const order = tags(plan([
      ...quarryStreetRack(),
      { tag: 'P1', kind: 'pump', hand: 'on', rack: 'A', place: 'Zone 9' },
      { tag: 'HP', kind: 'high-pressure-valve', hand: { percent: 40 }, rack: 'A' },
      { tag: 'FG', kind: 'flash-gas-valve', hand: { percent: 20 }, rack: 'A' },
      { tag: 'OV', kind: 'oil-valve', hand: 'open', rack: 'A' },
      { tag: 'SR', kind: 'suction-regulator', hand: 'open', rack: 'A', suctionGroup: 'MT', place: 'Zone 9' },
      { tag: 'SS', kind: 'suction-stop-valve', hand: 'open', circuit: '1' },
    ]))
    for (const heat of ['P1', 'HP', 'FG']) before(order, 'E2', heat, 'W1')
    for (const valve of ['OV', 'SR', 'SS']) before(order, 'W1', valve, 'VS3')
  })

  it('binds within a rack, a suction group and a circuit, and nowhere else', () => {
    const order = tags(plan([
      { tag: 'B-heater', kind: 'defrost-heater', hand: 'off', rack: 'B', circuit: '9', place: '2' },
      { tag: 'A-light', kind: 'light', hand: 'on', rack: 'A', place: '1' },
      { tag: 'MT-fan', kind: 'evaporator-fan', hand: 'on', rack: 'B', suctionGroup: 'MT', place: '1' },
      { tag: 'LT-heater', kind: 'defrost-heater', hand: 'off', rack: 'B', suctionGroup: 'LT', place: '3' },
    ]))
    // The heater of circuit 9 names no group, so it binds the rack's groups; the low-temperature one does not.
    expect(order).toEqual(['A-light', 'B-heater', 'MT-fan', 'LT-heater'])
  })

  it('takes a circuit for its rack and group where only another of its points names them', () => {
    const order = tags(plan([
      { tag: 'A-light', kind: 'light', hand: 'on', rack: 'A', place: '1' },
      { tag: 'Fan', kind: 'evaporator-fan', hand: 'on', circuit: '1', place: '2' },
      { tag: 'Stop', kind: 'suction-stop-valve', hand: 'as-found', circuit: '1', rack: 'A', place: '3' },
    ]))
    expect(order).toEqual(['Fan', 'A-light', 'Stop'])
  })

  it('walks by place, counting as a person does, then by tag', () => {
    const light = (tag: string, place: string): OrderPoint => ({ tag, kind: 'light', hand: 'on', place })
    expect(tags(plan([light('X', 'Aisle 10'), light('Z', 'Aisle 2'), light('Y10', 'Aisle 2'), light('Y9', 'Aisle 2')])))
      .toEqual(['Y9', 'Y10', 'Z', 'X'])
  })

  it('lets points left as found come anywhere', () => {
    const points = change(quarryStreetRack(), { E1: { hand: 'as-found', place: '0' }, C1: { hand: 'as-found', place: '0' } })
    expect(tags(plan(points)).slice(0, 2).sort()).toEqual(['C1', 'E1'])
  })

  it('follows the links of the equipment', () => {
    const light = (tag: string, after?: string[]): OrderPoint => ({ tag, kind: 'light', hand: 'on', after })
    const planned = plan([light('1', ['2']), light('2', ['3']), light('3')])
    expect(planned.order.map(({ tag, after }) => [tag, after])).toEqual([['3', []], ['2', ['3']], ['1', ['2']]])
    expect(planned.order[1]!.because).toContain('follows 3')
  })

  it('keeps a link that leads through a refused point', () => {
    const planned = plan([
      { tag: 'A', kind: 'light', hand: 'on', after: ['H'] },
      { tag: 'H', kind: 'defrost-heater', hand: 'on', after: ['Z'] },
      { tag: 'Z', kind: 'light', hand: 'on' },
    ])
    expect(planned.order.map(({ tag, after }) => [tag, after])).toEqual([['Z', []], ['A', ['Z']]])
  })
})

describe('handing back', () => {
  const back = (points: OrderPoint[]) => tags(plan(points, { direction: 'hand-back' }))

  it('goes the other way, defrosts last but for the alarms', () => {
    const order = back(quarryStreetRack())
    expect(order).toHaveLength(14)
    for (const machine of ['C1', 'C2', 'VS3']) for (const valve of ['L1', 'L2']) before(order, machine, valve)
    for (const valve of ['L1', 'L2']) for (const fan of ['E1', 'E2']) before(order, valve, fan, 'F1', 'W1')
    for (const defrost of ['H1', 'G2']) before(order, 'F2', 'W1', defrost, 'A1')
    expect(order.at(-1)).toBe('A1')
  })

  it('hands a drive back immediately after its machine, ahead of fixed-speed machines', () => {
    expect(back(quarryStreetRack()).slice(0, 4)).toEqual(['C3', 'VS3', 'C1', 'C2'])
  })

  it('puts alarms last across racks', () => {
    const order = back([{ tag: 'Alarm', kind: 'person-trapped-alarm', hand: 'on', place: '0' }, ...quarryStreetRack()])
    expect(order.slice(-2).sort()).toEqual(['A1', 'Alarm'])
  })

  it('leaves out what stays, which holds back neither its condenser nor its evaporator fans', () => {
    const order = back(change(quarryStreetRack(), { C1: { stays: true } }))
    expect(order).not.toContain('C1')
    for (const fan of ['E1', 'E2', 'F1', 'F2']) expect(order).toContain(fan)
  })
})

describe('two stages', () => {
  const machine = (tag: string, stage: 'low' | 'medium', more: Partial<OrderPoint> = {}): OrderPoint =>
    ({ tag, kind: 'compressor', hand: 'on', rack: 'B', stage, ...more })
  const roof: OrderPoint = { tag: 'F', kind: 'condenser-fan', hand: 'on', rack: 'B' }

  it('starts a medium-stage machine before any low-stage one, before running-first', () => {
    expect(tags(plan([machine('L1', 'low', { running: true }), machine('M1', 'medium'), machine('M2', 'medium'), roof])))
      .toEqual(['F', 'M1', 'L1', 'M2'])
  })

  it('holds that against a low-stage machine on a drive', () => {
    expect(tags(plan([
      machine('L1', 'low'), machine('M1', 'medium'), roof,
      { tag: 'V', kind: 'drive', hand: { hz: 50 }, drives: 'L1' },
    ]))).toEqual(['F', 'M1', 'V', 'L1'])
  })

  it('binds the rack, whatever the suction groups', () => {
    expect(tags(plan([
      machine('L1', 'low', { suctionGroup: 'LT', place: '1' }), machine('M1', 'medium', { suctionGroup: 'MT', place: '2' }), roof,
    ]))).toEqual(['F', 'M1', 'L1'])
  })

  it('leaves the choice of the medium-stage machine to the links', () => {
    expect(tags(plan([
      machine('L1', 'low'), machine('M1', 'medium', { after: ['L1'] }), machine('M2', 'medium'), roof,
    ]))).toEqual(['F', 'M2', 'L1', 'M1'])
  })

  it('stops low-stage machines before medium-stage ones', () => {
    expect(tags(plan([machine('L1', 'low', { hand: 'off', place: '2' }), machine('M1', 'medium', { hand: 'off', place: '1' })])))
      .toEqual(['L1', 'M1'])
  })

  it('hands each low-stage machine back before the last medium-stage one', () => {
    const order = tags(plan([
      machine('L1', 'low', { place: '3' }), machine('M1', 'medium', { place: '1' }), machine('M2', 'medium', { place: '2' }), roof,
    ], { direction: 'hand-back' }))
    expect(order).toEqual(['M1', 'L1', 'M2', 'F'])
  })
})
