/**
 * The order of the points: a directed graph from the sequence of the trade, rule I12 and the
 * equipment's own links, sorted topologically; ties by place, then stage, then tag.
 */
import type { OrderDirection, PlanOrderInput } from '~~/shared/schemas/plan-order'
import { blocksOf, type Blocks } from './blocks'
import { compareNaturally } from './compare'
import { Graph } from './graph'
import type { Placed } from './layout'
import { comparePlaces, firstMediumFirst, isAsFound, lastMediumFirst, placeOf, stageBinds, stagesDemand, stageOf, stageRank } from './stages'

export interface Arranged {
  place: Placed
  after: string[]
}

/** The order is spelled out on demand: who only asks for a ring needs none of it. */
export type Arrangement = { order: () => Arranged[] } | { cycle: string[] }

/** Places the points that are neither refused nor staying in hand. */
export function arrange(input: PlanOrderInput, placed: readonly Placed[], isRefused: (tag: string) => boolean): Arrangement {
  const { direction } = input
  const nodes = placed.filter(({ point }) => !isRefused(point.tag) && !(direction === 'hand-back' && point.stays === true))
  const points = new Graph(nodes.length)
  addStages(points, nodes, direction)
  addLinks(points, nodes, placed)
  const blocks = blocksOf(nodes, direction)
  addSecondStage(points, blocks, nodes, direction)
  addDrivesFirst(points, blocks, nodes, direction)
  return sortBlocks(points, blocks, nodes, direction)
}

/** The sequence of the trade, between every two points that it binds. */
function addStages(points: Graph, nodes: readonly Placed[], direction: OrderDirection): void {
  const stages = nodes.map(node => stageOf(node, direction))
  nodes.forEach((first, from) => {
    if (isAsFound(first)) return
    nodes.forEach((then, to) => {
      if (stagesDemand(stages[from]!, stages[to]!, then, direction) && (stages[to] === 'alarm' || stageBinds(first, then))) points.add(from, to)
    })
  })
}

/** The links of the equipment. Through a point that is not in the order, its own links hold on. */
function addLinks(points: Graph, nodes: readonly Placed[], placed: readonly Placed[]): void {
  const index = new Map(nodes.map((node, at) => [node.point.tag, at]))
  const byTag = new Map(placed.map(place => [place.point.tag, place]))
  nodes.forEach((node, to) => {
    const open = [...node.point.after ?? []]
    const seen = new Set(open)
    for (let tag = open.pop(); tag !== undefined; tag = open.pop()) {
      const from = index.get(tag)
      if (from !== undefined) {
        points.add(from, to)
        continue
      }
      for (const earlier of byTag.get(tag)?.point.after ?? []) {
        if (!seen.has(earlier)) {
          seen.add(earlier)
          open.push(earlier)
        }
      }
    }
  })
}

/**
 * I12. Going in hand one medium-stage machine comes before each low-stage one, and low-stage
 * machines stop before medium-stage ones do; at hand back each low-stage one comes before the
 * last medium-stage one. Which machine that is, is left to the equipment's links where they say.
 */
function addSecondStage(points: Graph, blocks: Blocks, nodes: readonly Placed[], direction: OrderDirection): void {
  const machines = nodes.filter(node => node.point.kind === 'compressor' && !isAsFound(node))
  const at = new Map(nodes.map((node, index) => [node, index]))
  const links = blocks.contract(points)
  for (const rack of new Set(machines.map(machine => machine.rack))) {
    const here = machines.filter(machine => machine.rack === rack)
    const low = here.filter(machine => machine.point.stage === 'low')
    const medium = here.filter(machine => machine.point.stage === 'medium')
    const holds = (one: Placed, other: Placed) => links.reaches(blocks.of[at.get(one)!]!, blocks.of[at.get(other)!]!)
    if (direction === 'hand-back') {
      const candidates = lastMediumFirst(medium.some(machine => machine.active) ? medium.filter(machine => machine.active) : medium)
      const last = candidates.find(candidate => !low.some(machine => holds(candidate, machine))) ?? candidates[0]
      if (last) low.forEach(machine => points.add(at.get(machine)!, at.get(last)!))
      continue
    }
    const candidates = firstMediumFirst(medium.filter(machine => machine.active))
    const started = low.filter(machine => machine.active)
    const first = candidates.find(candidate => !started.some(machine => holds(machine, candidate))) ?? candidates[0]
    if (first) started.forEach(machine => points.add(at.get(first)!, at.get(machine)!))
    for (const stopped of low.filter(machine => machine.atRest)) {
      medium.filter(machine => machine.atRest).forEach(machine => points.add(at.get(stopped)!, at.get(machine)!))
    }
  }
}

