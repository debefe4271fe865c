/**
 * A small directed graph on the numbers 0 to size − 1; an edge from a to b has a before b.
 * Kept as two matrices of bits, since the stages of a large controller make millions of edges.
 */
export class Graph {
  private readonly words: number
  private readonly next: Uint32Array
  private readonly before: Uint32Array

  constructor(readonly size: number) {
    this.words = Math.ceil(size / 32)
    this.next = new Uint32Array(size * this.words)
    this.before = new Uint32Array(size * this.words)
  }

  add(from: number, to: number): void {
    this.next[from * this.words + (to >>> 5)]! |= 1 << (to & 31)
    this.before[to * this.words + (from >>> 5)]! |= 1 << (from & 31)
  }

  has(from: number, to: number): boolean {
    return ((this.next[from * this.words + (to >>> 5)]! >>> (to & 31)) & 1) === 1
  }

  /** The nodes to which an edge leads from this one, ascending. */
  after(node: number): number[] {
    return this.bitsOf(this.next, node)
  }

  /** Whether a path leads from one node to the other; a node reaches itself. */
  reaches(from: number, to: number): boolean {
    const seen = new Set([from])
    const open = [from]
    for (let node = open.pop(); node !== undefined; node = open.pop()) {
      if (node === to) return true
      for (const follower of this.after(node)) {
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
    const waiting = Array.from({ length: this.size }, (_, node) => this.bitsOf(this.before, node).length)
    const free = waiting.flatMap((count, node) => count === 0 ? [node] : [])
    const order: number[] = []
    while (free.length > 0) {
      let best = 0
      for (let index = 1; index < free.length; index += 1) {
        if (rank[free[index]!]! < rank[free[best]!]!) best = index
      }
      const [node] = free.splice(best, 1) as [number]
      order.push(node)
      for (const follower of this.after(node)) {
        waiting[follower]! -= 1
        if (waiting[follower] === 0) free.push(follower)
      }
    }
    return order.length === this.size ? { order } : { cycle: this.cycleAmong(waiting) }
  }

  /** For each node of an order, the fewest of its predecessors through which all others are reached. */
  nearestBefore(order: readonly number[]): number[][] {
    const position = new Int32Array(this.size)
    order.forEach((node, index) => { position[node] = index })
    const reached = new Uint32Array(this.size * this.words)
    const nearest: number[][] = new Array(this.size)
    for (const node of order) {
      const row = node * this.words
      const kept: number[] = []
      const positions = Int32Array.from(this.bitsOf(this.before, node), earlier => position[earlier]!).sort()
      for (let at = positions.length - 1; at >= 0; at -= 1) {
        const earlier = order[positions[at]!]!
        if (((reached[row + (earlier >>> 5)]! >>> (earlier & 31)) & 1) === 1) continue
        kept.push(earlier)
        reached[row + (earlier >>> 5)]! |= 1 << (earlier & 31)
        for (let word = 0; word < this.words; word += 1) reached[row + word]! |= reached[earlier * this.words + word]!
      }
      nearest[node] = kept.reverse()
    }
    return nearest
  }

  /** Every node that still waits has one before it that waits too, so walking back must close a ring. */
  private cycleAmong(waiting: readonly number[]): number[] {
    const path: number[] = []
    let node = waiting.findIndex(count => count > 0)
    while (!path.includes(node)) {
      path.push(node)
      node = this.bitsOf(this.before, node).find(earlier => waiting[earlier]! > 0)!
    }
    return path.slice(path.indexOf(node)).reverse()
  }

  private bitsOf(matrix: Uint32Array, node: number): number[] {
    const found: number[] = []
    for (let word = 0; word < this.words; word += 1) {
      let bits = matrix[node * this.words + word]!
      while (bits !== 0) {
        const bit = 31 - Math.clz32(bits & -bits)
        found.push(word * 32 + bit)
        bits &= bits - 1
      }
    }
    return found
  }
}
