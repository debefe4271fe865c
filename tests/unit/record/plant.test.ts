import { describe, expect, it } from 'vitest'
import { plantWarnings } from '../../../shared/record/plant'
import { told } from '../../../shared/record/words'
import { technician } from '../../support/record'
import { GROUP, inHand, pressure, snapshot, storyTo } from './store'

const warned = (writer: ReturnType<typeof storyTo>) => writer.entries.filter(stored => stored.entry.kind === 'plant-warned').map(stored => stored.entry.body as { fault: string, over: boolean })

/** Low cut-out 20, target 48, high cut-out 395 psig; the figures of the limits are common practice, no source. */
describe('plant readings judged', () => {
  it.each([
    [23, []], [22.9, ['suction-near-cut-out']], [43.1, []], [43, ['suction-below-forecast']], [48, []],
  ] as [number, string[]][])('suction %s psig: %j', (suction, faults) => {
    const writer = storyTo('dark')
    // Between 23 and 43 psig suction is below what was foretold, which is left aside by letting go of the target.
    if (suction < 43) writer.state.snapshot.suctionGroups[0]!.targetSuctionPsig = null
    writer.pass(5).sign(technician, 'pressure-read', pressure(suction))
    expect(plantWarnings(writer.state).map(item => item.fault)).toEqual(faults)
  })

  it.each([[355.5, []], [355.6, ['discharge-high']]] as [number, string[]][])('discharge %s psig of 395: %j', (dischargePsig, faults) => {
    const writer = storyTo('dark')
    writer.pass(5).sign(technician, 'pressure-read', { ...pressure(48), dischargePsig })
    expect(plantWarnings(writer.state).map(item => item.fault)).toEqual(faults)
  })

  it('says which compressor to drop: the smallest of those on', () => {
    const writer = storyTo('dark')
    writer.sign(technician, 'point-in-hand', inHand('C-2', { hand: 'on', reason: 'more cold wanted' }))
    writer.state.snapshot.points.find(point => point.tag === 'C-1')!.capacityKw = 40
    writer.state.snapshot.points.find(point => point.tag === 'C-2')!.capacityKw = 20
    writer.pass(5).sign(technician, 'pressure-read', pressure(21))
    expect(plantWarnings(writer.state)[0]!.act).toBe('Drop the smallest compressor: C-2 compressor C-2 off by hand.')
  })

  it('says which condenser fan to add, or that there is none left', () => {
    const writer = storyTo('dark')
    writer.pass(5).sign(technician, 'pressure-read', { ...pressure(48), dischargePsig: 380 })
    expect(plantWarnings(writer.state)[0]!.act).toContain('Every condenser fan is on: drop the only compressor that is on: C-1')
    writer.state.points['CF-1']!.status = 'auto'
    expect(plantWarnings(writer.state)[0]!.act).toBe('Add a condenser fan: CF-1 condenser-fan CF-1 on by hand.')
  })

  it('warns of a current above the plate', () => {
    const writer = storyTo('dark')
    writer.state.snapshot.points.find(point => point.tag === 'C-1')!.ratedA = 18
    writer.sign(technician, 'point-in-hand', inHand('C-1', { value: { number: 18, unit: 'A' } }))
    expect(plantWarnings(writer.state)).toEqual([])
    writer.sign(technician, 'point-in-hand', inHand('C-1', { value: { number: 18.1, unit: 'A' } }))
    expect(plantWarnings(writer.state).map(item => [item.fault, item.about])).toEqual([['current-above-plate', 'C-1']])
  })

  it.each([
    ['psig', 'suction 21 psig is within 3 psi of the low cut-out, 20 psig'],
    ['bar', 'suction 1.45 bar gauge is within 0.21 bar of the low cut-out, 1.38 bar gauge'],
    ['kPa', 'suction 145 kPa gauge is within 21 kPa of the low cut-out, 138 kPa gauge'],
  ] as const)('speaks in the %s of the site', (unit, words) => {
    const writer = storyTo('dark')
    writer.state.snapshot.site.pressureUnit = unit
    writer.pass(5).sign(technician, 'pressure-read', pressure(21))
    expect(plantWarnings(writer.state)[0]!.words).toContain(words)
  })

  it('is entered by the server when it begins and when it is over, and not in between', () => {
    const writer = storyTo('dark')
    for (const suction of [21, 21.5, 30]) writer.pass(2).sign(technician, 'pressure-read', pressure(suction))
    for (const suction of [47, 48]) writer.pass(2).sign(technician, 'pressure-read', pressure(suction))
    expect(warned(writer).map(body => [body.fault, body.over])).toEqual([
      ['suction-near-cut-out', false], ['suction-below-forecast', false], ['suction-near-cut-out', true], ['suction-below-forecast', true],
    ])
    expect(writer.state.plant).toEqual([])
    const first = writer.entries.find(stored => stored.entry.kind === 'plant-warned')!
    expect(told(writer.state, first.entry)).toMatchObject({ did: 'Plant warning', seen: expect.stringContaining('within 3 psi of the low cut-out, 20 psig · Drop the only compressor') as string })
  })

  it('judges nothing before points go in hand, and no questioned reading', () => {
    const early = storyTo('approved')
    early.sign(technician, 'pressure-read', pressure(10))
    expect(plantWarnings(early.state)).toEqual([])
    const writer = storyTo('dark')
    writer.pass(1).sign(technician, 'pressure-read', pressure(10))
    writer.state.pressures.at(-1)!.questioned = true
    expect(plantWarnings(writer.state)).toEqual([])
    expect(snapshot.suctionGroups[0]!.id).toBe(GROUP)
  })
})
