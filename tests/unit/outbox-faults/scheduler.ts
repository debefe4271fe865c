/** A world that goes on one step at a time, in an order that a seed decides: whatever waits may be the next to go on. */

/** A stream of numbers in [0, 1) from a seed (mulberry32, from memory). */
export function seeded(seed: number): () => number {
  let state = seed >>> 0
  return () => {
    state = (state + 0x6D2B79F5) >>> 0
    let mixed = Math.imul(state ^ (state >>> 15), state | 1)
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61)
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4_294_967_296
  }
}

export class Scheduler {
  private readonly random: () => number
  private waiting: (() => void)[] = []
  /** faults happen; off once the world has become kind again */
  hostile = true

  constructor(seed: number) { this.random = seeded(seed) }

  /** Whether something happens that does so with this probability. */
  chance(probability: number): boolean { return this.random() < probability }
  /** Whether a fault happens here; never in a kind world. */
  fault(probability: number): boolean { return this.random() < probability && this.hostile }
  below(count: number): number { return Math.floor(this.random() * count) }
  of<T>(items: readonly T[]): T { return items[this.below(items.length)]! }

  /** A point at which anything else may come first. */
  step(): Promise<void> { return new Promise(resolve => this.waiting.push(resolve)) }

  /** Lets one that waits go on, until it waits again. @returns whether there was one */
  async turn(): Promise<boolean> {
    const next = this.waiting.splice(this.below(this.waiting.length), 1)[0]
    next?.()
    await new Promise(resolve => setImmediate(resolve))
    return next !== undefined
  }

  /** Lets all go on until nothing waits. */
  async rest(): Promise<void> {
    for (let turns = 0; await this.turn(); turns++) if (turns > 100_000) throw new Error('this history does not come to rest')
  }
}
