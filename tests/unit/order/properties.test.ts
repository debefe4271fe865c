/**
 * The order against rules written a second time, straight from their words, and against brute
 * force. The rules are common practice of the trade; no published source.
 */
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { parseOrderInput, planOrder } from '../../../server/utils/order'
import type { OrderPoint, PlanOrderInput } from '../../../shared/schemas/plan-order'
import { isValve } from '../../../shared/schemas/point-kinds'

const LEVELS: Record<PlanOrderInput['direction'], string[][]> = {
  'in-hand': [
    ['defrost-heater', 'hot-gas-valve'], ['evaporator-fan'], ['condenser-fan', 'pump'],
    ['anti-sweat-heater', 'light'], ['liquid-line-valve', 'expansion-valve', 'oil-valve'], ['compressor'],
  ],
  'hand-back': [
    ['compressor'], ['liquid-line-valve', 'expansion-valve', 'oil-valve'], ['evaporator-fan'],
    ['condenser-fan', 'pump'], ['anti-sweat-heater', 'light'], ['defrost-heater', 'hot-gas-valve'], ['leak-alarm'],
  ],
}
const CIRCUIT_KINDS = ['defrost-heater', 'hot-gas-valve', 'evaporator-fan', 'liquid-line-valve', 'expansion-valve'] as const
const RACK_KINDS = ['condenser-fan', 'pump', 'anti-sweat-heater', 'light', 'oil-valve'] as const

const isOn = ({ hand }: OrderPoint) => hand === 'on' || hand === 'open'
const isOff = ({ hand }: OrderPoint) => hand === 'off' || hand === 'closed'

/** Two racks with two suction groups each; circuits named for the group that they belong to. */
const pointArbitrary: fc.Arbitrary<Omit<OrderPoint, 'tag'>> = fc.oneof(
  fc.record({
    kind: fc.constantFrom(...CIRCUIT_KINDS), hand: fc.constantFrom('on', 'off', 'as-found'),
    at: fc.constantFrom('A/MT/1', 'A/MT/2', 'A/LT/3', 'B/MT/4'), place: fc.constantFrom('1', '2', '3'), stays: fc.boolean(),
  }).map(({ at, ...point }) => ({ ...point, rack: at[0], suctionGroup: at.slice(2, 4), circuit: at.slice(5) } as Omit<OrderPoint, 'tag'>)),
  fc.record({
    kind: fc.constantFrom(...RACK_KINDS), hand: fc.constantFrom('on', 'on', 'off', 'as-found'),
    rack: fc.constantFrom('A', 'B'), place: fc.constantFrom('1', '2', '3'),
  }) as fc.Arbitrary<Omit<OrderPoint, 'tag'>>,
  fc.record({
    kind: fc.constant('compressor'), hand: fc.constantFrom('on', 'on', 'off', 'as-found'), rack: fc.constantFrom('A', 'B'),
    suctionGroup: fc.constantFrom('MT', 'LT'), running: fc.boolean(), stays: fc.boolean(), stage: fc.constantFrom(undefined, 'low', 'medium'),
    guardInSeries: fc.constantFrom(true, true, true, false), driven: fc.boolean(),
  }) as unknown as fc.Arbitrary<Omit<OrderPoint, 'tag'>>,
)

const inputArbitrary: fc.Arbitrary<PlanOrderInput> = fc.record({
  direction: fc.constantFrom('in-hand', 'hand-back'),
  externalHeatRejection: fc.constantFrom(true, false),
  points: fc.array(pointArbitrary, { minLength: 1, maxLength: 18 }),
}).map(({ points, ...input }) => ({
  ...input,
  points: points.flatMap((point, index) => {
    const { driven, ...rest } = point as typeof point & { driven?: boolean }
    const machine: OrderPoint = { ...rest, tag: `P${index}` }
    return driven ? [machine, { tag: `V${index}`, kind: 'drive', hand: { hz: 40 }, drives: machine.tag, stays: machine.stays } as OrderPoint] : [machine]
  }),
} as PlanOrderInput))

function bound(one: OrderPoint, other: OrderPoint): boolean {
  if (one.rack !== other.rack) return false
  return one.suctionGroup === undefined || other.suctionGroup === undefined || one.suctionGroup === other.suctionGroup
}