/**
 * Drives with their machines before fixed-speed machines and, going in hand, those running before
 * the others: as far as I12 allows, which goes before.
 */
function addDrivesFirst(points: Graph, blocks: Blocks, nodes: readonly Placed[], direction: OrderDirection): void {
  const machines = nodes.flatMap((node, index) =>
    stageOf(node, direction) === 'machine' && !isAsFound(node) ? [{ node, index, block: blocks.of[index]! }] : [])
  const rules = new Graph(blocks.members.length)
  for (const first of machines) {
    for (const then of machines) if (points.has(first.index, then.index)) rules.add(first.block, then.block)
  }
  const prefer = (isFirst: (node: Placed) => boolean, isThen: (node: Placed) => boolean) => {
    for (const first of machines.filter(({ node }) => isFirst(node))) {
      for (const then of machines.filter(({ node }) => isThen(node))) {
        if (!stageBinds(first.node, then.node) || rules.reaches(then.block, first.block)) continue
        rules.add(first.block, then.block)
        points.add(first.index, then.index)
      }
    }
  }
  prefer(isOnDrive, node => !isOnDrive(node))
  if (direction === 'in-hand') {
    prefer(node => !isOnDrive(node) && node.point.running === true, node => !isOnDrive(node) && node.point.running !== true)
  }
}

function isOnDrive({ point, driven }: Placed): boolean {
  return driven || point.kind === 'drive'
}

/** Sorts block by block, so that nothing comes between a drive and its machine. */
function sortBlocks(points: Graph, blocks: Blocks, nodes: readonly Placed[], direction: OrderDirection): Arrangement {
  const against = blocks.members.find(members => members.some((node, at) =>
    members.slice(at + 1).some(later => points.has(later, node))))
  if (against) return { cycle: against.map(node => nodes[node]!.point.tag) }

  const heads = blocks.members.map(members => nodes[members.at(direction === 'in-hand' ? -1 : 0)!]!)
  const rank = new Array<number>(heads.length)
  heads.map((head, block) => ({ head, block }))
    .sort((one, other) => compareNaturally(placeOf(one.head), placeOf(other.head))
      || stageRank(stageOf(one.head, direction), direction) - stageRank(stageOf(other.head, direction), direction)
      || comparePlaces(one.head, other.head))
    .forEach(({ block }, at) => { rank[block] = at })

  const sorted = blocks.contract(points).sort(rank)
  if ('cycle' in sorted) {
    return { cycle: sorted.cycle.flatMap(block => blocks.members[block]!.map(node => nodes[node]!.point.tag)) }
  }
  const order = sorted.order.flatMap(block => blocks.members[block]!)
  return { order: () => spellOut(points, blocks, nodes, order) }
}

function spellOut(points: Graph, blocks: Blocks, nodes: readonly Placed[], order: readonly number[]): Arranged[] {
  for (const members of blocks.members) {
    members.slice(1).forEach((node, at) => points.add(members[at]!, node))
  }
  const nearest = points.nearestBefore(order)
  return order.map(node => ({ place: nodes[node]!, after: nearest[node]!.map(earlier => nodes[earlier]!.point.tag) }))
}
