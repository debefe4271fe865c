import { describe, expect, it } from 'vitest'
import { parseOrderInput, planOrder } from '../../../server/utils/order'
import { change, quarryStreetRack } from './rack'
import type { OrderPoint } from '../../../shared/schemas/plan-order'

const light: OrderPoint = { tag: 'A', kind: 'light', hand: 'on' }

function refusal(body: unknown): { field: string, reason: string } {
  const parsed = parseOrderInput(body)
  if (parsed.ok) throw new Error('was accepted')
  return parsed
}

const body = (...points: unknown[]) => ({ direction: 'in-hand', points })

describe('the body of an order', () => {
  it.each([
    ['nothing', undefined, 'body'],
    ['no object', [], 'body'],
    ['no direction', { points: [] }, 'direction'],
    ['another direction', { direction: 'sideways', points: [] }, 'direction'],
    ['no points', { direction: 'in-hand' }, 'points'],
    ['heat rejection in words', { direction: 'in-hand', points: [], externalHeatRejection: 'yes' }, 'externalHeatRejection'],
    ['an empty tag', body({ ...light, tag: ' ' }), 'points[0].tag'],
    ['an unknown kind', body(light, { ...light, tag: 'B', kind: 'fridge' }), 'points[1].kind'],
    ['an unknown hand position', body({ ...light, hand: 'ajar' }), 'points[0].hand'],
    ['a speed below zero', body({ ...light, hand: { hz: -1 } }), 'points[0].hand.hz'],
    ['more than 100 %', body({ ...light, hand: { percent: 101 } }), 'points[0].hand.percent'],
    ['speed and opening at once', body({ ...light, hand: { hz: 1, percent: 1 } }), 'points[0].hand'],
    ['an unknown stage', body({ ...light, stage: 'high' }), 'points[0].stage'],
    ['running in words', body({ ...light, running: 'yes' }), 'points[0].running'],
    ['after as a word', body({ ...light, after: 'B' }), 'points[0].after'],
    ['a tag twice', body(light, light), 'points[1].tag'],
    ['after naming no point', body({ ...light, after: ['B'] }), 'points[0].after[0]'],
    ['drives naming no point', body({ ...light, drives: 'B' }), 'points[0].drives'],
    ['a circuit on two racks', body({ ...light, circuit: '1', rack: 'X' }, { ...light, tag: 'B', circuit: '1', rack: 'Y' }), 'points[1].rack'],
  ])('is refused with %s', (_what, sent, field) => {
    const fault = refusal(sent)
    expect(fault.field).toBe(field)
    expect(fault.reason).toMatch(/\w+ \w+/)
  })

  it('is refused when points wait for each other, which are named', () => {
    const ring = refusal(body({ ...light, after: ['B'] }, { ...light, tag: 'B', after: ['C'] }, { ...light, tag: 'C', after: ['A'] }, { ...light, tag: 'D' }))
    expect(ring.field).toBe('points')
    for (const tag of ['A', 'B', 'C']) expect(ring.reason).toMatch(new RegExp(`\\b${tag}\\b`))
    expect(ring.reason).not.toMatch(/\bD\b/)
  })

  it.each([
    ['itself', body({ ...light, after: ['A'] }), ['A']],
    ['the machine that drives it', body({ ...light, drives: 'B' }, { ...light, tag: 'B', drives: 'A' }), ['A', 'B']],
    ['what the sequence puts later', { direction: 'in-hand', points: change(quarryStreetRack(), { H1: { after: ['F1'] } }) }, ['H1', 'F1']],
    ['what stands between it and its drive', body(
      { tag: 'V', kind: 'drive', hand: { hz: 40 }, drives: 'P' }, { tag: 'P', kind: 'pump', hand: 'on', after: ['A'] }, { ...light, after: ['V'] },
    ), ['V', 'A', 'P']],
    ['its own drive, backwards', body({ tag: 'V', kind: 'drive', hand: { hz: 40 }, drives: 'P', after: ['P'] }, { tag: 'P', kind: 'pump', hand: 'on' }), ['V', 'P']],
  ])('is refused when a point waits for %s', (_what, sent, tags) => {
    const ring = refusal(sent)
    expect(ring.field).toBe('points')
    for (const tag of tags) expect(ring.reason).toContain(tag)
  })

  it('may be empty, and may carry fields that nothing reads', () => {
    expect(parseOrderInput({ direction: 'hand-back', points: [], note: 'x' })).toEqual({ ok: true, input: { direction: 'hand-back', points: [] } })
  })

  it('throws where a ring reaches the plan unparsed', () => {
    expect(() => planOrder({ direction: 'in-hand', points: [{ ...light, after: ['B'] }, { ...light, tag: 'B', after: ['A'] }] })).toThrow(RangeError)
  })

  it('takes a controller of 2,000 points and no more', { timeout: 30_000 }, () => {
    const many = (count: number) => body(...Array.from({ length: count }, (_, index) => ({ ...light, tag: `P${index}` })))
    expect(parseOrderInput(many(2000)).ok).toBe(true)
    expect(refusal(many(2001)).field).toBe('points')
  })
})