/** Whether the sequence has one before the other, for points that bear their rack and group themselves. */
function sequenceDemands(direction: PlanOrderInput['direction'], one: OrderPoint, other: OrderPoint): boolean {
  if (one.kind === 'drive' || other.kind === 'drive' || !bound(one, other)) return false
  if ([one, other].some(point => point.hand === 'as-found')) return false
  const stopped = (point: OrderPoint) => direction === 'in-hand' && point.kind === 'compressor' && isOff(point)
  if (stopped(other)) return false
  if (stopped(one)) return other.kind === 'condenser-fan' || other.kind === 'pump' || (isValve(other.kind) && isOff(other))
  const level = (point: OrderPoint) => LEVELS[direction].findIndex(kinds => kinds.includes(point.kind))
  return level(one) < level(other)
}

describe('any order', { timeout: 30_000 }, () => {
  it('holds every point once, but for those that stay, and respects what the sequence demands', () => {
    fc.assert(fc.property(inputArbitrary, (input) => {
      const parsed = parseOrderInput(input)
      if (!parsed.ok) throw new Error(parsed.reason)
      const { order, refusals } = planOrder(parsed.input)
      const expected = input.points.filter(({ tag, stays }) => !(input.direction === 'hand-back' && stays) || refusals.some(refusal => refusal.tag === tag))
      expect([...order, ...refusals].map(({ tag }) => tag).sort()).toEqual(expected.map(({ tag }) => tag).sort())

      const byTag = new Map(input.points.map(point => [point.tag, point]))
      const position = new Map(order.map(({ tag }, index) => [tag, index]))
      const reached = new Map<string, Set<string>>()
      for (const { tag, after } of order) {
        const all = new Set(after)
        expect(after.filter(earlier => position.get(earlier)! >= position.get(tag)!)).toEqual([])
        for (const earlier of after) {
          for (const further of reached.get(earlier)!) all.add(further)
        }
        reached.set(tag, all)
        const demanded = order.filter(other => sequenceDemands(input.direction, byTag.get(other.tag)!, byTag.get(tag)!))
        expect(demanded.filter(other => !all.has(other.tag))).toEqual([])
        const drive = byTag.get(tag)!
        if (drive.drives !== undefined && position.has(drive.drives)) {
          expect(position.get(drive.drives)! - position.get(tag)!).toBe(input.direction === 'in-hand' ? 1 : -1)
        }
      }
    }), { numRuns: 200 })
  })

  it('keeps I12: a medium-stage machine before each low-stage one, and the last of them after at hand back', () => {
    fc.assert(fc.property(inputArbitrary, (input) => {
      const { order } = planOrder(input)
      const machines = order.flatMap(({ tag }) => input.points.filter(point => point.tag === tag && point.kind === 'compressor' && isOn(point)))
      for (const rack of ['A', 'B']) {
        const stages = machines.filter(point => point.rack === rack).map(({ stage }) => stage)
        if (!stages.includes('low')) continue
        if (input.direction === 'in-hand') expect(stages.slice(0, stages.indexOf('low'))).toContain('medium')
        else if (stages.includes('medium')) expect(stages.slice(stages.lastIndexOf('low'))).toContain('medium')
      }
    }), { numRuns: 200 })
  })

  it('puts running fixed-speed machines before the others of their group, where I12 has no part', () => {
    fc.assert(fc.property(inputArbitrary, (input) => {
      const points = input.points.map(point => ({ ...point, stage: undefined }))
      const driven = new Set(points.map(({ drives }) => drives))
      const machines = planOrder({ ...input, direction: 'in-hand', points }).order
        .flatMap(({ tag }) => points.filter(point => point.tag === tag && point.kind === 'compressor' && isOn(point)))
      const rank = (point: OrderPoint) => driven.has(point.tag) ? 0 : point.running ? 1 : 2
      const early = machines.flatMap((later, at) =>
        machines.slice(0, at).filter(earlier => bound(earlier, later) && rank(earlier) > rank(later)))
      expect(early).toEqual([])
    }), { numRuns: 200 })
  })

  it('depends on nothing but what is asked, not on the order in which it is listed', () => {
    fc.assert(fc.property(inputArbitrary, (input) => {
      const listed = planOrder(input)
      const turned = planOrder({ ...input, points: [...input.points].reverse() })
      expect(turned.order.map(({ tag }) => tag)).toEqual(listed.order.map(({ tag }) => tag))
      expect(turned.refusals.map(({ tag, rule }) => `${tag} ${rule}`).sort()).toEqual(listed.refusals.map(({ tag, rule }) => `${tag} ${rule}`).sort())
    }), { numRuns: 200 })
  })
})

