/**
 * Cases whose truth is known: a lumped product that warms toward an ambient, read every ten minutes with noise.
 * Our own, seeded; the same course as in the literature's lumped-capacitance model.
 */
import { seeded } from './random'

export interface SyntheticCase {
  /** as the shop knows it, °C: within 2 K of the truth */
  ambientC: number
  /** as it was before the readings, hours: out by up to a factor 2 */
  priorTauHours: number
  limitC: number
  readings: { at: string, c: number }[]
  now: string
  /** of `now` since control was lost */
  nowMinutes: number
  /** minutes from `now` at which the product truly reaches its limit */
  truthMinutes: number
}

export interface Nature {
  /** standard deviation of a reading, K */
  noiseK?: number
  /** The air itself warms with this time constant, minutes, from the product's temperature on; 0: it is warm at once. */
  fastTauMinutes?: number
}

const LIMIT_C = 5
const INTERVAL = 10
const START = Date.UTC(2026, 2, 1, 2)
const iso = (minutes: number) => new Date(START + minutes * 60_000).toISOString()

/** Minutes in which a lumped product comes from one temperature to another; null when it never does. °C, hours */
export function crossingMinutes(fromC: number, towardC: number, tauHours: number, limitC: number): number | null {
  if (fromC >= limitC) return 0
  return towardC <= limitC ? null : 60 * tauHours * Math.log((towardC - fromC) / (towardC - limitC))
}

/** Product temperature by minutes since control was lost, °C; with air of its own pace, the sum of two exponentials. */
function courseOf(startC: number, ambientC: number, tauMinutes: number, fastTauMinutes: number): (minutes: number) => number {
  const share = fastTauMinutes === 0 ? 0 : (startC - ambientC) * fastTauMinutes / (fastTauMinutes - tauMinutes)
  return minutes => ambientC + (startC - ambientC - share) * Math.exp(-minutes / tauMinutes)
    + (share === 0 ? 0 : share * Math.exp(-minutes / fastTauMinutes))
}

/** The minute at which a rising course reaches the limit, by halving. */
function reaches(course: (minutes: number) => number): number {
  let [before, after] = [0, 60 * 200]
  for (let step = 0; step < 60; step += 1) {
    const middle = (before + after) / 2
    if (course(middle) < LIMIT_C) before = middle
    else after = middle
  }
  return after
}

export function syntheticCases(count: number, { noiseK = 0.3, fastTauMinutes = 0 }: Nature = {}): SyntheticCase[] {
  const random = seeded(20_260_301)
  const uniform = (low: number, high: number) => low + (high - low) * random()
  const normal = () => Math.sqrt(-2 * Math.log(1 - random())) * Math.cos(2 * Math.PI * random())
  const cases: SyntheticCase[] = []
  while (cases.length < count) {
    const tauHours = Math.exp(uniform(0, Math.log(15)))
    const ambientC = uniform(18, 28)
    const course = courseOf(uniform(-3, 2), ambientC, 60 * tauHours, fastTauMinutes)
    const nowMinutes = INTERVAL * (3 + Math.floor(9 * random()))
    const truthMinutes = reaches(course) - nowMinutes
    const known = { ambientC: ambientC + uniform(-2, 2), priorTauHours: tauHours * 2 ** uniform(-1, 1) }
    const readings = Array.from({ length: nowMinutes / INTERVAL + 1 }, (_, index) => ({
      at: iso(INTERVAL * index), c: Math.round(10 * (course(INTERVAL * index) + noiseK * normal())) / 10,
    }))
    if (truthMinutes >= 10) cases.push({ ...known, limitC: LIMIT_C, readings, now: iso(nowMinutes), nowMinutes, truthMinutes })
  }
  return cases
}
