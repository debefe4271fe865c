/**
 * The second implementation: one case, walked span by span in the plainest way there is. It shares no code and no
 * figure with the engine. Times are whole ms, temperatures degrees of the rulebook's own unit.
 */

/** A temperature that was read and may be relied upon. */
export interface Seen { at: number, value: number }

export interface Site { limit?: number, minutes?: number }

/** A piece of time whose temperature is known to lie between two values: one line from `a` to `b`. */
interface Span { from: number, to: number, a: number, b: number, ends: boolean }

const MILLIONTH = 0.000_001

export const over = (value: number, mark: number) => value - mark > MILLIONTH
export const same = (value: number, mark: number) => Math.abs(value - mark) <= MILLIONTH
export const reaches = (value: number, mark: number) => over(value, mark) || same(value, mark)

export class OracleCase {
  constructor(
    readonly seen: Seen[],
    readonly dark: number,
    readonly now: number,
    readonly interval: number,
    readonly limit: number,
    private readonly site: Site,
    private readonly hot: number,
  ) {}

  get first() { return this.seen[0]! }
  get last() { return this.seen[this.seen.length - 1]! }
  /** The last reading is over the limit. */
  get isWarm() { return over(this.last.value, this.limit) }
  get beganWarm() { return over(this.first.value, this.limit) }
  /** Nobody looked for longer than the interval. */
  get isLate() { return this.now - this.last.at > this.interval }

  /** So many minutes, or the site's own number where it is shorter. ms */
  allowed(minutes: number) {
    const own = this.site.minutes
    return (own !== undefined && own < minutes ? own : minutes) * 60_000
  }

  /** Some reading was over a mark. */
  wasOver(mark: number) {
    for (const { value } of this.seen) if (over(value, mark)) return true
    return false
  }

  /** How often a reading over the limit followed none or one within. */
  periods() {
    let periods = 0
    let wasWarm = false
    for (const { value } of this.seen) {
      const isWarm = over(value, this.limit)
      if (isWarm && !wasWarm) periods += 1
      wasWarm = isWarm
    }
    return periods
  }

  /** Every piece of time there is, from the loss of control or the first reading until now. */
  private spans(): Span[] {
    const spans: Span[] = []
    if (this.first.at > this.dark) spans.push({ from: this.dark, to: this.first.at, a: this.first.value, b: this.first.value, ends: true })
    let before: Seen | null = null
    for (const seen of this.seen) {
      if (before) spans.push({ from: before.at, to: seen.at, a: before.value, b: seen.value, ends: false })
      before = seen
    }
    spans.push({ from: this.last.at, to: this.now, a: this.last.value, b: this.last.value, ends: true })
    return spans
  }

  /** ms of the spans with an end for which `counts` holds, each whole; those hot at both ends are left out. */
  careful(counts: (value: number) => boolean) {
    let sum = 0
    for (const { from, to, a, b } of this.spans()) {
      if (reaches(a, this.hot) && reaches(b, this.hot)) continue
      if (counts(a) || counts(b)) sum += to - from
    }
    return sum
  }

  carefulOver(mark: number) { return this.careful(value => over(value, mark)) }
  carefulAt(mark: number) { return this.careful(value => reaches(value, mark)) }

  /** ms over the limit and below hot along straight lines. */
  linear() {
    let sum = 0
    for (const { from, to, a, b } of this.spans()) {
      const warmEnds = Number(over(a, this.limit)) + Number(over(b, this.limit))
      const hotEnds = Number(reaches(a, this.hot)) + Number(reaches(b, this.hot))
      if (warmEnds === 0 || hotEnds === 2) continue
      // An end that is a millionth off its mark would put the crossing beyond the span.
      const moment = (value: number) => Math.min(to, Math.max(from, from + (to - from) * (value - a) / (b - a)))
      let begins = from
      let ends = to
      if (warmEnds === 1) {
        if (b > a) begins = moment(this.limit)
        else ends = moment(this.limit)
      }
      if (hotEnds === 1) {
        if (b > a) ends = moment(this.hot)
        else begins = moment(this.hot)
      }
      sum += Math.max(0, ends - begins)
    }
    return sum
  }

  /** ms without a reading after one within, each such time whole once it is longer than the interval. */
  unwatched() {
    let sum = 0
    for (const [index, { at, value }] of this.seen.entries()) {
      const next = this.seen[index + 1]
      const until = next ? next.at : this.now
      const isWithin = !over(value, this.limit) && !(next && over(next.value, this.limit))
      if (isWithin && until - at > this.interval) sum += until - at
    }
    return sum
  }
}
