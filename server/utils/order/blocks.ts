/** A machine and its drives are dealt with in one go: a block of the order. */
import type { OrderDirection } from '~~/shared/schemas/plan-order'
import { compareNaturally } from './compare'
import { Graph } from './graph'
import type { Placed } from './layout'

export interface Blocks {
  /** The block of each node. */
  of: number[]
  /** The nodes of each block, in their order: going in hand the drive first, at hand back the machine. */
  members: number[][]
  /** The graph of the blocks that a graph of the nodes gives. */
  contract(nodes: Graph): Graph
}

export function blocksOf(nodes: readonly Placed[], direction: OrderDirection): Blocks {
  const byMachine = new Map<string, number[]>()
  nodes.forEach(({ machine }, node) => byMachine.set(machine.tag, [...byMachine.get(machine.tag) ?? [], node]))
  const nearFirst = direction === 'hand-back' ? 1 : -1
  const members = [...byMachine.values()].map(block => block.sort((one, other) =>
    nearFirst * (nodes[one]!.depth - nodes[other]!.depth)
    || compareNaturally(nodes[one]!.point.tag, nodes[other]!.point.tag)))
  const of = new Array<number>(nodes.length)
  members.forEach((block, index) => block.forEach((node) => { of[node] = index }))
  return {
    of,
    members,
    contract(graph) {
      const contracted = new Graph(members.length)
      for (let node = 0; node < graph.size; node += 1) {
        for (const follower of graph.after(node)) {
          if (of[node] !== of[follower]) contracted.add(of[node]!, of[follower]!)
        }
      }
      return contracted
    },
  }
}