/** The rules on a choice of points that are held on; everything else is held as asked. */
function keepsRules(points: OrderPoint[], held: ReadonlySet<string>, externalHeatRejection: boolean): boolean {
  const on = (point: OrderPoint) => held.has(point.tag)
  const compressors = points.filter(point => point.kind === 'compressor' && on(point))
  const circuits = [...new Set(points.flatMap(({ circuit }) => circuit ?? []))].map(circuit => points.filter(point => point.circuit === circuit))
  const isLiquid = ({ kind }: OrderPoint) => kind === 'liquid-line-valve' || kind === 'expansion-valve'
  return compressors.every(compressor =>
    compressor.guardInSeries !== false
    && (externalHeatRejection || points.some(point => point.kind === 'condenser-fan' && point.rack === compressor.rack && isOn(point)))
    && (circuits.every(circuit => circuit[0]!.rack !== compressor.rack) || circuits.some(circuit => bound(circuit[0]!, compressor)
      && circuit.filter(isLiquid).every(on) && circuit.filter(({ kind }) => kind === 'evaporator-fan').every(isOn)))
    && (compressor.stage !== 'low' || compressors.some(other => other.rack === compressor.rack && other.stage === 'medium')))
  && points.filter(point => isLiquid(point) && on(point)).every(valve => compressors.some(compressor => bound(valve, compressor)))
}

describe('refusals going in hand, by brute force', { timeout: 30_000 }, () => {
  it('are the fewest that leave the rules kept', () => {
    fc.assert(fc.property(inputArbitrary, (input) => {
      const asked = input.points.filter(point => ['compressor', 'liquid-line-valve', 'expansion-valve'].includes(point.kind) && isOn(point))
      fc.pre(asked.length <= 9)
      const external = input.externalHeatRejection === true
      const refusedTags = new Set(planOrder({ ...input, direction: 'in-hand' }).refusals.map(({ tag }) => tag))
      let most = new Set<string>()
      for (let choice = 0; choice < 2 ** asked.length; choice += 1) {
        const held = new Set(asked.filter((_, index) => (choice >> index) & 1).map(({ tag }) => tag))
        if (held.size > most.size && keepsRules(input.points, held, external)) most = held
      }
      expect(asked.filter(({ tag }) => !refusedTags.has(tag)).map(({ tag }) => tag)).toEqual([...most])
    }), { numRuns: 200 })
  })
})

describe('rings, by brute force', { timeout: 30_000 }, () => {
  const small = fc.record({
    direction: fc.constantFrom('in-hand' as const, 'hand-back' as const),
    kinds: fc.array(fc.constantFrom('defrost-heater', 'evaporator-fan', 'condenser-fan', 'light', 'oil-valve'), { minLength: 2, maxLength: 5 }),
    links: fc.array(fc.tuple(fc.nat(4), fc.nat(4)), { maxLength: 4 }),
    drive: fc.option(fc.nat(4), { nil: undefined }),
  }).map(({ direction, kinds, links, drive }) => {
    const points = kinds.map((kind, index) => ({
      tag: `P${index}`, kind, hand: 'off', rack: 'A',
      after: links.filter(([to, from]) => to === index && from < kinds.length).map(([, from]) => `P${from}`),
    } as OrderPoint))
    if (drive !== undefined && drive < points.length) points.push({ tag: 'V', kind: 'drive', hand: { hz: 30 }, rack: 'A', drives: `P${drive}` })
    return { direction, points }
  })

  it('are found exactly where no order of the points keeps to the sequence and the links', () => {
    fc.assert(fc.property(small, (input) => {
      const { points, direction } = input
      const asIfMachine = (point: OrderPoint) => points.find(({ tag }) => tag === point.drives) ?? point
      const keeps = (order: OrderPoint[]) => order.every((point, at) =>
        order.slice(at + 1).every(later => !sequenceDemands(direction, asIfMachine(later), asIfMachine(point)) && !point.after?.includes(later.tag))
        && !point.after?.includes(point.tag)
        && (point.drives === undefined || order[direction === 'in-hand' ? at + 1 : at - 1]?.tag === point.drives))
      expect(parseOrderInput(input).ok).toBe(permutations(points).some(keeps))
    }), { numRuns: 200 })
  })
})

function permutations<Item>(items: Item[]): Item[][] {
  if (items.length < 2) return [items]
  return items.flatMap((item, at) => permutations(items.toSpliced(at, 1)).map(rest => [item, ...rest]))
}
