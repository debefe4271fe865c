/** A small directed graph on the numbers 0 to size − 1; an edge from a to b has a before b. */
export class Graph {
  readonly before: Set<number>[]
  readonly next: Set<number>[]

  constructor(readonly size: number) {
    this.before = Array.from({ length: size }, () => new Set<number>())
    this.next = Array.from({ length: size }, () => new Set<number>())
  }

  add(from: number, to: number): void {
    this.next[from]!.add(to)
    this.before[to]!.add(from)
  }

  /** Whether a path leads from one node to the other; a node reaches itself. */
  reaches(from: number, to: number): boolean {
    const seen = new Set([from])
    const open = [from]
    for (let node = open.pop(); node !== undefined; node = open.pop()) {
      if (node === to) return true
      for (const follower of this.next[node]!) {
        if (!seen.has(follower)) {
          seen.add(follower)
          open.push(follower)
        }
      }
    }
    return false
  }

  /**
   * Nodes in a topological order, of all that are free the one with the lowest `rank` first
   * (Kahn 1962). With a cycle: the nodes of one cycle, each before the next.
   */
  sort(rank: readonly number[]): { order: number[] } | { cycle: number[] } {
    const waiting = this.before.map(set => set.size)
    const free = waiting.flatMap((count, node) => count === 0 ? [node] : [])
    const order: number[] = []
    while (free.length > 0) {
      let best = 0
      for (let index = 1; index < free.length; index += 1) {
        if (rank[free[index]!]! < rank[free[best]!]!) best = index
      }
      const [node] = free.splice(best, 1) as [number]
      order.push(node)
      for (const follower of this.next[node]!) {
        waiting[follower]! -= 1
        if (waiting[follower] === 0) free.push(follower)
      }
    }
    return order.length === this.size ? { order } : { cycle: this.cycleAmong(waiting) }
  }

  /** For each node of an order, the fewest of its predecessors through which all others are reached. */
  nearestBefore(order: readonly number[]): number[][] {
    const position = new Array<number>(this.size)
    order.forEach((node, index) => { position[node] = index })
    const words = Math.ceil(this.size / 32)
    const ancestors: Uint32Array[] = new Array(this.size)
    const nearest: number[][] = new Array(this.size)
    for (const node of order) {
      const reached = new Uint32Array(words)
      nearest[node] = []
      const candidates = [...this.before[node]!].sort((one, other) => position[other]! - position[one]!)
      for (const candidate of candidates) {
        if (((reached[candidate >>> 5]! >>> (candidate & 31)) & 1) === 1) continue
        nearest[node].push(candidate)
        reached[candidate >>> 5]! |= 1 << (candidate & 31)
        const through = ancestors[candidate]!
        for (let word = 0; word < words; word += 1) reached[word]! |= through[word]!
      }
      ancestors[node] = reached
      nearest[node].sort((one, other) => position[one]! - position[other]!)
    }
    return nearest
  }

  /** Every node that still waits has one before it that waits too, so walking back must close a ring. */
  private cycleAmong(waiting: readonly number[]): number[] {
    const path: number[] = []
    let node = waiting.findIndex(count => count > 0)
    while (!path.includes(node)) {
      path.push(node)
      node = [...this.before[node]!].find(earlier => waiting[earlier]! > 0)!
    }
    return path.slice(path.indexOf(node)).reverse()
  }
}
